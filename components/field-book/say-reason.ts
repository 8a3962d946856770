import { formatQuantity } from "@/lib/units/format-quantity";
import type { UnitSystem } from "@/lib/units/display-unit";

interface ReasonUnits {
  /** SI unit of the channel, as the sentence has it. */
  unit: string;
  channel: string;
  system: UnitSystem;
}

/** Why a row stands out, with the amount in the person's units: the API's own sentence is in SI ("Typically 151 N below …"). */
export function sayReason(reason: string, { unit, channel, system }: ReasonUnits): string {
  return reason.replace(/^(Typically )(-?[\d.]+) (\S+)(?= (?:below|above) )/, (whole, start: string, amount, said) =>
    said === unit ? `${start}${formatQuantity(Number(amount), unit, system, { channel }).text}` : whole,
  );
}
