import type { PassComparison, PassGroup } from "@/lib/schemas/pass-figures";

export const COMPARISON_WORDS: Record<PassComparison["by"], string> = {
  direction: "Direction",
  place: "Headland and inside",
  speed: "Speed, thirds of the distance",
  turn: "Turns",
};

const POINTS = ["north", "north-east", "east", "south-east", "south", "south-west", "west", "north-west"];

const GROUPS: Record<string, string> = {
  inside: "inside the field",
  headland: "headland",
  slow: "slowest",
  middle: "middle",
  fast: "fastest",
  straight: "going straight",
  inner: "inner rows",
  between: "middle rows",
  outer: "outer rows",
};

/** What a group is called; ways of driving by the compass, speeds by their bounds. */
export function groupWords(group: PassGroup, speed: (mps: number) => string): string {
  if (group.key === "along" || group.key === "against") {
    if (group.headingDeg == null) return group.key === "along" ? "one way" : "the other way";
    const turn = ((group.headingDeg % 360) + 360) % 360;
    return `${POINTS[Math.round(turn / 45) % 8]}, ${Math.round(turn) % 360}°`;
  }
  const words = GROUPS[group.key] ?? group.key;
  if (!group.speedBetweenMps) return words;
  const [from, to] = group.speedBetweenMps;
  return `${words}, ${speed(from)} to ${speed(to)}`;
}

/** What is compared in a comparison: means, or in turns what each third of the rows differs from itself going straight. */
export function shownValue(by: PassComparison["by"], group: PassGroup) {
  if (by !== "turn") return { value: group.mean, interval: group.interval };
  if (group.key === "straight") return { value: 0, interval: null };
  return { value: group.fromStraight ?? null, interval: group.fromStraightInterval ?? null };
}
