/** What a picture says about itself: a figure cut out of its page must still be understood, and traced back. */
export interface PictureSource {
  field: string;
  farm: string | null;
  log: string;
  /** Day the log was made, as shown; empty where it is not known. */
  loggedOn: string;
  /** "as adjusted, revision 2", "as read". */
  cleaning: string;
}

export interface PictureWords {
  title: string;
  /** Unit of the values, as shown; empty for a bare number. */
  unit: string;
  /** What of the log is shown: pass, rows, classes. */
  subtitle: string;
}

/** "Margin, N". */
export function pictureTitle({ title, unit }: PictureWords): string {
  return unit ? `${title}, ${unit}` : title;
}

/** One sentence of where the figures come from, and when the picture was made. */
export function sourceLine(source: PictureSource, madeAt: string, credit = ""): string {
  const log = source.loggedOn ? `log ${source.log} of ${source.loggedOn}` : `log ${source.log}`;
  const parts = [source.farm, source.field, log, source.cleaning, `picture made ${madeAt}`, "Coulterbook", credit];
  return parts.filter((part) => part).join(" · ");
}

/** "east-quarter-margin-n" from any words: safe in every file system. */
export function pictureFileName(...words: string[]): string {
  const plain = words
    .join(" ")
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-+|-+$/g, "");
  return plain.slice(0, 100).replace(/-+$/, "") || "picture";
}
