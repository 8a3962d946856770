import type { Figure } from "@/components/pictures/figure";
import { creditOf } from "@/components/pictures/make-picture";
import { traceFigure } from "@/components/pictures/trace-figure";
import { composePicture } from "@/lib/pictures/compose-picture";
import { pictureTitle, sourceLine, type PictureSource } from "@/lib/pictures/picture-words";

export interface PrintContents {
  title: string;
  /** Said above the figures, the first one large. */
  sentences: readonly string[];
  figures: readonly Figure[];
  source: PictureSource;
  /** When it is printed, in words. */
  madeAt: string;
}

/**
 * What a page becomes on paper: its sentences and its figures with their legends, nothing to press. Built in one go while
 * the printer waits, so nothing in it may have to be fetched.
 */
export function buildPrintSheet({ title, sentences, figures, source, madeAt }: PrintContents): HTMLElement {
  const sheet = document.createElement("div");
  sheet.className = "print-sheet";
  sheet.append(words("h1", title), ...sentences.map((sentence) => words("p", sentence)));
  for (const figure of figures) {
    const body = traceFigure(figure);
    if (!body) continue;
    const { svg } = composePicture({
      title: pictureTitle(figure.words),
      subtitle: figure.words.subtitle,
      source: creditOf(figure),
      legend: figure.legend,
      body,
      fontCss: "",
    });
    const holder = document.createElement("figure");
    holder.append(document.importNode(new DOMParser().parseFromString(svg, "image/svg+xml").documentElement, true));
    sheet.append(holder);
  }
  sheet.append(words("footer", sourceLine(source, madeAt)));
  return sheet;
}

function words(tag: "h1" | "p" | "footer", text: string): HTMLElement {
  const element = document.createElement(tag);
  element.textContent = text;
  return element;
}
