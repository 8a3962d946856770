import { rowPlace } from "@/lib/simulator/describe-truth";
import type { Track } from "@/lib/simulator/drive-path-records";
import { fieldRing } from "@/lib/simulator/field-ring";
import { spanOfLine } from "@/lib/simulator/plan-passes";
import type { PlannedTrack } from "@/lib/simulator/plan-track";
import type { RowLayout } from "@/lib/simulator/row-layout";
import type { SimulationOptions } from "@/lib/simulator/simulation-options";

interface Inputs {
  options: SimulationOptions;
  planned: PlannedTrack;
  layout: RowLayout;
}

/** 1 where a row's section is switched on, laid out like a channel; null where the machine has no section control. */
export function switchSections({ options, planned, layout }: Inputs): Uint8Array | null {
  const control = options.sectionControl;
  if (!control) return null;
  const { track, axes, plane } = planned;
  const ring = fieldRing(options, plane, axes);
  const isOn = new Uint8Array(track.records * layout.rows);
  const late = Math.round(control.delayS / options.recordIntervalS);
  for (let record = 0; record < track.records; record++) {
    const seen = record - late >= 0 && track.pass[record - late] === track.pass[record] ? record - late : record;
    for (let first = 0; first < layout.rows; first += control.rowsPerSection) {
      const end = Math.min(layout.rows, first + control.rowsPerSection);
      const [alongM, acrossM] = axes.fromPlane(...sectionPlace(track, layout, { record: seen, first, end }));
      const [fromM, toM] = spanOfLine(ring, acrossM);
      const inside = alongM >= fromM + options.headlandM && alongM <= toM - options.headlandM;
      if (inside) isOn.fill(1, record * layout.rows + first, record * layout.rows + end);
    }
  }
  return isOn;
}

/** The middle of a section. */
function sectionPlace(
  track: Track,
  layout: RowLayout,
  { record, first, end }: { record: number; first: number; end: number },
): [number, number] {
  const [eastA, northA] = rowPlace(track, layout, record, first);
  const [eastB, northB] = rowPlace(track, layout, record, end - 1);
  return [(eastA + eastB) / 2, (northA + northB) / 2];
}
