import { expect, it } from "vitest";
import { sayReason } from "@/components/field-book/say-reason";

const REASON = "Typically 151 N below the other rows, 12 % of the median row (robust score -5.1, limit 3.5).";

it("says the amount in the person's units and leaves the rest", () => {
  const units = { unit: "N", channel: "margin" };
  // 151 N / 4.4482216152605 N = 33.95 lbf (NIST SP 811), said without decimals.
  expect(sayReason(REASON, { ...units, system: "imperial" })).toMatch(
    /^Typically 34\slbf below the other rows, 12 % of the median row \(robust score -5\.1, limit 3\.5\)\.$/,
  );
  expect(sayReason(REASON, { ...units, system: "metric" })).toMatch(/^Typically 151\sN below/);
});

it("leaves a sentence without an amount alone", () => {
  expect(sayReason("This row has no readings.", { unit: "N", channel: "margin", system: "imperial" })).toBe(
    "This row has no readings.",
  );
});
