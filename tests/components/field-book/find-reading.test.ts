import { QueryClient } from "@tanstack/react-query";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { findFarAway } from "@/components/field-book/find-reading";
import { logVersionKey, trackQuery } from "@/components/field-book/use-log-data";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";
import { createPassTrack } from "@/lib/map-state/pass-track";

const LOG = { logId: "log_east", version: 1 };
const PLACE = { lng: 1, lat: 1 };

/** A log of so many passes of which the first is in memory, and who was asked. */
function findWith(passes: number) {
  const client = new QueryClient();
  const list = Array.from({ length: passes }, (_, at) => ({ pass: at + 1 }));
  client.setQueryData(logVersionKey(LOG, "passes"), list);
  const places = { timesS: [0], distancesM: [0], positions: [[0, 0] as [number, number]] };
  const track = createPassTrack({
    channel: "margin",
    unit: "N",
    rows: 1,
    records: 1,
    ...places,
    values: [[1]],
    pass: 1,
  });
  client.setQueryData(trackQuery(LOG, "margin", 1).queryKey, track);
  const asked = vi.fn(async () => new Response("", { status: 404 }));
  vi.stubGlobal("fetch", asked);
  return { finder: { client, log: LOG, store: createFieldBookStore({ channel: "margin" }) }, asked };
}

beforeEach(() => {
  vi.unstubAllGlobals();
});

describe("a place on no pass in memory", () => {
  it("is bare ground where every pass is in memory: nobody is asked", async () => {
    const { finder, asked } = findWith(1);
    expect(await findFarAway(finder, PLACE)).toBeNull();
    expect(asked).not.toHaveBeenCalled();
  });

  it("is asked for where a pass is not here yet", async () => {
    const { finder, asked } = findWith(2);
    await expect(findFarAway(finder, PLACE)).rejects.toThrow();
    expect(asked).toHaveBeenCalledTimes(1);
  });
});
