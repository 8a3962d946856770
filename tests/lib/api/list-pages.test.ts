import { expect, it } from "vitest";
import { listAll } from "@/lib/api/list-pages";

it("takes every page, in order, until there is no cursor", async () => {
  const asked: (string | null)[] = [];
  const all = await listAll(async (cursor) => {
    asked.push(cursor);
    const at = Number(cursor ?? 0);
    return { items: [at * 2, at * 2 + 1], nextCursor: at < 2 ? String(at + 1) : null };
  });
  expect(asked).toEqual([null, "1", "2"]);
  expect(all).toEqual({ items: [0, 1, 2, 3, 4, 5], nextCursor: null });
});
