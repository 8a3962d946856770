/** Text in which `backticks` mark names of the API. */
export function CodeText({ children }: { children: string }) {
  return (
    <>
      {children.split("`").map((part, index) =>
        index % 2 === 1 ? (
          <code key={index} className="text-ink">
            {part}
          </code>
        ) : (
          part
        ),
      )}
    </>
  );
}
