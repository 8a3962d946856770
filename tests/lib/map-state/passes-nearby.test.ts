import { describe, expect, it } from "vitest";
import { passesNearby } from "@/lib/map-state/passes-nearby";

const PASSES = [3, 4, 6, 7, 9].map((pass) => ({ pass, records: 100 }));

describe("passes kept at hand", () => {
  it("begin with the chosen one and go outwards, the later of two first", () => {
    expect(passesNearby(PASSES, 6, 1_000)).toEqual([6, 7, 4, 9, 3]);
    expect(passesNearby(PASSES, 9, 1_000)).toEqual([9, 7, 6, 4, 3]);
  });

  it("end before they hold too much", () => {
    expect(passesNearby(PASSES, 4, 300)).toEqual([4, 6, 3]);
    expect(passesNearby(PASSES, 4, 299)).toEqual([4, 6]);
    expect(passesNearby(PASSES, 4, 50)).toEqual([]);
  });

  it("begin with the first pass where none is chosen", () => {
    expect(passesNearby(PASSES, null, 200)).toEqual([3, 4]);
    expect(passesNearby([], null, 200)).toEqual([]);
  });
});
