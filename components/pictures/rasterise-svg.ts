/** Phones refuse canvases of more dots than this. */
const MOST_DOTS = 16_000_000;

interface SizedSvg {
  svg: string;
  widthPx: number;
  heightPx: number;
}

/** How many dots a pixel of the picture gets: two, or as many as a canvas can hold. */
export function pictureScale({ widthPx, heightPx }: Omit<SizedSvg, "svg">): number {
  return Math.min(2, Math.sqrt(MOST_DOTS / (widthPx * heightPx)));
}

/** An SVG document as a PNG file. @throws Error in words where the browser cannot. */
export async function rasteriseSvg(picture: SizedSvg): Promise<Blob> {
  const scale = pictureScale(picture);
  const address = URL.createObjectURL(new Blob([picture.svg], { type: "image/svg+xml" }));
  try {
    const image = await loadImage(address);
    const canvas = document.createElement("canvas");
    [canvas.width, canvas.height] = [Math.round(picture.widthPx * scale), Math.round(picture.heightPx * scale)];
    const brush = canvas.getContext("2d");
    if (!brush) throw new Error("This browser cannot paint pictures. Take the SVG instead.");
    brush.drawImage(image, 0, 0, canvas.width, canvas.height);
    return await toPng(canvas);
  } finally {
    URL.revokeObjectURL(address);
  }
}

function loadImage(address: string): Promise<HTMLImageElement> {
  return new Promise((resolve, reject) => {
    const image = new Image();
    image.onload = () => resolve(image);
    image.onerror = () => reject(new Error("This browser cannot paint this picture. Take the SVG instead."));
    image.src = address;
  });
}

function toPng(canvas: HTMLCanvasElement): Promise<Blob> {
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error("This picture is too large for this browser."))),
      "image/png",
    );
  });
}
