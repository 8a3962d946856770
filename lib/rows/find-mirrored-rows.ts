import type { MultiPolygon, Polygon } from "geojson";
import { boundaryInPlane } from "@/lib/geo/boundary-in-plane";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fitSlope, intoFrame } from "@/lib/rows/edge-slope";
import { boundarySlope, neighbourSlope, workedSlope, type PassEnd } from "@/lib/rows/expected-slopes";
import { findRowEdges, type RowEdge } from "@/lib/rows/row-edges";
import { implementWidthM } from "@/lib/rows/row-geometry";

export interface MirroredRows {
  state: "mirrored" | "as-logged" | "cannot-tell";
  evidence: {
    /** Ends of passes at which the rows switched one after the other along an angled edge. */
    runs: number;
    /** Of those, how many fit the rows as they are logged, and how many fit them mirrored left to right. */
    agreeing: number;
    opposing: number;
  };
  /** In words. */
  reason: string;
}

/** With fewer rows left and right cannot be told apart. */
export const FEWEST_ROWS = 4;
const FEWEST_RUNS = 6;
/** So large a share of the runs must agree on one side. Six of six fall that way by chance once in 32. */
const AGREED_SHARE = 0.85;
/** An edge nearer to square than about 8 degrees tells nothing. */
const FLATTEST_SLOPE = 0.14;
/** Rows must be spread along the travel by this many steps between records. */
const FEWEST_STEPS = 2;
/** The line through the rows' switching places must explain this share of their spread. */
const FEWEST_EXPLAINED = 0.6;
/** Steeper or flatter than the edge by more than this, the rows followed something else. */
const SLOPES_ALIKE = 3;

/**
 * Tells whether the rows of a log are mirrored left to right. At an angled edge (the boundary, ground worked before, or the
 * line through the ends of neighbouring passes) sections switch one after the other: with rows as logged their switching
 * places slope as the edge does, mirrored they slope the other way. Method of this program; late or early switching moves
 * all rows alike and changes no slope. Cost: about the records of the passes' ends times rows, and ends times passes.
 */
export function findMirroredRows(placed: PlacedLog, boundary: Polygon | MultiPolygon | null): MirroredRows {
  if (placed.geometry.rows < FEWEST_ROWS || !placed.log.channels.some((channel) => channel.perRow)) {
    return cannotTell(`Left and right cannot be told apart with fewer than ${FEWEST_ROWS} rows logged one by one.`);
  }
  const edges = findRowEdges(placed).filter((edge) => edge.eastM.length >= FEWEST_ROWS);
  const votes = countVotes(placed, edges, boundary ? boundaryInPlane(boundary, placed.plane) : []);
  return judge(votes);
}

interface Votes {
  /** Ends at which the rows did not switch all at once. */
  staggered: number;
  agreeing: number;
  opposing: number;
}

function countVotes(placed: PlacedLog, edges: readonly RowEdge[], rings: [number, number][][]): Votes {
  const widthM = implementWidthM(placed.geometry);
  const reach = { widthM, offsetM: placed.geometry.offsetM };
  const ends = edges.map(middleOf);
  const votes = { staggered: 0, agreeing: 0, opposing: 0 };
  edges.forEach((edge, k) => {
    const seen = seenSlope(edge, ends[k]!, widthM);
    if (seen === null) return;
    votes.staggered++;
    const expected =
      workedSlope(placed, ends[k]!, reach) ??
      boundarySlope(rings, ends[k]!, reach) ??
      neighbourSlope(ends, ends[k]!, reach);
    if (expected === null || Math.abs(expected) < FLATTEST_SLOPE) return;
    const ratio = Math.abs(seen / expected);
    if (ratio > SLOPES_ALIKE || ratio < 1 / SLOPES_ALIKE) return;
    if (seen * expected > 0) votes.agreeing++;
    else votes.opposing++;
  });
  return votes;
}

function middleOf(edge: RowEdge): PassEnd {
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const frame = { eastM: mean(edge.eastM), northM: mean(edge.northM), headingDeg: edge.headingDeg };
  return { pass: edge.pass.pass, startedAtMs: edge.pass.startedAtMs, end: edge.end, frame };
}

/** Slope of the rows' own switching places; null where they switched (nearly) at once or in no order. */
function seenSlope(edge: RowEdge, { frame }: PassEnd, widthM: number): number | null {
  const line = fitSlope(edge.eastM.map((east, k) => intoFrame(frame, east, edge.northM[k]!)));
  if (!line || Math.abs(line.slope) < FLATTEST_SLOPE || !(line.explained >= FEWEST_EXPLAINED)) return null;
  return Math.abs(line.slope) * widthM >= FEWEST_STEPS * edge.stepM ? line.slope : null;
}

function judge({ staggered, agreeing, opposing }: Votes): MirroredRows {
  const runs = agreeing + opposing;
  const evidence = { runs, agreeing, opposing };
  if (staggered === 0) {
    return cannotTell("The rows begin and end all at once in every pass, so nothing tells left from right.");
  }
  if (runs < FEWEST_RUNS) {
    const reason =
      `Only ${runs} ${runs === 1 ? "end of a pass shows" : "ends of passes show"} rows switching one after the other ` +
      `along an angled edge; ${FEWEST_RUNS} are needed to tell left from right.`;
    return { state: "cannot-tell", evidence, reason };
  }
  if (agreeing >= AGREED_SHARE * runs) {
    const reason = `At ${agreeing} of ${runs} angled ends the rows switch in the order they are logged in.`;
    return { state: "as-logged", evidence, reason };
  }
  if (opposing >= AGREED_SHARE * runs) {
    const reason =
      `At ${opposing} of ${runs} angled ends the rows switch in the opposite order: those logged on the left fit the ` +
      "ground on the right.";
    return { state: "mirrored", evidence, reason };
  }
  const reason = `The angled ends of passes disagree: ${agreeing} fit the rows as logged, ${opposing} fit them mirrored.`;
  return { state: "cannot-tell", evidence, reason };
}

function cannotTell(reason: string): MirroredRows {
  return { state: "cannot-tell", evidence: { runs: 0, agreeing: 0, opposing: 0 }, reason };
}
