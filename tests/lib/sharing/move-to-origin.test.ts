import { describe, expect, it } from "vitest";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { moveToOrigin } from "@/lib/sharing/move-to-origin";
import { findExpiryFault, shareState } from "@/lib/sharing/share-state";

const field = {
  type: "Polygon" as const,
  coordinates: [
    [
      [-98.01, 38.5],
      [-98, 38.5],
      [-98, 38.51],
      [-98.01, 38.51],
      [-98.01, 38.5],
    ],
  ],
};

describe("moveToOrigin", () => {
  it("brings the first corner to 0, 0 and keeps the area", () => {
    const moved = moveToOrigin(field)(field)!;
    expect(moved.coordinates[0]![0]).toEqual([0, 0]);
    expect(geodesicAreaM2(moved) / geodesicAreaM2(field)).toBeCloseTo(1, 3);
  });

  it("gives nothing at all when it does not know where here is", () => {
    expect(moveToOrigin(null)(field)).toBeNull();
    expect(moveToOrigin(field)(null)).toBeNull();
  });
});

describe("the life of a share", () => {
  const now = new Date("2026-12-01T12:00:00Z");
  const after = (ms: number) => new Date(now.getTime() + ms);

  it("ends at its moment, and withdrawal counts first", () => {
    expect(shareState({ expiresAt: after(1), revokedAt: null }, now)).toBe("open");
    expect(shareState({ expiresAt: now, revokedAt: null }, now)).toBe("expired");
    expect(shareState({ expiresAt: after(-1), revokedAt: now }, now)).toBe("revoked");
  });

  it("lasts from the next moment to two years", () => {
    expect(findExpiryFault(now, now)).toContain("future");
    expect(findExpiryFault(after(1), now)).toBeNull();
    expect(findExpiryFault(new Date("2028-12-01T12:00:00Z"), now)).toBeNull();
    expect(findExpiryFault(new Date("2028-12-01T12:00:00.001Z"), now)).toContain("2 years");
  });
});
