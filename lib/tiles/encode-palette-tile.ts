import { classOf } from "@/lib/legend/class-edges";

/**
 * One byte a pixel: 1 + the class of the value; 0 where nothing was logged.
 * `breaks` are the inner class edges, rising, in the channel's unit: n edges make n + 1 classes, an edge belongs to the class above.
 */
export function encodePaletteTile(pixels: Float32Array, breaks: readonly number[]): Uint8Array {
  const places = new Uint8Array(pixels.length);
  for (let pixel = 0; pixel < pixels.length; pixel += 1) {
    const value = pixels[pixel]!;
    if (!Number.isNaN(value)) places[pixel] = 1 + classOf(value, breaks);
  }
  return places;
}
