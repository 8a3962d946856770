import { describe, expect, it } from "vitest";
import { turnDegrees } from "@/lib/geo/circular-mean";
import { headingFromTrack } from "@/lib/geo/heading-from-track";

function track(points: [number, number][], speedMps: number[] = points.map(() => 2.5)) {
  return {
    eastM: points.map((point) => point[0]),
    northM: points.map((point) => point[1]),
    speedMps,
    breaks: points.map((_, i) => (i === 0 ? 1 : 0)),
  };
}

describe("headingFromTrack", () => {
  it("follows a straight line whatever its direction (hand-worked)", () => {
    const points = Array.from({ length: 30 }, (_, i): [number, number] => [-0.3 * i, -0.4 * i]);
    // atan2(-0.3, -0.4) clockwise from north: 180 + atan(0.75)
    for (const heading of headingFromTrack(track(points))) expect(heading).toBeCloseTo(216.8699, 3);
  });

  it("is the tangent of a circle, away from the ends", () => {
    const radiusM = 20;
    const points = Array.from({ length: 200 }, (_, i): [number, number] => {
      const angle = (0.5 * i) / radiusM;
      return [radiusM * (1 - Math.cos(angle)), radiusM * Math.sin(angle)];
    });
    const headings = headingFromTrack(track(points));
    for (let i = 10; i < 190; i++) {
      const tangent = ((0.5 * i) / radiusM) * (180 / Math.PI);
      expect(Math.abs(turnDegrees(headings[i]!, tangent))).toBeLessThan(0.01);
    }
  });

  it("holds the last heading under 0.3 m/s, where positions only wander", () => {
    const driven = Array.from({ length: 20 }, (_, i): [number, number] => [0, 0.5 * i]);
    const stood = [
      [0.02, 9.49],
      [-0.02, 9.51],
      [0.03, 9.5],
    ] as [number, number][];
    const headings = headingFromTrack(track([...driven, ...stood], [...driven.map(() => 2.5), 0.1, 0.1, 0.1]));
    for (const heading of headings.slice(20)) expect(heading).toBeCloseTo(0, 5);
  });

  it("does not look across a break", () => {
    const north = Array.from({ length: 20 }, (_, i): [number, number] => [0, 0.5 * i]);
    const east = Array.from({ length: 20 }, (_, i): [number, number] => [50 + 0.5 * i, 0]);
    const input = track([...north, ...east]);
    input.breaks[20] = 1;
    const headings = headingFromTrack(input);
    expect(headings[19]).toBeCloseTo(0, 5);
    expect(headings[20]).toBeCloseTo(90, 5);
  });
});
