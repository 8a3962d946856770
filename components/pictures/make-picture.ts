import type { Figure } from "@/components/pictures/figure";
import { loadFontCss } from "@/components/pictures/load-font";
import { rasteriseSvg } from "@/components/pictures/rasterise-svg";
import { saveFileAs } from "@/components/pictures/save-file";
import { traceFineFigure } from "@/components/pictures/trace-figure";
import { formatMoment } from "@/components/ui/format-date";
import { composePicture } from "@/lib/pictures/compose-picture";
import { pictureFileName, pictureTitle, sourceLine, type PictureSource } from "@/lib/pictures/picture-words";

export type PictureFormat = "png" | "svg";

/** Whom a map's ground was made by, as its licence wants it shown. */
export function creditOf({ map }: Figure): string {
  const note = map?.getContainer().querySelector(".maplibregl-ctrl-attrib-inner");
  return note?.textContent.trim() ?? "";
}

/**
 * Makes a picture of a figure and hands it to the person as a file.
 * @throws Error in words for the person where the figure is not drawn or the browser cannot make the picture.
 */
export async function makePicture(figure: Figure, source: PictureSource, format: PictureFormat): Promise<void> {
  const [body, fontCss] = [await traceFineFigure(figure), await loadFontCss()];
  if (!body) throw new Error("There is nothing drawn here yet. Wait until the figure is there and try again.");
  const { title, subtitle } = { title: pictureTitle(figure.words), subtitle: figure.words.subtitle };
  const madeAt = formatMoment(new Date().toISOString());
  const picture = composePicture({
    title: `${source.field}: ${title}`,
    subtitle,
    source: sourceLine(source, madeAt, creditOf(figure)),
    body,
    legend: figure.legend,
    fontCss,
  });
  const name = pictureFileName(source.field, source.log, figure.words.title, figure.id);
  const file =
    format === "svg"
      ? new Blob([`<?xml version="1.0" encoding="UTF-8"?>\n${picture.svg}`], { type: "image/svg+xml" })
      : await rasteriseSvg(picture);
  saveFileAs(`${name}.${format}`, file);
}
