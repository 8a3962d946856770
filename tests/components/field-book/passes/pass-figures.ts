import type { PassStatisticsBody, PassStatisticsItem, RampsBody } from "@/lib/schemas/pass-figures";

function passItem(pass: number): PassStatisticsItem {
  const p50 = 440 + pass;
  return {
    pass,
    headingDeg: pass % 2 === 1 ? 2 : 182,
    headland: pass === 1,
    lengthM: 380.5,
    records: 200,
    startedAt: null,
    speedMps: 2.5,
    n: 1600,
    distanceM: 380,
    mean: p50 + 1,
    sd: 40,
    p05: p50 - 80,
    p25: p50 - 30,
    p50,
    p75: p50 + 30,
    p95: p50 + 80,
    shareUnderTarget: 0.04,
    shareAtLimit: null,
    shareContactLost: 0,
  };
}

const group = (key: string, mean: number) => ({
  key,
  passes: 5,
  distanceM: 1900,
  mean,
  interval: [mean - 6, mean + 6] as [number, number],
  speedMps: 2.5,
});

export const PASSES: PassStatisticsBody = {
  channel: "margin",
  unit: "N",
  items: Array.from({ length: 10 }, (_, index) => passItem(index + 1)),
  comparisons: [
    {
      by: "direction",
      groups: [
        { ...group("along", 450), headingDeg: 2 },
        { ...group("against", 410), headingDeg: 182 },
      ],
      difference: { first: "along", second: "against", value: 40, interval: [28, 52] },
      reason: null,
    },
    {
      by: "place",
      groups: [group("inside", 430), group("headland", 425)],
      difference: { first: "headland", second: "inside", value: -5, interval: [-20, 11] },
      reason: null,
    },
    {
      by: "speed",
      groups: [{ ...group("slow", 440), speedBetweenMps: [1, 2] }, group("middle", 430), group("fast", 420)],
      difference: { first: "fast", second: "slow", value: -20, interval: null },
      reason: "An interval needs 8 passes; this log has 5.",
    },
    { by: "turn", groups: [], difference: null, reason: "No turn was driven with the rows down." },
  ],
};

const metre = (fromM: number, difference: number) => ({
  fromM,
  passes: 9,
  mean: 440 + difference,
  difference,
  interval: [difference - 5, difference + 5] as [number, number],
  speedMps: 2,
});

export const RAMPS: RampsBody = {
  channel: "margin",
  unit: "N",
  reachM: 6,
  passes: 9,
  tooShort: 1,
  middleMean: 440,
  start: { metres: [-38, -20, -8, -1, 0, 1].map((value, m) => metre(m, value)), settledAtM: 3 },
  end: { metres: [0, 0, 1, 0, -1, 0].map((value, m) => metre(m, value)), settledAtM: 0 },
  reason: null,
};
