/** How a longitude or latitude is written where it is no plain number of degrees. */
export interface DegreesForm {
  /** One number whose last two digits before the point are minutes: 3825.026 is 38 degrees 25.026 minutes. */
  isPacked: boolean;
  /** Numbers without a sign or letter are west, or south. */
  isNegative: boolean;
}

/** Ways of writing degrees that a mapping may name; each may be followed by W or S where the file leaves the sign out. */
export const DEGREES_FORMATS = ["degrees minutes", "ddmm.mmmm", "dd.dddd W", "dd.dddd S"] as const;

/** Null for a format that is none of these. */
export function readDegreesForm(format: string): DegreesForm | null {
  const match = /^(degrees minutes|ddmm\.mmmm|dd\.dddd)(?:\s+([NSEW]))?$/i.exec(format.trim());
  if (!match) return null;
  return { isPacked: /^ddmm/i.test(match[1] ?? ""), isNegative: /[SW]/i.test(match[2] ?? "") };
}

const LETTER = /^\s*([NSEW])(?![a-z])|([NSEW])\s*$/i;

/** Degrees of `38°25'01.6"N`, `N 38 25.026`, `-98 36.744`, `98.6124 W`, or packed `3825.026`; NaN for any other text. */
export function parseDegrees(text: string, form: DegreesForm, decimalComma = false): number {
  // In "38d25m01.56s" the last letter means seconds, not south.
  const unmarked = /\dd/i.test(text) ? text.replace(/(\d)s(?=\s|$|[NSEW])/i, "$1 ") : text;
  const letter = LETTER.exec(unmarked);
  const direction = (letter?.[1] ?? letter?.[2] ?? "").toUpperCase();
  const plain = decimalComma ? unmarked.replaceAll(",", ".") : unmarked;
  const body = plain.replace(LETTER, " ").trim();
  const isMinus = /^[-\u2212]/.test(body);
  const parts = body
    .replace(/^[+\-\u2212]/, "")
    .split(/[\s°º:'"\u2032\u2033dm]+/i)
    .filter((part) => part !== "");
  if (parts.length === 0 || parts.length > 3 || parts.some((part) => !/^\d+(?:\.\d+)?$/.test(part))) return NaN;
  const degrees = joinParts(parts.map(Number), form);
  const isNegative = isMinus || direction === "S" || direction === "W" || (direction === "" && form.isNegative);
  return isNegative ? -degrees : degrees;
}

function joinParts([first = NaN, minutes = 0, seconds = 0]: number[], { isPacked }: DegreesForm): number {
  if (isPacked) return minutes === 0 && first % 100 < 60 ? Math.floor(first / 100) + (first % 100) / 60 : NaN;
  return minutes < 60 && seconds < 60 ? first + minutes / 60 + seconds / 3600 : NaN;
}
