import { describe, expect, it } from "vitest";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { rowPlace } from "@/lib/simulator/describe-truth";
import { planTrack } from "@/lib/simulator/plan-track";
import { layOutRows } from "@/lib/simulator/row-layout";
import { resolveSimulationOptions, SIMULATION_DEFAULTS } from "@/lib/simulator/simulation-options";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";

describe("row positions", () => {
  it("stand behind the antenna by the machine's own measures, row 1 leftmost", () => {
    const machine = { ...SIMULATION_DEFAULTS.machine, antennaToRowsM: 3.3, antennaRightM: 0.4 };
    const input = { seed: 2, machine, headingDeg: 90, shape: { kind: "block", passes: 2, passLengthM: 60 } } as const;
    const { log } = simulateSeedingLog(input);
    const { track } = planTrack(resolveSimulationOptions(input));
    const plane = createLocalPlane(...SIMULATION_DEFAULTS.origin);
    const [antennaEastM, antennaNorthM] = plane.toPlane(log.longitude[10] ?? NaN, log.latitude[10] ?? NaN);
    const [eastM, northM] = rowPlace(track, layOutRows(machine), 10, 0);
    // Heading east: behind is west, left is north. Row 1 of 24 at 0.25 m is 2.875 m left of the middle.
    expect(eastM - antennaEastM).toBeCloseTo(-3.3, 5);
    expect(northM - antennaNorthM).toBeCloseTo(2.875 + 0.4, 5);
  });

  it("take a list of their own", () => {
    const machine = { ...SIMULATION_DEFAULTS.machine, rowCount: 2, rowOffsetsM: [-0.4, 0.3], rowForwardM: [0, -0.5] };
    const layout = layOutRows(machine);
    expect([...layout.offsetM]).toEqual([-0.4, 0.3]);
    expect([...layout.forwardM]).toEqual([0, -0.5]);
  });
});
