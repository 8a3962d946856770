import { codeOf, type ValueScale } from "@/lib/tiles/value-scale";

/** Three bytes a pixel: the code's high byte, its low byte, 0. Missing is 0, 0, 0. */
export function encodeValueTile(pixels: Float32Array, scale: ValueScale): Uint8Array {
  const bytes = new Uint8Array(pixels.length * 3);
  for (let pixel = 0; pixel < pixels.length; pixel += 1) {
    const code = codeOf(pixels[pixel]!, scale);
    bytes[pixel * 3] = code >> 8;
    bytes[pixel * 3 + 1] = code & 255;
  }
  return bytes;
}
