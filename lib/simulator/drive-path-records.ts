import { pointOnSegment, type PathSegment } from "@/lib/simulator/drive-path";
import type { SeededRandom } from "@/lib/simulator/seeded-random";
import type { SpeedOptions } from "@/lib/simulator/simulation-options";

/** Where the middle of the row line is at each record. All arrays have one entry a record. */
export interface Track {
  records: number;
  timeS: Float64Array;
  eastM: Float64Array;
  northM: Float64Array;
  headingRad: Float64Array;
  speedMps: Float64Array;
  /** Clockwise positive. */
  turnRateRadPerS: Float64Array;
  /** 0 while lifted. */
  pass: Int32Array;
}

/** Time in which the machine takes up a new speed. */
const SPEED_CHANGE_S = 1.5;

interface Drive {
  segments: PathSegment[];
  intervalS: number;
  speed: SpeedOptions;
  random: SeededRandom;
}

/** Drives the path at the set speed and notes a record every `intervalS` seconds. */
export function drivePathRecords({ segments, intervalS, speed, random }: Drive): Track {
  const rows: number[][] = [];
  const phase = 2 * Math.PI * random.uniform();
  let timeS = 0;
  let speedMps = speed.meanMps;
  let distanceM = 0;
  for (const segment of segments) {
    if (segment.pauseBeforeS > 0) {
      timeS += segment.pauseBeforeS;
      distanceM = 0;
    }
    while (distanceM < segment.lengthM) {
      const point = pointOnSegment(segment, distanceM);
      rows.push([
        timeS,
        point.eastM,
        point.northM,
        point.headingRad,
        speedMps,
        speedMps * segment.curvaturePerM,
        segment.pass,
      ]);
      const swing = speed.variationMps * Math.sin((2 * Math.PI * timeS) / speed.variationPeriodS + phase);
      const wanted = segment.pass > 0 ? speed.meanMps + swing : speed.meanMps * speed.turnShare;
      speedMps += (wanted - speedMps) * (1 - Math.exp(-intervalS / SPEED_CHANGE_S));
      timeS += intervalS;
      distanceM += speedMps * intervalS;
    }
    distanceM -= segment.lengthM;
  }
  return toTrack(rows);
}

function toTrack(rows: number[][]): Track {
  const column = (index: number): Float64Array => Float64Array.from(rows, (row) => row[index] ?? NaN);
  return {
    records: rows.length,
    timeS: column(0),
    eastM: column(1),
    northM: column(2),
    headingRad: column(3),
    speedMps: column(4),
    turnRateRadPerS: column(5),
    pass: Int32Array.from(column(6)),
  };
}
