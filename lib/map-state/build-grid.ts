import type { Feature, FeatureCollection, LineString, Point } from "geojson";
import { worldPerMetre } from "@/lib/tiles/tile-address";
import { formatNumber } from "@/lib/units/format-quantity";

export interface GridRequest {
  /** West, south, east, north of the view. */
  bounds: [number, number, number, number];
  /** Pixels the view is wide. */
  widthPx: number;
  /** Where the close grid counts from. */
  anchor: [longitude: number, latitude: number];
  /** Length of the close grid's unit and its sign: 1 "m", or 0.3048 "ft". */
  unitM: number;
  unitSign: string;
}

export interface GridLabel {
  text: string;
  edge: "bottom" | "left";
}

export interface Grid {
  lines: FeatureCollection<LineString>;
  labels: FeatureCollection<Point, GridLabel>;
}

/** Lines stand at least this far apart on the screen. */
const LEAST_SPACING_PX = 90;
/** Views narrower than this count in metres or feet, wider ones in degrees. */
const WIDEST_CLOSE_VIEW_M = 30_000;
const DEGREE_STEPS = [45, 30, 20, 10, 5, 2, 1, 0.5, 0.2, 0.1];

interface Axis {
  /** Degrees a step, and where step 0 lies. */
  step: number;
  origin: number;
  labelOf: (index: number) => string;
}

/** A graticule for a view; close up, a grid of round distances from the anchor. */
export function buildGrid(request: GridRequest): Grid {
  const [west, south, east, north] = request.bounds;
  const { longitudes, latitudes } = chooseAxes(request);
  const lines: Feature<LineString>[] = [];
  const labels: Feature<Point, GridLabel>[] = [];
  for (const [longitude, text] of stepsWithin(longitudes, west, east)) {
    lines.push(lineBetween([longitude, south], [longitude, north]));
    labels.push(labelAt([longitude, south], { text, edge: "bottom" }));
  }
  for (const [latitude, text] of stepsWithin(latitudes, Math.max(-85, south), Math.min(85, north))) {
    lines.push(lineBetween([west, latitude], [east, latitude]));
    labels.push(labelAt([west, latitude], { text, edge: "left" }));
  }
  return {
    lines: { type: "FeatureCollection", features: lines },
    labels: { type: "FeatureCollection", features: labels },
  };
}

function chooseAxes({ bounds, widthPx, anchor, unitM, unitSign }: GridRequest): { longitudes: Axis; latitudes: Axis } {
  const [west, south, east, north] = bounds;
  const scale = worldPerMetre((south + north) / 2);
  const metresPerDegree = 1 / (scale.east * 360);
  const viewM = (east - west) * metresPerDegree;
  if (viewM > WIDEST_CLOSE_VIEW_M) {
    const leastStep = ((east - west) * LEAST_SPACING_PX) / widthPx;
    const step = [...DEGREE_STEPS].reverse().find((candidate) => candidate >= leastStep) ?? 90;
    const digits = step < 1 ? 1 : 0;
    return {
      longitudes: { step, origin: 0, labelOf: (i) => degreeWords(i * step, digits, "E", "W") },
      latitudes: { step, origin: 0, labelOf: (i) => degreeWords(i * step, digits, "N", "S") },
    };
  }
  const units = roundUp((viewM * LEAST_SPACING_PX) / widthPx / unitM);
  // A plain space: the map's font file has no thin one.
  const labelOf = (i: number) => `${formatNumber(i * units, 0).replaceAll("\u202f", " ")} ${unitSign}`;
  const stepM = units * unitM;
  const latitudeScale = worldPerMetre(anchor[1]);
  const degreesNorth = latitudeScale.north * 360 * Math.cos((anchor[1] * Math.PI) / 180);
  return {
    longitudes: { step: stepM * latitudeScale.east * 360, origin: anchor[0], labelOf },
    latitudes: { step: stepM * degreesNorth, origin: anchor[1], labelOf },
  };
}

/** The next of 1, 2, 5, 10, 20, 50 ... at or above a number. */
function roundUp(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  const digit = [1, 2, 5].find((candidate) => candidate * power >= least * (1 - 1e-9));
  return (digit ?? 10) * power;
}

function degreeWords(degrees: number, digits: number, positive: string, negative: string): string {
  const wrapped = positive === "E" ? ((((degrees + 180) % 360) + 360) % 360) - 180 : degrees;
  const sign = Math.abs(wrapped) < 1e-9 ? "" : ` ${wrapped > 0 ? positive : negative}`;
  return `${Math.abs(wrapped).toFixed(digits)}°${sign}`;
}

function* stepsWithin(axis: Axis, from: number, to: number): Generator<[degrees: number, text: string]> {
  for (let i = Math.ceil((from - axis.origin) / axis.step); axis.origin + i * axis.step <= to; i += 1) {
    yield [axis.origin + i * axis.step, axis.labelOf(i)];
  }
}

function lineBetween(from: [number, number], to: [number, number]): Feature<LineString> {
  return { type: "Feature", properties: {}, geometry: { type: "LineString", coordinates: [from, to] } };
}

function labelAt(at: [number, number], properties: GridLabel): Feature<Point, GridLabel> {
  return { type: "Feature", properties, geometry: { type: "Point", coordinates: at } };
}
