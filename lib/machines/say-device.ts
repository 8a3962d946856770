import type { LoggedDevice } from "@/lib/ingest/log-format";
import type { DeviceDifference } from "@/lib/machines/compare-device";
import { measureDevice } from "@/lib/machines/describe-device";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

/** A length as it stands in a note, which is kept for every reader, or in a person's units. */
export type SayLength = (lengthM: number, kind: "rowSpacing" | "distance") => string;

export const sayMetres: SayLength = (lengthM) => `${Number(lengthM.toFixed(3))} m`;

/** Lengths in a person's units. */
export function lengthsIn(system: UnitSystem): SayLength {
  return (lengthM, kind) => {
    const decimals = kind === "distance" ? 2 : undefined;
    return formatQuantity(lengthM, "m", system, { channel: kind, decimals }).text;
  };
}

/** What a file says about the machine that made it: "Larkspur drill: 24 rows 0.25 m apart, 6 m wide." */
export function sayDevice(device: LoggedDevice, say: SayLength): string {
  const { rowCount, rowSpacingM, widthM, isEven, isLevel } = measureDevice(device);
  const [first = 0, last = 0] = [device.rowOffsetsM[0], device.rowOffsetsM.at(-1)];
  const name = device.name.trim() === "" ? "Its machine" : device.name.trim();
  const sentences = [
    `${name}: ${rowCount} rows ${say(rowSpacingM, "rowSpacing")} apart, ${say(widthM, "distance")} wide.`,
  ];
  if (!isEven) {
    const ends = `row 1 stands ${side(first, say)} and row ${rowCount} ${side(last, say)} its centre line`;
    sentences.push(`They do not stand evenly about the middle: ${ends}.`);
  }
  if (!isLevel) sentences.push("They stand in more than one line, one ahead of the other.");
  const { rowsBehindReferenceM: behindM } = device;
  if (behindM !== null) {
    const where = `${say(Math.abs(behindM), "distance")} ${behindM < 0 ? "ahead of" : "behind"}`;
    sentences.push(
      `The rows stand ${where} the machine's own reference point; where the antenna sits, the file does not say.`,
    );
  }
  return sentences.join(" ");
}

function side(offsetM: number, say: SayLength): string {
  return `${say(Math.abs(offsetM), "distance")} ${offsetM < 0 ? "left of" : "right of"}`;
}

/** One difference between the file's description and the machine chosen for it. */
export function sayDifference(difference: DeviceDifference, say: SayLength): string {
  switch (difference.kind) {
    case "not-a-seeder":
      return "The file describes a machine with rows, and the chosen machine is a combine.";
    case "rows":
      return `The file describes ${difference.file} rows, the chosen machine has ${difference.machine}.`;
    case "width":
      return `The file's machine is ${say(difference.fileM, "distance")} wide, the chosen one ${say(difference.machineM, "distance")}.`;
    case "offset":
      return `Row ${difference.row} stands ${side(difference.fileM, say)} the middle by the file, ${side(difference.machineM, say)} it by the chosen machine.`;
  }
}
