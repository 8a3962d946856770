import { expect, it } from "vitest";
import { describeChanges } from "@/lib/audit/describe-changes";

it("tells what was there and what is there now, of what changed only", () => {
  const before = { name: "East quarter", farm: "Larkspur Flats", landowner: null };
  expect(describeChanges(before, { name: "East half", farm: "Larkspur Flats", landowner: undefined })).toEqual({
    changed: ["name"],
    before: { name: "East quarter" },
    after: { name: "East half" },
  });
});

it("says null for what was not there, and takes missing and null for the same", () => {
  expect(describeChanges({}, { landowner: "I. Hale", farm: null })).toEqual({
    changed: ["landowner"],
    before: { landowner: null },
    after: { landowner: "I. Hale" },
  });
});

it("compares lists by what is in them", () => {
  expect(describeChanges({ fieldIds: ["a", "b"] }, { fieldIds: ["a", "b"] }).changed).toEqual([]);
  expect(describeChanges({ fieldIds: ["a", "b"] }, { fieldIds: ["a"] }).after).toEqual({ fieldIds: ["a"] });
});
