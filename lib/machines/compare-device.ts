import type { LoggedDevice } from "@/lib/ingest/log-format";
import { evenOffsetsM, measureDevice } from "@/lib/machines/describe-device";
import type { Machine } from "@/lib/machines/machine";

/** Differences up to this are how a tape was held. */
const AGREES_WITHIN_M = 0.05;

/** One way in which the machine chosen for a log is another than the one its file describes. */
export type DeviceDifference =
  | { kind: "not-a-seeder" }
  | { kind: "rows"; file: number; machine: number }
  | { kind: "width"; fileM: number; machineM: number }
  /** The row that lies furthest from where the file puts it; offsets right of the centre line. */
  | { kind: "offset"; row: number; fileM: number; machineM: number };

/** What does not agree by more than 5 cm; nothing where all does. Of machines with other rows only that is said. */
export function compareDevice(device: LoggedDevice, machine: Machine): DeviceDifference[] {
  if (machine.kind !== "seeder") return [{ kind: "not-a-seeder" }];
  const measures = measureDevice(device);
  if (machine.rowCount !== measures.rowCount) {
    return [{ kind: "rows", file: measures.rowCount, machine: machine.rowCount }];
  }
  const offsets = machine.rowOffsetsM ?? evenOffsetsM(machine.rowCount, machine.rowSpacingM);
  const differences: DeviceDifference[] = [];
  const machineM = (offsets.at(-1) ?? 0) - (offsets[0] ?? 0) + machine.rowSpacingM;
  if (Math.abs(machineM - measures.widthM) > AGREES_WITHIN_M) {
    differences.push({ kind: "width", fileM: measures.widthM, machineM });
  }
  const furthest = findFurthest(device.rowOffsetsM, offsets);
  if (furthest && Math.abs(furthest.fileM - furthest.machineM) > AGREES_WITHIN_M) {
    differences.push({ kind: "offset", ...furthest });
  }
  return differences;
}

function findFurthest(
  file: readonly number[],
  machine: readonly number[],
): { row: number; fileM: number; machineM: number } | null {
  let furthest: { row: number; fileM: number; machineM: number } | null = null;
  file.forEach((fileM, index) => {
    const machineM = machine[index] ?? NaN;
    const least = furthest ? Math.abs(furthest.fileM - furthest.machineM) : -1;
    if (Math.abs(fileM - machineM) > least) furthest = { row: index + 1, fileM, machineM };
  });
  return furthest;
}
