/** Said while something is fetched; calm, no spinner. */
export function Loading({ what }: { what: string }) {
  return (
    <p role="status" className="py-6 text-ink-soft">
      Fetching {what}…
    </p>
  );
}
