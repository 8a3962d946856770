/** The element that shows a figure: the one marked with its name. */
export function figureElement(name: string): () => HTMLElement | null {
  return () => document.querySelector<HTMLElement>(`[data-figure="${name}"]`);
}
