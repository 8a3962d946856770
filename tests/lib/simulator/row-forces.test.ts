import { describe, expect, it } from "vitest";
import { frameCapacityN, wheelLoadN } from "@/lib/simulator/frame-capacity";
import { SIMULATION_DEFAULTS } from "@/lib/simulator/simulation-options";
import { meanWhere, QUIET_BANDS, simulateQuiet, UNIT_WEIGHT_N, valuesOf } from "@/tests/lib/simulator/quiet-log";

const FLAT = { gradientEastNPerM: 0, gradientNorthNPerM: 0, noiseN: 0, noiseRangeM: 25 };
const FRAME = {
  massKg: 3000,
  behindHitchM: 4,
  wheelsBehindHitchM: 4.5,
  rowsBehindHitchM: 5.2,
  ballast: [{ massKg: 600, behindHitchM: 4.8 }],
  minWheelLoadN: 0,
};

describe("controller", () => {
  it("holds the target margin in active mode, with the force that the ground asks", () => {
    const quiet = simulateQuiet({ soil: { ...FLAT, noiseN: 60 }, bands: QUIET_BANDS });
    const { log, truth } = quiet;
    valuesOf(log, "margin").forEach((margin, at) => {
      if (truth.passOfRecord[Math.floor(at / 24)] !== 0) expect(Math.abs(margin - 450)).toBeLessThan(0.001);
    });
    // Hand-worked: 450 + 1150 - 804.145 N off the band.
    expect(450 + 1150 - UNIT_WEIGHT_N).toBeCloseTo(795.855, 3);
  });

  it("answers late by its lag", () => {
    const bands = { ...QUIET_BANDS, headingDeg: 90, periodM: 60, widthM: 10, sideShiftM: 30 };
    const lagged = simulateQuiet({ bands, controller: { mode: "active", lagS: 2, targetMarginN: 450 } });
    const { inBand, passOfRecord } = lagged.truth;
    const margin = valuesOf(lagged.log, "margin");
    // A row that has been off the band for 6 lags, then enters it: its error of 240 N shrinks by exp(-0.5 / 2) a record.
    let checked = 0;
    for (let record = 25; record < lagged.log.records; record += 1) {
      const before = Array.from({ length: 25 }, (_, back) => record - 1 - back);
      const settled = before.every((past) => passOfRecord[past] === passOfRecord[record] && inBand[past * 24] === 0);
      if (!settled || passOfRecord[record] === 0 || inBand[record * 24] !== 1) continue;
      expect(450 - (margin[record * 24] ?? NaN)).toBeCloseTo(240 * Math.exp(-0.25), 0);
      checked += 1;
    }
    expect(checked).toBeGreaterThan(0);
  });

  it("stops at its limit and loses margin there", () => {
    const quiet = simulateQuiet({
      machine: { ...SIMULATION_DEFAULTS.machine, maxDownforceN: 900 },
      bands: QUIET_BANDS,
    });
    const inside = (record: number, row: number): boolean => quiet.truth.inBand[record * 24 + row - 1] === 1;
    expect(meanWhere(quiet, "downforce", inside)).toBeCloseTo(900, 3);
    // Hand-worked: 900 + 804.145 - 1390.
    expect(meanWhere(quiet, "margin", inside)).toBeCloseTo(314.145, 2);
  });
});

describe("residue bands", () => {
  it("show in the force of an active system and not in its margin", () => {
    const quiet = simulateQuiet({ bands: QUIET_BANDS });
    expect(contrastOf(quiet, "downforce")).toBeCloseTo(240, 2);
    expect(contrastOf(quiet, "margin")).toBeCloseTo(0, 2);
  });

  it("show in the margin of a fixed system and not in its force", () => {
    const quiet = simulateQuiet({ bands: QUIET_BANDS, controller: { mode: "fixed", forceN: 850 } });
    expect(contrastOf(quiet, "downforce")).toBeCloseTo(0, 2);
    expect(contrastOf(quiet, "margin")).toBeCloseTo(-240, 2);
  });

  it("cover width / period of the ground", () => {
    const { truth } = simulateQuiet({ bands: QUIET_BANDS, shape: { kind: "block", passes: 12, passLengthM: 200 } });
    const share = truth.inBandShare.reduce((sum, one) => sum + one, 0) / 24;
    expect(Math.abs(share - 2.5 / 6.096)).toBeLessThan(0.01);
  });
});

describe("rows", () => {
  it("a worn row takes more force, loses margin and runs shallower", () => {
    const quiet = simulateQuiet({
      wornRow: { row: 17, extraForceN: 200, marginLossN: 350 },
      depth: { targetM: 0.045, fullDepthMarginN: 150, lossMPerN: 0.0001 },
    });
    const worn = (_: number, row: number): boolean => row === 17;
    const others = (_: number, row: number): boolean => row !== 17;
    expect(meanWhere(quiet, "downforce", worn) - meanWhere(quiet, "downforce", others)).toBeCloseTo(200, 2);
    expect(meanWhere(quiet, "margin", worn)).toBeCloseTo(100, 2);
    // Hand-worked: 50 N short of full depth at 0.1 mm a newton.
    expect(meanWhere(quiet, "depth", worn)).toBeCloseTo(0.04, 6);
    expect(meanWhere(quiet, "depth", others)).toBeCloseTo(0.045, 6);
  });

  it("wheel-track rows ask for more", () => {
    const quiet = simulateQuiet({ wheelTracks: { rows: [6, 19], effectN: 60 } });
    const inTrack = meanWhere(quiet, "downforce", (_, row) => row === 6 || row === 19);
    expect(inTrack - meanWhere(quiet, "downforce", (_, row) => row === 7)).toBeCloseTo(60, 2);
  });

  it("differ a little for good when asked to", () => {
    const quiet = simulateQuiet({ rowSpread: { resistanceN: 10, marginZeroN: 0 } });
    const effects = quiet.truth.rowEffectN;
    effects.forEach((effectN, index) => {
      const force = meanWhere(quiet, "downforce", (_, row) => row === index + 1);
      expect(Math.abs(force - (450 + 1150 - UNIT_WEIGHT_N + effectN))).toBeLessThan(0.01);
    });
    const sd = Math.sqrt(effects.reduce((sum, effect) => sum + effect ** 2, 0) / effects.length);
    // 24 draws with standard deviation 10: within 40 % of it.
    expect(Math.abs(sd - 10)).toBeLessThan(4);
  });

  it("speed asks for more force", () => {
    const speed = { meanMps: 2.4, variationMps: 0.4, variationPeriodS: 30, turnShare: 1, noiseMps: 0 };
    const quiet = simulateQuiet({ speed, speedEffectNPerMps: 100 });
    const logged = quiet.log.speedMps ?? new Float32Array();
    let checked = 0;
    logged.forEach((speedMps, record) => {
      if (quiet.truth.passOfRecord[record] === 0) return;
      const force = valuesOf(quiet.log, "downforce")[record * 24] ?? NaN;
      expect(Math.abs(force - (450 + 1150 - UNIT_WEIGHT_N + 100 * (speedMps - 2.4)))).toBeLessThan(0.01);
      checked += 1;
    });
    expect(checked).toBeGreaterThan(100);
  });

  it("force builds up over the start ramp", () => {
    const quiet = simulateQuiet({ startRamp: { lengthM: 10, fromShare: 0.5 } });
    const first = quiet.truth.passes[1]?.firstRecord ?? 0;
    const full = 450 + 1150 - UNIT_WEIGHT_N;
    expect(valuesOf(quiet.log, "downforce")[first * 24]).toBeCloseTo(full / 2, 2);
    expect(valuesOf(quiet.log, "downforce")[(first + 20) * 24]).toBeCloseTo(full, 2);
  });
});

describe("frame", () => {
  it("lifts at 1169 N a row in the worked example, and stands at 7467 N under 900 N a row", () => {
    // Hand-worked moment balance about the hitch pin.
    expect(frameCapacityN(FRAME) / 24).toBeCloseTo(1169.25, 1);
    expect(wheelLoadN(FRAME, 24 * 900)).toBeCloseTo(7467.3, 1);
  });

  it("keeps the headroom of the weakest stretches, lifted ones at minus the least load", () => {
    const frame = { ...FRAME, massKg: 2550, ballast: [], minWheelLoadN: 1000 };
    const machine = { ...SIMULATION_DEFAULTS.machine, frame };
    const even = simulateQuiet({ machine, frameLifts: true }).truth.weight;
    // Hand-worked: (2550 x 9.80665 x 4 - 24 x 795.855 x 5.2) / 4.5 - 1000 = -843.3 N all over the field.
    expect(even?.headroomP05N).toBeCloseTo(-843.3, 0);
    expect(even?.headroomP50N).toBeCloseTo(-843.3, 0);
    expect(even?.shareBelowMinimum).toBe(1);
    const uneven = simulateQuiet({ machine, frameLifts: true, soil: { ...FLAT, gradientEastNPerM: 4 } });
    expect(uneven.truth.weight?.headroomP05N).toBeCloseTo(-1000, 0);
    expect(uneven.truth.weight?.headroomP50N).toBeGreaterThan(-1000);
  });

  it("cuts every row's force and margin together, so that the sum never passes its weight", () => {
    const light = { ...FRAME, massKg: 2550, ballast: [] };
    const machine = { ...SIMULATION_DEFAULTS.machine, frame: light };
    const soil = { ...FLAT, gradientEastNPerM: 4 };
    const quiet = simulateQuiet({ machine, frameLifts: true, soil });
    const capacityN = frameCapacityN(light);
    const force = valuesOf(quiet.log, "downforce");
    const margin = valuesOf(quiet.log, "margin");
    let lifted = 0;
    let standing = 0;
    quiet.truth.passOfRecord.forEach((pass, record) => {
      if (pass === 0) return;
      const forces = force.subarray(record * 24, record * 24 + 24);
      const margins = [...margin.subarray(record * 24, record * 24 + 24)];
      const sumN = forces.reduce((sum, one) => sum + one, 0);
      expect(sumN).toBeLessThanOrEqual(capacityN + 0.01);
      if (sumN > capacityN - 0.01) {
        lifted += 1;
        expect(Math.max(...margins)).toBeLessThan(450);
      } else {
        standing += 1;
        expect(Math.min(...margins)).toBeCloseTo(450, 2);
      }
    });
    expect(lifted).toBeGreaterThan(20);
    expect(standing).toBeGreaterThan(20);
    expect(quiet.truth.shareLifted).toBeCloseTo(lifted / (lifted + standing), 1);
    expect(quiet.truth.liftedM2).toBeCloseTo(quiet.truth.shareLifted * (quiet.truth.coverage?.sweptM2 ?? NaN), 4);
  });
});

function contrastOf(quiet: ReturnType<typeof simulateQuiet>, id: string): number {
  const { inBand } = quiet.truth;
  const inside = meanWhere(quiet, id, (record, row) => inBand[record * 24 + row - 1] === 1);
  return inside - meanWhere(quiet, id, (record, row) => inBand[record * 24 + row - 1] === 0);
}
