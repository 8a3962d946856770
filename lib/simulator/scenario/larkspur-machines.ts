import type { Combine, Seeder } from "@/lib/machines/machine";

/** The drill of the invented Larkspur Flats farm, as run on the first day: its frame is a little too light. */
export const LARKSPUR_DRILL: Seeder = {
  kind: "seeder",
  name: "24-row no-till drill",
  rowCount: 24,
  rowSpacingM: 0.25,
  sections: [6, 6, 6, 6],
  wings: [8, 8, 8],
  antennaToRowsM: 4.2,
  antennaRightM: 0,
  hitch: "rigid",
  rowUnitMassKg: 82,
  maxDownforceN: 1280,
  targetMarginN: 450,
  marginDeadbandN: 100,
  frame: {
    massKg: 2700,
    behindHitchM: 4,
    wheelsBehindHitchM: 4.5,
    rowsBehindHitchM: 5.2,
    ballast: [{ massKg: 250, behindHitchM: 4.8 }],
    minWheelLoadN: 1500,
  },
};

/** The same drill from the second day on: 1100 kg of ballast instead of 250 kg. */
export const LARKSPUR_DRILL_BALLASTED: Seeder = {
  ...LARKSPUR_DRILL,
  name: "24-row no-till drill, with more ballast",
  frame: {
    massKg: 2700,
    behindHitchM: 4,
    wheelsBehindHitchM: 4.5,
    rowsBehindHitchM: 5.2,
    ballast: [{ massKg: 1100, behindHitchM: 4.8 }],
    minWheelLoadN: 1500,
  },
};

/** The 8-row header of the invented farm's combine; its spreader throws less than half the cut. */
export const LARKSPUR_COMBINE: Combine = {
  kind: "combine",
  name: "8-row combine",
  headerWidthM: 6.096,
  headerRows: 8,
  spreadWidthM: 2.5,
};
