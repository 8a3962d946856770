export interface InkColour {
  /** `#rrggbb`, which every program that reads SVG knows. */
  colour: string;
  opacity: number;
}

const known = new Map<string, InkColour | null>();
let brush: CanvasRenderingContext2D | null | undefined;

/**
 * A colour of a computed style, however the browser spells it (`rgb()`, `oklab()`, `color()`); null where nothing is drawn.
 * The browser itself is asked, by painting one pixel.
 */
export function readColour(css: string): InkColour | null {
  const found = known.get(css);
  if (found !== undefined) return found;
  const read = paintOne(css);
  known.set(css, read);
  return read;
}

function paintOne(css: string): InkColour | null {
  if (css === "" || css === "none" || css === "transparent") return null;
  if (brush === undefined) {
    const canvas = document.createElement("canvas");
    [canvas.width, canvas.height] = [1, 1];
    brush = canvas.getContext("2d", { willReadFrequently: true });
  }
  if (!brush) return { colour: css, opacity: 1 };
  brush.clearRect(0, 0, 1, 1);
  brush.fillStyle = css;
  brush.fillRect(0, 0, 1, 1);
  const [red = 0, green = 0, blue = 0, alpha = 0] = brush.getImageData(0, 0, 1, 1).data;
  if (alpha === 0) return null;
  const hex = [red, green, blue].map((part) => part.toString(16).padStart(2, "0")).join("");
  return { colour: `#${hex}`, opacity: Math.round((alpha / 255) * 100) / 100 };
}
