import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { Seeder } from "@/lib/machines/machine";
import { trailHitch } from "@/lib/rows/trail-hitch";

/** Where the antenna went, in a plane; one entry a record. */
export interface AntennaTrack {
  eastM: Float64Array;
  northM: Float64Array;
  headingDeg: Float32Array;
  breaks: Uint8Array;
  /** 1 where the machine runs backwards. */
  backwards?: Uint8Array;
}

export interface RowLine {
  /** Where the implement's centre line meets the line of rows. */
  originEastM: Float64Array;
  originNorthM: Float64Array;
  /** Heading of the implement. */
  headingDeg: Float32Array;
  unsettled: Uint8Array | null;
  jackKnifed: Uint8Array | null;
}

/** Puts the line of rows on the ground for each record; the antenna itself where no machine is known. */
export function placeRows(track: AntennaTrack, machine: Seeder | null): RowLine {
  if (!machine) return behindAntenna(track, 0, 0);
  if (machine.hitch === "rigid") return behindAntenna(track, machine.antennaToRowsM, machine.antennaRightM);
  const hitchToRowsM = machine.hitchToRowsM ?? machine.antennaToRowsM;
  const antennaToHitchM = machine.antennaToHitchM ?? Math.max(0, machine.antennaToRowsM - hitchToRowsM);
  const hitch = behindAntenna(track, antennaToHitchM, machine.antennaRightM);
  const drawbarM = machine.frame?.wheelsBehindHitchM ?? hitchToRowsM;
  const path = {
    eastM: hitch.originEastM,
    northM: hitch.originNorthM,
    headingDeg: track.headingDeg,
    breaks: track.breaks,
    backwards: track.backwards,
  };
  const trailed = trailHitch(path, drawbarM);
  const behindHitch = {
    ...track,
    eastM: hitch.originEastM,
    northM: hitch.originNorthM,
    headingDeg: trailed.headingDeg,
  };
  return {
    ...behindAntenna(behindHitch, hitchToRowsM, 0),
    unsettled: trailed.unsettled,
    jackKnifed: trailed.jackKnifed,
  };
}

/** Moves each point back by `behindM` along its heading and left by `rightM`. */
function behindAntenna(track: AntennaTrack, behindM: number, rightM: number): RowLine {
  const records = track.eastM.length;
  const originEastM = new Float64Array(records);
  const originNorthM = new Float64Array(records);
  for (let i = 0; i < records; i++) {
    const heading = track.headingDeg[i]! * RADIANS_PER_DEGREE;
    const sin = Math.sin(heading);
    const cos = Math.cos(heading);
    originEastM[i] = track.eastM[i]! - behindM * sin - rightM * cos;
    originNorthM[i] = track.northM[i]! - behindM * cos + rightM * sin;
  }
  return { originEastM, originNorthM, headingDeg: track.headingDeg, unsettled: null, jackKnifed: null };
}
