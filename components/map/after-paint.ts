/**
 * Does a piece of work once the browser has shown the frame now being made, so that an answer to a click or a key (a handle
 * that moved, a button that is pressed) is seen before a map is painted anew. Answers how to call it off.
 */
export function afterPaint(work: () => void): () => void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const frame = requestAnimationFrame(() => {
    timer = setTimeout(work, 0);
  });
  return () => {
    cancelAnimationFrame(frame);
    clearTimeout(timer);
  };
}
