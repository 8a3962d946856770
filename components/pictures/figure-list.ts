import type { Figure } from "@/components/pictures/figure";

export interface FigureList {
  /** Answers how to take it out again. */
  add: (figure: Figure) => () => void;
  /** In the order of print. */
  inOrder: () => Figure[];
}

/** The figures of one page, as they come and go. */
export function createFigureList(): FigureList {
  const known = new Set<Figure>();
  return {
    add: (figure) => {
      known.add(figure);
      return () => {
        known.delete(figure);
      };
    },
    inOrder: () => [...known].sort((a, b) => a.order - b.order),
  };
}
