import { axialDifferenceDeg, RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { LogNote, MachineLog } from "@/lib/logs/machine-log";
import type { Pass, RowGeometry } from "@/lib/logs/placed-log";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import { evenRowGeometry } from "@/lib/rows/row-geometry";
import { median } from "@/lib/statistics/median";

/** A row-crop spacing (30 inches), taken where nothing in the log hints at the width. Common practice, no source. */
const FALLBACK_ROW_SPACING_M = 0.762;

export interface GuessInput {
  log: MachineLog;
  passes: Pass[];
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  /** Working width of a machine that is named but has no row units, such as a combine's header. */
  workingWidthM?: number | null;
}

/**
 * Rows for a log whose machine nobody described, and the note that says how they were guessed: the logged swath width,
 * else the usual distance between neighbouring passes, else 0.762 m a row; spread evenly, straight under the antenna.
 * A machine that is named with its working width needs no note.
 */
export function guessRowGeometry(input: GuessInput): { geometry: RowGeometry; note?: LogNote } {
  const { rows } = input.log;
  if (input.workingWidthM) return { geometry: evenRowGeometry(rows, input.workingWidthM / rows) };
  const swathM = loggedSwathWidthM(input.log);
  const spacingM = swathM === null ? passSpacingM(input) : null;
  const widthM = swathM ?? spacingM ?? rows * FALLBACK_ROW_SPACING_M;
  const source =
    swathM !== null
      ? "the logged swath width"
      : spacingM !== null
        ? "the distance between neighbouring passes"
        : `a guess of ${FALLBACK_ROW_SPACING_M} m a row, since nothing in the log tells the width`;
  const message =
    `Nobody has said which machine made this log, so its ${rows} ${rows === 1 ? "row is" : "rows are"} spread evenly over ` +
    `${widthM.toFixed(2)} m (from ${source}), straight under the antenna. Choose the machine to put the rows where they ran.`;
  return {
    geometry: evenRowGeometry(rows, widthM / rows),
    note: { code: "machine-unknown", message, count: input.log.records },
  };
}

function loggedSwathWidthM(log: MachineLog): number | null {
  const channel = log.channels.find((candidate) => candidate.id === "swathWidth" && candidate.unit === "m");
  const usual = channel ? median(channel.values.filter((value) => value > 0)) : NaN;
  return Number.isFinite(usual) ? usual * (channel?.perRow ? log.rows : 1) : null;
}

/** Median distance across the main axis between neighbouring long passes; null with fewer than four of them. */
function passSpacingM(input: GuessInput): number | null {
  const axis = mainAxisDeg(input.passes);
  if (axis === null) return null;
  const right = axis * RADIANS_PER_DEGREE;
  const across = input.passes
    .filter((pass) => axialDifferenceDeg(pass.headingDeg, axis) <= 5 && pass.lengthM >= 20)
    .map((pass) => {
      const middle = pass.first + (pass.records >> 1);
      return input.eastM[middle]! * Math.cos(right) - input.northM[middle]! * Math.sin(right);
    })
    .filter((value) => Number.isFinite(value))
    .sort((a, b) => a - b);
  const gaps = across
    .slice(1)
    .map((value, k) => value - across[k]!)
    .filter((gap) => gap > 1);
  return gaps.length >= 3 ? median(gaps) : null;
}
