import { ruleNumber, type CleaningCode } from "@/lib/cleaning/rule-catalogue";
import { parseColour } from "@/lib/legend/parse-colour";
import type { Picture } from "@/lib/map-state/paint-pass";

/** Patterns repeat after so many pixels, which divides a tile: no seams. */
const PERIOD_PX = 8;

/** Whether a pattern has a stroke at a place within its period. */
type ReasonPattern = (x: number, y: number) => boolean;

/** Every stroke is ink: no class of readings has its colour. */
const INK = parseColour("#1e2430");

const rising = (x: number, y: number) => (x + y) % PERIOD_PX < 2;
const falling = (x: number, y: number) => (x - y + PERIOD_PX) % PERIOD_PX < 2;
const across = (_x: number, y: number) => y % 4 < 1;
const upright = (x: number) => x % 4 < 1;

/** Bricks: joints of every other course stand between those of the next. */
const bricks = (x: number, y: number) => y % 4 < 1 || (x + (y < 4 ? 0 : 4)) % PERIOD_PX < 1;

/**
 * Every switchable rule has a shape of its own, so that the map reads in grey too. Readings that the fixed rules take out
 * lie in no pass and are on no map.
 */
const PATTERNS: Record<CleaningCode, ReasonPattern> = {
  "no-position": () => true,
  "duplicate-time": (x, y) => x % 4 < 2 && y % 4 < 2,
  "impossible-step": () => true,
  "not-working": () => true,
  "start-ramp": rising,
  "end-ramp": falling,
  turning: (x, y) => rising(x, y) || falling(x, y),
  speed: across,
  "sensor-stuck": upright,
  "physical-range": (x, y) => x % 4 < 2 !== y % 4 < 2,
  "local-outlier": () => true,
  "short-pass": (x, y) => across(x, y) || upright(x),
  overlap: bricks,
};

/** Patterns by the number that the channel `flags` carries. */
const BY_NUMBER = new Map(
  (Object.keys(PATTERNS) as CleaningCode[]).map((code) => [ruleNumber(code), PATTERNS[code]] as const),
);

/**
 * A picture of reasons: for every pixel the number of the rule that left its reading out, 0 for none. Between the strokes
 * of a pattern there is white, and pixels without a reason stay transparent.
 */
export function paintReasons(numbers: ArrayLike<number>, width: number): Picture {
  const data = new Uint8ClampedArray(new ArrayBuffer(numbers.length * 4));
  for (let pixel = 0; pixel < numbers.length; pixel += 1) {
    const pattern = BY_NUMBER.get(numbers[pixel]!);
    if (!pattern) continue;
    const [x, y] = [pixel % width, Math.floor(pixel / width)];
    const isStroke = pattern(x % PERIOD_PX, y % PERIOD_PX);
    data.set(isStroke ? [...INK, 255] : [255, 255, 255, 230], pixel * 4);
  }
  return { width, height: numbers.length / width, data };
}

/** The pattern of one rule, for a legend. */
export function reasonSwatch(code: CleaningCode, width: number, height: number): Picture {
  return paintReasons(new Uint8Array(width * height).fill(ruleNumber(code)), width);
}

/** Scale of a value tile: value = offset + red x redFactor + green x greenFactor; red and green 0 where there is none. */
export interface ReasonEncoding {
  offset: number;
  redFactor: number;
  greenFactor: number;
}

/** Numbers of rules out of the RGBA pixels of a value tile of the channel `flags`. */
export function readReasons(rgba: ArrayLike<number>, { offset, redFactor, greenFactor }: ReasonEncoding): Uint8Array {
  const numbers = new Uint8Array(rgba.length / 4);
  for (let pixel = 0; pixel < numbers.length; pixel += 1) {
    const [red, green] = [rgba[pixel * 4]!, rgba[pixel * 4 + 1]!];
    if (red !== 0 || green !== 0) numbers[pixel] = Math.round(offset + red * redFactor + green * greenFactor);
  }
  return numbers;
}
