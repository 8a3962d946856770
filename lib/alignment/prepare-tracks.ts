import { DELAY_SETTINGS as SET } from "@/lib/alignment/delay-settings";
import { layAlongAxis, type Lane, type LaneTrack } from "@/lib/alignment/lane-track";
import { meanLanes } from "@/lib/alignment/mean-lanes";
import { findOppositePairs, type OppositePair } from "@/lib/alignment/opposite-pairs";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import { axialDifferenceDeg, axialMean, wrapDegrees } from "@/lib/geo/circular-mean";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { implementWidthM } from "@/lib/rows/row-geometry";
import { median } from "@/lib/statistics/median";

export interface PreparedTracks {
  tracks: LaneTrack[];
  /** Not yet cleaned, one list a track. */
  lanes: Lane[][];
  pairs: OppositePair[];
  /** Of the grid along the axis. */
  stepM: number;
  /** Rounds of smoothing that suit the spacing of records. */
  smoothings: number;
  /** A flow in kg/s grows with speed; it is compared for each metre driven. */
  isFlow: boolean;
  /** Passes left out because there were more than need be. */
  leftOut: number;
}

/** Passes whose lines differ by more than this do not run beside each other. */
const SAME_AXIS_DEG = 5;
const STEP_M = { least: 1, most: 2 };

/** Passes along shared axes, the rows averaged to lanes, and the pairs of opposite neighbours among them. */
export function prepareTracks(placed: PlacedLog, channel: ResolvedChannel): PreparedTracks {
  const { passes, leftOut } = thinPasses(placed.passes);
  const prepared: PreparedTracks = {
    tracks: [],
    lanes: [],
    pairs: [],
    stepM: 1,
    smoothings: 1,
    isFlow: channel.unit === "kg/s",
    leftOut,
  };
  const widthM = implementWidthM(placed.geometry);
  for (const group of groupByAxis(passes)) {
    const axisDeg = axialMean(
      group.map((pass) => pass.headingDeg),
      group.map((pass) => pass.lengthM),
    )?.meanDeg;
    if (axisDeg === undefined) continue;
    const tracks = group.flatMap((pass) => layAlongAxis(placed, channel, pass, axisDeg) ?? []);
    const pairs = findOppositePairs(tracks, { widthM, overlapM: SET.leastOverlapM });
    const from = prepared.tracks.length;
    prepared.tracks.push(...tracks);
    prepared.pairs.push(
      ...pairs.map((pair) => ({ ...pair, forward: pair.forward + from, backward: pair.backward + from })),
    );
  }
  const inPairs = new Set(prepared.pairs.flatMap(({ forward, backward }) => [forward, backward]));
  prepared.lanes = prepared.tracks.map((track, index) =>
    inPairs.has(index) ? meanLanes(track, placed.geometry.offsetM, channel.perRow) : [],
  );
  // In order of the ground: neighbours in the list share a pass.
  prepared.pairs.sort((a, b) => middle(prepared, a) - middle(prepared, b));
  const spacingM = median(prepared.tracks.flatMap(({ fromM, toM, records }) => (toM - fromM) / (records - 1)));
  prepared.stepM = Math.max(STEP_M.least, Math.min(STEP_M.most, spacingM || STEP_M.least));
  prepared.smoothings = Math.max(1, Math.min(8, Math.round((prepared.stepM / spacingM) ** 2) || 1));
  return prepared;
}

function middle({ tracks }: PreparedTracks, { forward, backward }: OppositePair): number {
  return tracks[forward]!.acrossM + tracks[backward]!.acrossM;
}

/** Runs of neighbouring passes, evenly over the log, where there are more records than need be compared. */
function thinPasses(passes: readonly Pass[]): { passes: Pass[]; leftOut: number } {
  const records = passes.reduce((sum, pass) => sum + pass.records, 0);
  if (records <= SET.mostRecords) return { passes: [...passes], leftOut: 0 };
  const RUN = 8;
  const every = records / SET.mostRecords;
  const kept = passes.filter((_, index) => {
    const run = Math.floor(index / RUN);
    return Math.floor((run + 1) / every) > Math.floor(run / every);
  });
  return { passes: kept, leftOut: passes.length - kept.length };
}

/** Passes of one direction, either way, together; the longest passes lead. */
function groupByAxis(passes: readonly Pass[]): Pass[][] {
  const groups: { axisDeg: number; passes: Pass[] }[] = [];
  const long = [...passes].filter((pass) => Number.isFinite(pass.headingDeg)).sort((a, b) => b.lengthM - a.lengthM);
  for (const pass of long) {
    const axisDeg = wrapDegrees(pass.headingDeg) % 180;
    const group = groups.find((known) => axialDifferenceDeg(known.axisDeg, axisDeg) <= SAME_AXIS_DEG);
    if (group) group.passes.push(pass);
    else groups.push({ axisDeg, passes: [pass] });
  }
  return groups.map((group) => group.passes.sort((a, b) => a.pass - b.pass));
}
