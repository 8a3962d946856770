/** How a written log words, measures and punctuates itself. The words are plain trade words of our own. */
export interface FileStyle {
  /** `short`: `DF_07_lbf`. `plain`: `Downforce row 7 (lbf)`. */
  naming: "short" | "plain";
  force: "N" | "daN" | "kgf" | "lbf";
  depth: "m" | "cm" | "mm" | "in";
  speed: "m/s" | "km/h" | "mph";
  time: "iso8601" | "unix-s" | "unix-ms";
  delimiter: "," | ";" | "\t";
  decimalComma: boolean;
  byteOrderMark: boolean;
  newline: "\n" | "\r\n";
  /** Decimals of longitude and latitude; 8 are about 1 mm. */
  positionDecimals: number;
  /** Decimals of forces in the chosen unit. */
  forceDecimals: number;
  /** A column whose meaning the file does not tell, or null: a slow saw-tooth of small whole numbers. */
  unexplainedColumn: string | null;
}

export const FILE_STYLE_DEFAULTS: FileStyle = {
  naming: "plain",
  force: "N",
  depth: "mm",
  speed: "m/s",
  time: "iso8601",
  delimiter: ",",
  decimalComma: false,
  byteOrderMark: false,
  newline: "\n",
  positionDecimals: 8,
  forceDecimals: 0,
  unexplainedColumn: null,
};

/** Units of one SI unit. 1 lbf = 4.4482216152605 N, 1 kgf = 9.80665 N, 1 in = 0.0254 m, 1 mi = 1609.344 m (NIST SP 811). */
export const PER_SI_UNIT = {
  N: 1,
  daN: 0.1,
  kgf: 1 / 9.80665,
  lbf: 1 / 4.4482216152605,
  m: 1,
  cm: 100,
  mm: 1000,
  in: 1 / 0.0254,
  "m/s": 1,
  "km/h": 3.6,
  mph: 3600 / 1609.344,
} as const;

/** Decimals that keep about 0.1 mm of depth and 1 cm/s of speed in each unit. */
export const DEPTH_DECIMALS = { m: 4, cm: 2, mm: 1, in: 3 } as const;
export const SPEED_DECIMALS = { "m/s": 2, "km/h": 2, mph: 2 } as const;
