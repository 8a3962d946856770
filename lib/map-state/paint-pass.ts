import { namedCodes } from "@/lib/legend/categories";
import { classOf } from "@/lib/legend/class-edges";
import { parseColour } from "@/lib/legend/parse-colour";
import type { PassTrack } from "@/lib/map-state/pass-track";

/** A picture of RGBA bytes, row by row. */
export interface Picture {
  width: number;
  height: number;
  data: Uint8ClampedArray<ArrayBuffer>;
}

/** `values[row][column]`, NaN where nothing was logged. */
export type ValueGrid = readonly ArrayLike<number>[];

/** Paints a grid in class colours, one pixel a value; missing values stay transparent so that a hatch shows through. */
export function paintGrid(grid: ValueGrid, edges: readonly number[], colours: readonly string[]): Picture {
  const width = grid[0]?.length ?? 0;
  const data = new Uint8ClampedArray(new ArrayBuffer(width * grid.length * 4));
  const bytes = colours.map(parseColour);
  grid.forEach((line, row) => {
    for (let column = 0; column < width; column += 1) {
      const value = line[column]!;
      const colour = Number.isNaN(value) ? undefined : bytes[classOf(value, edges)];
      if (!colour) continue;
      const at = (row * width + column) * 4;
      data[at] = colour[0];
      data[at + 1] = colour[1];
      data[at + 2] = colour[2];
      data[at + 3] = 255;
    }
  });
  return { width, height: grid.length, data };
}

/** The same picture with its rows running across: distance goes down. */
export function turnUpright({ width, height, data }: Picture): Picture {
  const turned = new Uint8ClampedArray(new ArrayBuffer(data.length));
  const from = new Uint32Array(data.buffer);
  const to = new Uint32Array(turned.buffer);
  for (let y = 0; y < height; y += 1) {
    for (let x = 0; x < width; x += 1) to[x * height + y] = from[y * width + x]!;
  }
  return { width: height, height: width, data: turned };
}

/**
 * Lays a pass out in `columns` equal steps of distance. A column wholly inside one record's cell shows that reading; one over
 * several shows their mean, weighted by the length in it, or of names the one over the longest part, as the map does from afar.
 */
export function gridOfPass(track: PassTrack, columns: number): Float32Array[] {
  const grid = Array.from({ length: track.rows }, () => new Float32Array(columns).fill(NaN));
  const columnM = track.lengthM / columns;
  const codes = namedCodes(track.channel);
  if (!(columnM > 0)) return grid;
  let record = 0;
  for (let column = 0; column < columns; column += 1) {
    const fromM = column * columnM;
    const toM = fromM + columnM;
    while (record < track.records - 1 && track.endsM[record]! <= fromM) record += 1;
    for (let row = 0; row < track.rows; row += 1) {
      const within = { record, row, fromM, toM };
      grid[row]![column] = codes > 0 ? codeWithin(track, within, codes) : meanWithin(track, within);
    }
  }
  return grid;
}

interface Within {
  /** The first record that may reach into it. */
  record: number;
  row: number;
  fromM: number;
  toM: number;
}

/** What each reading within a stretch covers of it. */
function forEachWithin(track: PassTrack, at: Within, tell: (value: number, overlapM: number) => void): void {
  for (let record = at.record; record < track.records; record += 1) {
    const startM = record > 0 ? track.endsM[record - 1]! : 0;
    if (startM >= at.toM) break;
    const value = track.values[record * track.rows + at.row]!;
    const overlap = Math.min(at.toM, track.endsM[record]!) - Math.max(at.fromM, startM);
    if (overlap > 0 && !Number.isNaN(value)) tell(value, overlap);
  }
}

function meanWithin(track: PassTrack, at: Within): number {
  let sum = 0;
  let weight = 0;
  forEachWithin(track, at, (value, overlapM) => {
    sum += value * overlapM;
    weight += overlapM;
  });
  return weight > 0 ? sum / weight : NaN;
}

/** The name over the longest part; of two alike the lower. */
function codeWithin(track: PassTrack, at: Within, codes: number): number {
  const lengthsM = new Array<number>(codes).fill(0);
  forEachWithin(track, at, (value, overlapM) => {
    lengthsM[value - 1]! += overlapM;
  });
  const most = Math.max(...lengthsM);
  return most > 0 ? 1 + lengthsM.indexOf(most) : NaN;
}
