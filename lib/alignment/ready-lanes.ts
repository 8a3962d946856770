import { cleanLane } from "@/lib/alignment/clean-lane";
import { DELAY_SETTINGS as SET } from "@/lib/alignment/delay-settings";
import { placesBefore } from "@/lib/alignment/lay-on-grid";
import type { Lane } from "@/lib/alignment/lane-track";
import type { PreparedTracks } from "@/lib/alignment/prepare-tracks";

/**
 * Lanes ready to be compared when the channel is about `delayS` late: without the ends of each pass, which a late channel
 * fills with readings from before it (an early one with readings from after it), and a flow divided by the speed at which
 * the ground was worked.
 */
export function readyLanes({ tracks, lanes, smoothings, isFlow }: PreparedTracks, delayS: number): Lane[][] {
  return lanes.map((ofTrack, index) => {
    const { timeS, speedMps } = tracks[index]!;
    const from = Math.max(0, delayS) + SET.endS;
    const to = timeS[timeS.length - 1]! - Math.max(0, -delayS) - SET.endS;
    const isKept = Uint8Array.from(timeS, (time) => (time >= from && time <= to ? 1 : 0));
    const speeds = isFlow ? placesBefore(timeS, speedMps, delayS) : null;
    return ofTrack.map((lane) => {
      const values = speeds ? lane.values.map((value, at) => value / Math.max(0.1, speeds[at]!)) : lane.values;
      return { ...lane, values: cleanLane(values, isKept, { outlierSds: SET.outlierSds, smoothings }) };
    });
  });
}
