import { LARKSPUR, LARKSPUR_NEXT_DAY, type LarkspurField, type LarkspurLog } from "@/lib/simulator/scenario/larkspur";
import { type HarvestInput, simulateHarvestLog } from "@/lib/simulator/simulate-harvest-log";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import type { SimulationInput } from "@/lib/simulator/simulation-options";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";

/** One file of the demo, ready to be uploaded onto its field. */
export interface LarkspurFile {
  fieldKey: LarkspurField["key"];
  kind: "seeding" | "harvest";
  fileName: string;
  /** Name of the machine in `LARKSPUR.machines` that made it. */
  machineName: string;
  text: string;
}

/** The demo's logs, one at a time since each is some megabytes: harvest then seeding of each field. */
export function* writeLarkspurLogs(): Generator<LarkspurFile> {
  for (const { key, harvest, seeding } of LARKSPUR.fields) {
    yield harvestFile(key, harvest);
    yield seedingFile(key, seeding);
  }
}

/** The example for people to drag in: about 1 700 records of 24 rows in pounds-force, inches and miles an hour. */
export function writeLarkspurNextDay(): LarkspurFile {
  return seedingFile(LARKSPUR_NEXT_DAY.fieldKey, LARKSPUR_NEXT_DAY);
}

function harvestFile(
  fieldKey: LarkspurField["key"],
  { fileName, input, style }: LarkspurLog<HarvestInput>,
): LarkspurFile {
  const { log } = simulateHarvestLog(input);
  return { fieldKey, kind: "harvest", fileName, machineName: input.combine.name, text: writeWideCsv(log, style) };
}

function seedingFile(
  fieldKey: LarkspurField["key"],
  { fileName, input, style }: LarkspurLog<SimulationInput>,
): LarkspurFile {
  const { log, truth } = simulateSeedingLog(input);
  const machineName = truth.options.machine.name;
  return { fieldKey, kind: "seeding", fileName, machineName, text: writeWideCsv(log, style) };
}
