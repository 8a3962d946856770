import { simulateSeedingLog, type SimulatedLog } from "@/lib/simulator/simulate-seeding-log";
import type { SimulationInput } from "@/lib/simulator/simulation-options";

/** Eight rows, four passes: small enough to read by eye, large enough for row statistics. Row 6 is worn. */
const SMALL: SimulationInput = {
  seed: 7001,
  machine: {
    kind: "seeder",
    name: "8-row plot drill",
    rowCount: 8,
    rowSpacingM: 0.25,
    antennaToRowsM: 2.5,
    antennaRightM: 0.2,
    hitch: "rigid",
    rowUnitMassKg: 82,
    maxDownforceN: 1280,
    targetMarginN: 450,
    marginDeadbandN: 100,
  },
  origin: [-98.6124, 38.4171],
  shape: { kind: "block", passes: 4, passLengthM: 60 },
  headingDeg: 20,
  headlandM: 10,
  turnRadiusM: 3,
  bands: { headingDeg: 0, periodM: 6.096, widthM: 2.5, sideShiftM: 0, contrastN: 240, through: [-98.6124, 38.4171] },
  wornRow: { row: 6, extraForceN: 200, marginLossN: 140 },
  missingShare: 0.004,
};

export function createFixtureLog(): SimulatedLog {
  return simulateSeedingLog(SMALL);
}

/** The facts of a simulated log that a reader of its file must find again, as JSON. */
export function describeFixtureTruth({ log, truth }: SimulatedLog): string {
  const { machine, startedAt } = truth.options;
  const facts = {
    kind: log.kind,
    records: log.records,
    rows: log.rows,
    startedAt,
    machine,
    channels: truth.channels,
    passes: truth.passes,
    coverage: truth.coverage,
    bands: truth.bands,
    inBandShare: truth.inBandShare,
    wornRow: truth.wornRow,
    first: { longitude: log.longitude[0], latitude: log.latitude[0], timeMs: log.timeMs[0] },
  };
  return JSON.stringify(facts, roundNumber, 2) + "\n";
}

/** Ten significant digits: no difference in the last bits of a sine may change the file. */
function roundNumber(_key: string, value: unknown): unknown {
  return typeof value === "number" ? Number(value.toPrecision(10)) : value;
}
