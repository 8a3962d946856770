/** Lines of a page that is being fetched; about what a list of the demo farm is tall. */
const LINES = 4;

/** Said while something is fetched: its place is kept by quiet lines, nothing moves. */
export function Loading({ what, lines = LINES }: { what: string; lines?: number }) {
  return (
    <div role="status" className="space-y-3 py-2">
      <p className="text-table text-ink-soft">Fetching {what}…</p>
      {Array.from({ length: lines }, (_, line) => (
        <div key={line} aria-hidden="true" className="hatch h-11 border-b border-rule opacity-60" />
      ))}
    </div>
  );
}
