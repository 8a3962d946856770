/** What a form asks of a machine, in the order it is asked. Words and where to find the number. */
export interface QuantityQuestion {
  key: string;
  label: string;
  hint?: string;
  unit: "m" | "N" | "kg";
  /** Measured with a ruler: millimetres or inches. */
  ruler?: boolean;
}

export const PLACING_QUESTIONS: QuantityQuestion[] = [
  { key: "rowSpacingM", label: "Row spacing", unit: "m", ruler: true },
  {
    key: "antennaToRowsM",
    label: "Antenna to rows",
    hint: "How far the line of rows lies behind the antenna, along the travel.",
    unit: "m",
  },
  {
    key: "antennaRightM",
    label: "Antenna right of the centre",
    hint: "0 in the middle; negative if it sits left.",
    unit: "m",
  },
];

export const TRAILED_QUESTIONS: QuantityQuestion[] = [
  {
    key: "antennaToHitchM",
    label: "Antenna to hitch pin",
    hint: "How far the pin lies behind the antenna.",
    unit: "m",
  },
  { key: "hitchToRowsM", label: "Hitch pin to rows", unit: "m" },
];

export const ROW_UNIT_QUESTIONS: QuantityQuestion[] = [
  {
    key: "rowUnitMassKg",
    label: "Mass of one row unit",
    hint: "With an average fill of seed. See the manual.",
    unit: "kg",
  },
  {
    key: "maxDownforceN",
    label: "Most downforce it can apply",
    hint: "Rows this close to it are reported as at their limit.",
    unit: "N",
  },
  { key: "targetMarginN", label: "Target margin", hint: "Load that should be left on the gauge wheel.", unit: "N" },
  {
    key: "marginDeadbandN",
    label: "Leeway under the target",
    hint: "Rows count as under target below target less this.",
    unit: "N",
  },
];

export const FRAME_QUESTIONS: QuantityQuestion[] = [
  { key: "frame.massKg", label: "Mass of frame and tanks", unit: "kg" },
  { key: "frame.behindHitchM", label: "Its centre behind the hitch", unit: "m" },
  { key: "frame.wheelsBehindHitchM", label: "Carrying wheels behind the hitch", unit: "m" },
  { key: "frame.rowsBehindHitchM", label: "Rows behind the hitch", unit: "m" },
  { key: "frame.minWheelLoadN", label: "Least load to keep on the wheels", unit: "N" },
];

export const COMBINE_QUESTIONS: QuantityQuestion[] = [
  { key: "headerWidthM", label: "Header width", unit: "m" },
  {
    key: "spreadWidthM",
    label: "Width the residue is spread over",
    hint: "As measured on the ground, if somebody did.",
    unit: "m",
  },
];
