import { expect, it } from "vitest";
import { detailWords } from "@/components/people/audit-list";

it("says of a change what was there and what is there now", () => {
  const detail = {
    name: "East quarter",
    changed: ["farm", "landowner", "boundary"],
    before: { farm: null, landowner: "I. Hale" },
    after: { farm: "Larkspur Flats", landowner: null },
  };
  expect(detailWords(detail)).toBe(
    "name: East quarter, farm: nothing → Larkspur Flats, landowner: I. Hale → nothing, boundary changed",
  );
});

it("reads entries of before there were such, too", () => {
  expect(detailWords({ changed: ["name"] })).toBe("name changed");
  expect(detailWords({ name: "East quarter", logs: 2 })).toBe("name: East quarter, logs: 2");
});
