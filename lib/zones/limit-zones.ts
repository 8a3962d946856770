import { distanceAlongPasses } from "@/lib/cleaning/rule-mask";
import { AppError } from "@/lib/errors";
import { cutAtAntimeridian, unwrapPositions } from "@/lib/geo/cut-at-antimeridian";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { passSteps, type PassStep } from "@/lib/rows/pass-members";
import { rowDistances } from "@/lib/rows/row-distances";
import type { LimitZone, LimitZonesBody, ZonePatch } from "@/lib/schemas/limit-zones";
import { limitMask, type LimitChoice, type LimitMask } from "@/lib/zones/limit-mask";
import { mergePatches } from "@/lib/zones/merge-patches";
import { ringMeets, type Bbox } from "@/lib/zones/plane-window";
import { rowTracks, type RowTrack } from "@/lib/zones/row-track";
import { classRuns, type ClassRun } from "@/lib/zones/runs";
import { outerStrip, outlinePass } from "@/lib/zones/strip-polygon";
import { DEFAULT_ZONE_LENGTH_M, OUTLINE_TOLERANCE_M, readNumbers, secondsAt, zoneRing } from "@/lib/zones/zones";

export interface LimitZoneOptions extends Omit<LimitChoice, "distances"> {
  minLengthM?: number;
  bbox?: Bbox;
  distances?: Float32Array;
}

/**
 * Stretches of rows past a limit as polygons, the patches they make with their neighbours, and what they come to. A stretch
 * is past the limit where most readings of a window of half the least length are; shorter stretches go to what is about them.
 * @throws AppError unprocessable where the log or its machine cannot tell.
 */
export function buildLimitZones(placed: PlacedLog, options: LimitZoneOptions): LimitZonesBody {
  const distances = options.distances ?? rowDistances(placed);
  const found = limitMask(placed, { ...options, distances });
  if (!found.ok) throw new AppError("unprocessable", found.error, { detailCode: "channel_not_available" });
  const minLengthM = options.minLengthM ?? DEFAULT_ZONE_LENGTH_M;
  const from: Source = { placed, distances, minLengthM, found: found.value, alongM: distanceAlongPasses(placed) };
  const totals = { lengthM: 0, workedM2: 0, pastM: 0 };
  const passes = placed.passes.map((pass) => passZones(from, pass, totals));
  const patched = numberPatches(passes, totals.workedM2);
  const shown = options.bbox ? withinBox(patched, options.bbox) : patched;
  const areaM2 = patched.features.reduce((sum, { properties }) => sum + properties.areaM2, 0);
  return {
    type: "FeatureCollection",
    kind: options.kind,
    channel: found.value.channel.id,
    unit: found.value.channel.unit,
    threshold: found.value.threshold,
    minLengthM,
    ...shown,
    totals: {
      zones: patched.features.length,
      lengthM: patched.features.reduce((sum, { properties }) => sum + properties.lengthM, 0),
      areaM2,
      workedM2: totals.workedM2,
      shareOfWorked: shareOf(areaM2, totals.workedM2),
      shareOfDistance: shareOf(totals.pastM, totals.lengthM),
    },
  };
}

interface Source {
  placed: PlacedLog;
  distances: Float32Array;
  minLengthM: number;
  found: LimitMask;
  alongM: Float64Array;
}

interface Totals {
  lengthM: number;
  workedM2: number;
  pastM: number;
}

interface PassZones {
  features: LimitZone[];
  patches: ZonePatch[];
}

const shareOf = (part: number, whole: number) => (whole > 0 ? part / whole : null);

/** Zones and patches of one pass, both numbered from 0; adds what the pass worked to `totals`. */
function passZones(from: Source, pass: Pass, totals: Totals): PassZones {
  const { placed, distances, found, minLengthM } = from;
  const steps = passSteps(placed, pass).filter((step) => step.before >= 0 || step.after >= 0);
  if (steps.length === 0) return { features: [], patches: [] };
  const masks = rowTracks({ placed, channel: found.mask, distances }, pass, steps);
  for (const track of masks) addTotals(totals, track, placed.geometry.widthM[track.row - 1]!);
  const runs = masks.flatMap((track) =>
    classRuns(track, { breaks: [0.5], minLengthM })
      .filter((run) => run.class === 1)
      .map((run) => ({ row: track.row, run, first: run.first, last: run.last })),
  );
  if (runs.length === 0) return { features: [], patches: [] };
  const readings = rowTracks({ placed, channel: found.channel, distances }, pass, steps);
  const outline = outlinePass(placed, steps, { outer: outerStrip(placed), toleranceM: OUTLINE_TOLERANCE_M });
  const numbers = mergePatches(runs);
  const features = runs.map(({ row, run }, k) => {
    const track = readings[row - 1]!;
    const ring = zoneRing({ placed, outline }, track, run);
    return zoneFeature(from, { track, run, steps, patch: numbers[k]!, geometry: cutAtAntimeridian([ring]) });
  });
  const patches = Array.from({ length: Math.max(...numbers) + 1 }, (_, patch) => {
    const members = runs.filter((_run, k) => numbers[k] === patch);
    return describePatch(from, {
      pass,
      steps,
      patch,
      members,
      zones: features.filter((_zone, k) => numbers[k] === patch),
    });
  });
  return { features, patches };
}

function addTotals(totals: Totals, { values, lengthsM }: RowTrack, widthM: number): void {
  values.forEach((value, k) => {
    if (Number.isNaN(value)) return;
    totals.lengthM += lengthsM[k]!;
    totals.workedM2 += lengthsM[k]! * widthM;
    totals.pastM += lengthsM[k]! * value;
  });
}

interface ZoneParts {
  track: RowTrack;
  run: ClassRun;
  steps: readonly PassStep[];
  patch: number;
  geometry: LimitZone["geometry"];
}

function zoneFeature({ placed }: Source, { track, run, steps, patch, geometry }: ZoneParts): LimitZone {
  return {
    type: "Feature",
    geometry,
    properties: {
      row: track.row,
      pass: track.pass.pass,
      patch,
      lengthM: run.lengthM,
      areaM2: run.lengthM * placed.geometry.widthM[track.row - 1]!,
      shareOfWorked: null,
      ...readNumbers(track, run, false),
      startS: secondsAt(placed, steps[run.first]!.record),
      endS: secondsAt(placed, steps[run.last]!.record),
    },
  };
}

interface PatchParts {
  pass: Pass;
  steps: readonly PassStep[];
  patch: number;
  members: readonly { row: number; first: number; last: number }[];
  zones: readonly LimitZone[];
}

function describePatch({ alongM }: Source, { pass, steps, patch, members, zones }: PatchParts): ZonePatch {
  const first = Math.min(...members.map((member) => member.first));
  const last = Math.max(...members.map((member) => member.last));
  const along = (step: number) => alongM[steps[step]!.record]!;
  // A pass unrolled begins with its first record's cell, which reaches back as far as the next reaches on.
  const leadM = steps.length > 1 ? along(1) - along(0) : 0;
  const fromM = first > 0 ? along(first - 1) + leadM : 0;
  const toM = along(last) + leadM;
  const rows = members.map(({ row }) => row);
  const areaM2 = zones.reduce((sum, { properties }) => sum + properties.areaM2, 0);
  const known = zones.flatMap(({ properties: { mean, lengthM } }) => (mean === null ? [] : [{ mean, lengthM }]));
  const weight = known.reduce((sum, { lengthM }) => sum + lengthM, 0);
  return {
    patch,
    pass: pass.pass,
    firstRow: Math.min(...rows),
    lastRow: Math.max(...rows),
    fromM,
    toM,
    lengthM: toM - fromM,
    areaM2,
    shareOfWorked: null,
    mean: weight > 0 ? known.reduce((sum, { mean, lengthM }) => sum + mean * lengthM, 0) / weight : null,
    zones: zones.length,
    bbox: boxOf(zones),
  };
}

function boxOf(zones: readonly LimitZone[]): ZonePatch["bbox"] {
  const rings = zones.flatMap(({ geometry }) =>
    geometry.type === "Polygon" ? geometry.coordinates : geometry.coordinates.flat(),
  );
  const corners = unwrapPositions(rings.flat());
  const [lons, lats] = [corners.map(([lon = NaN]) => lon), corners.map(([, lat = NaN]) => lat)];
  const wrap = (lon: number) => (lon > 180 ? lon - 360 : lon < -180 ? lon + 360 : lon);
  const least = (values: number[]) => values.reduce((low, value) => Math.min(low, value), Infinity);
  const most = (values: number[]) => values.reduce((high, value) => Math.max(high, value), -Infinity);
  return [wrap(least(lons)), least(lats), wrap(most(lons)), most(lats)];
}

/** Patches numbered through the log from 1, the largest first; shares filled in. */
function numberPatches(passes: readonly PassZones[], workedM2: number): PassZones {
  const all = passes.flatMap(({ patches }, k) => patches.map((patch) => ({ patch, key: `${k}:${patch.patch}` })));
  const sorted = all.toSorted((a, b) => b.patch.areaM2 - a.patch.areaM2);
  const numbers = new Map(sorted.map(({ key }, k) => [key, k + 1]));
  return {
    patches: sorted.map(({ patch, key }) => ({
      ...patch,
      patch: numbers.get(key)!,
      shareOfWorked: shareOf(patch.areaM2, workedM2),
    })),
    features: passes.flatMap(({ features }, k) =>
      features.map(({ properties, ...zone }) => {
        const patch = numbers.get(`${k}:${properties.patch}`)!;
        return { ...zone, properties: { ...properties, patch, shareOfWorked: shareOf(properties.areaM2, workedM2) } };
      }),
    ),
  };
}

/** Zones that meet a window, with the patches they belong to; a patch stays whole. */
function withinBox({ features, patches }: PassZones, bbox: Bbox): PassZones {
  const meets = ({ geometry }: LimitZone) => {
    const rings = geometry.type === "Polygon" ? geometry.coordinates : geometry.coordinates.flat();
    return rings.some((ring) => ringMeets(ring, bbox));
  };
  const shown = features.filter(meets);
  const wanted = new Set(shown.map(({ properties }) => properties.patch));
  return { features: shown, patches: patches.filter(({ patch }) => wanted.has(patch)) };
}
