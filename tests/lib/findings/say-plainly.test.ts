import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { sayPlainly } from "@/lib/findings/say-plainly";

/** What a landowner need not know. */
const TRADE = /\b(margin|gauge wheels?|frame|opener resistance|applied force|deadband|headroom)\b/i;
/** Said of the machine's frame as a thing to look at. */
const ALLOWED = /the height of the machine's frame/g;

/** Left out: how a number was worked out, and what a description lacks; neither reaches a landowner. Every text in quotes or backticks after `sentenceTemplate:`, `check:` and the like in the writers of findings. */
function textsOfFindings(): string[] {
  const folder = "lib/findings";
  const writers = readdirSync(folder).filter((name) => /^(find-|say-row-groups)/.test(name));
  return writers.flatMap((name) => {
    const source = readFileSync(`${folder}/${name}`, "utf8").replaceAll(/method:[\s\S]*?,\n/g, "");
    return [...source.matchAll(/"([^"\n]{20,})"|`([^`\n]{20,})`/g)].map((match) => match[1] ?? match[2] ?? "");
  });
}

describe("sayPlainly", () => {
  it("says what the trade says in words that need no explaining", () => {
    expect(sayPlainly("Row {worst} ran under the target margin on {share} of its distance.")).toBe(
      "Row {worst} ran with less weight on the ground than wanted on {share} of its distance.",
    );
    expect(sayPlainly("Rows 3 and 4 carried about {difference} less on the gauge wheel than the others")).toBe(
      "Rows 3 and 4 carried about {difference} less on the depth wheel than the others",
    );
    expect(sayPlainly("The frame was heavy enough: its wheels kept {spare} above the least load.")).toBe(
      "The machine was heavy enough: its wheels kept {spare} above the least load.",
    );
  });

  it("leaves numbers, names and ordinary words alone", () => {
    const plain =
      "Row {row} needed {difference} more to open its furrow than the other rows on {share} of the distance.";
    expect(sayPlainly(plain)).toBe(plain);
  });

  it("leaves no word of the trade in any sentence or check that a verdict can say", () => {
    const texts = textsOfFindings().filter(
      (text) =>
        /^[A-Z{$].* /.test(text) &&
        !/moments of frame|machine's description|robust z|Share of distance|Statics/i.test(text),
    );
    expect(texts.length).toBeGreaterThan(20);
    const left = texts.map((text) => sayPlainly(text).replaceAll(ALLOWED, "")).filter((text) => TRADE.test(text));
    expect(left).toEqual([]);
  });
});
