import { expect, it } from "vitest";
import { readLog } from "@/lib/ingest";
import type { LogMapping } from "@/lib/ingest/mapping";
import { textSource } from "@/tests/lib/ingest/support/make-source";

const CSV = "lon,lat,speed,m1,m2,m3\n-98.61,38.41,2.4,1,2,3\n-98.62,38.42,2.5,4,,6\n";
const MAPPING: LogMapping = {
  shape: "wide",
  columns: [
    { name: "lon", channel: "longitude", unit: "deg" },
    { name: "lat", channel: "latitude", unit: "deg" },
    { name: "speed", channel: "other:speed", unit: "1" },
    ...[1, 2, 3].map((row) => ({ name: `m${row}`, channel: "margin" as const, unit: "N" as const, row })),
  ],
};

it("rows counted from the right are turned round, missing ones too; what is logged once stays", async () => {
  const values = async (mapping: LogMapping) => {
    const read = await readLog(textSource(CSV), mapping);
    if (!read.ok) throw new Error(read.error.message);
    return Object.fromEntries(read.value.log.channels.map((channel) => [channel.id, Array.from(channel.values)]));
  };
  expect(await values(MAPPING)).toMatchObject({ margin: [1, 2, 3, 4, NaN, 6] });
  expect(await values({ ...MAPPING, rowsFromRight: true })).toEqual({
    "other:speed": [Math.fround(2.4), Math.fround(2.5)],
    margin: [3, 2, 1, 6, NaN, 4],
  });
});
