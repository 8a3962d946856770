import { describe, expect, it } from "vitest";
import { findingsForReader } from "@/lib/findings/findings-for-reader";

const words = {
  sentence: "Row 7 ran under the target margin.",
  sentenceTemplate: "Row {row} ran under the target margin.",
  check: "Look at its gauge wheel.",
};
const BARE = [
  { kind: "cannot-judge", severity: "look" },
  { kind: "rows-alike", severity: "ok" },
  { kind: "weight-short", severity: "act" },
  { kind: "readings-doubtful", severity: "look" },
  { kind: "over-target", severity: "look" },
  { kind: "weight-unknown", severity: "look" },
  { kind: "wheel-tracks", severity: "look" },
  { kind: "contact-lost", severity: "act" },
] as const;
const FINDINGS = BARE.map((finding) => ({ ...finding, ...words }));

describe("findingsForReader", () => {
  it("gives a landowner the three gravest that concern the field", () => {
    const kinds = findingsForReader(FINDINGS, "landowner").map(({ kind }) => kind);
    expect(kinds).toEqual(["weight-short", "contact-lost", "over-target"]);
  });

  it("speaks to a landowner in plain words, in the template too", () => {
    expect(findingsForReader(FINDINGS, "landowner")[0]).toMatchObject({
      sentence: "Row 7 ran with less weight on the ground than wanted.",
      sentenceTemplate: "Row {row} ran with less weight on the ground than wanted.",
      check: "Look at its depth wheel.",
    });
  });

  it("gives an adviser and anybody else all of them, as they came", () => {
    for (const audience of ["adviser", "operator", "public"]) {
      expect(findingsForReader(FINDINGS, audience)).toEqual(FINDINGS);
    }
  });

  it("says nothing to a landowner where only the description is lacking", () => {
    expect(findingsForReader(FINDINGS.slice(0, 1), "landowner")).toEqual([]);
  });
});
