import { classColours, type RampName } from "@/lib/legend/ramps";
import { classOf } from "@/lib/legend/class-edges";
import { parseColour } from "@/lib/legend/parse-colour";

/**
 * Four bytes a pixel: the colour of the value's class, opaque; transparent where nothing was logged.
 * `breaks` are the inner class edges, rising, in the channel's unit: n edges make n + 1 classes, an edge belongs to the class above.
 */
export function encodePaletteTile(pixels: Float32Array, breaks: readonly number[], ramp: RampName): Uint8Array {
  const colours = classColours(ramp, breaks.length + 1).map(parseColour);
  const bytes = new Uint8Array(pixels.length * 4);
  for (let pixel = 0; pixel < pixels.length; pixel += 1) {
    const value = pixels[pixel]!;
    if (Number.isNaN(value)) continue;
    const colour = colours[classOf(value, breaks)]!;
    bytes.set(colour, pixel * 4);
    bytes[pixel * 4 + 3] = 255;
  }
  return bytes;
}
