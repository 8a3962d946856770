import { DOMParser } from "@xmldom/xmldom";
import { describe, expect, it } from "vitest";
import { classLabels } from "@/lib/pictures/class-labels";
import { composePicture } from "@/lib/pictures/compose-picture";
import { drawNorth } from "@/lib/pictures/draw-north";
import { pictureFileName, pictureTitle, sourceLine } from "@/lib/pictures/picture-words";
import { escapeXml, estimateWidthPx, wrapWords } from "@/lib/pictures/svg-text";

const NEWTON = { symbol: "N", factor: 1, decimals: 0 };
const BODY = { svg: '<rect width="600" height="300" fill="#123456"/>', widthPx: 600, heightPx: 300 };

function compose(change: Partial<Parameters<typeof composePicture>[0]> = {}) {
  return composePicture({
    title: "East quarter: Margin, N",
    subtitle: "Pass 12, unrolled.",
    source: "Larkspur Flats · East quarter · log 1 of 14 October 2026 · as logged",
    body: BODY,
    legend: classLabels([180, 490, 890], NEWTON).map((label, index) => ({ colour: `#00000${index}`, label })),
    fontCss: "",
    ...change,
  });
}

/** Strict: a picture that is not XML throws here. */
function parse(svg: string) {
  const faults: string[] = [];
  const parser = new DOMParser({
    onError: (level, message) => void (level === "warning" || faults.push(`${level}: ${message}`)),
  });
  const document = parser.parseFromString(svg, "image/svg+xml");
  expect(faults).toEqual([]);
  return document;
}

describe("a picture", () => {
  it("carries title with unit, what is shown, every class in numbers, and its source", () => {
    const document = parse(compose().svg);
    const texts = Array.from(document.getElementsByTagName("text"), (text) => text.textContent);
    expect(texts).toEqual([
      "East quarter: Margin, N",
      "Pass 12, unrolled.",
      "under 180\u202fN",
      "180 to 490\u202fN",
      "490 to 890\u202fN",
      "890\u202fN and more",
      "Larkspur Flats · East quarter · log 1 of 14 October 2026 · as logged",
    ]);
    expect(document.documentElement?.getAttribute("width")).toBe("648");
  });

  it("stays XML whatever a field is called", () => {
    const name = `<North> & "South" 'of' ]]> \u0007 road`;
    const document = parse(compose({ title: name }).svg);
    expect(document.getElementsByTagName("title")[0]?.textContent).toBe(`<North> & "South" 'of' ]]> \ufffd road`);
    expect(escapeXml("a<b")).toBe("a&lt;b");
  });

  it("wraps words and legend on a phone's width, nothing past the edge", () => {
    const narrow = { ...BODY, widthPx: 358 };
    const source = "Larkspur Flats · East quarter · log of a very long name indeed · as logged · picture made today";
    const document = parse(compose({ body: narrow, source }).svg);
    const edge = 358 + 24;
    for (const text of Array.from(document.getElementsByTagName("text"))) {
      const x = Number(text.getAttribute("x"));
      expect(x + estimateWidthPx(text.textContent ?? "", Number(text.getAttribute("font-size")))).toBeLessThan(
        edge + 25,
      );
    }
    const rows = new Set(
      Array.from(
        document.getElementsByTagName("rect"),
        (rect) => rect.getAttribute("stroke") && rect.getAttribute("y"),
      ),
    );
    expect(rows.size).toBeGreaterThan(2);
  });

  it("is tall enough for everything in it", () => {
    const { svg, heightPx } = compose();
    const document = parse(svg);
    const last = Array.from(document.getElementsByTagName("text")).at(-1);
    expect(Number(last?.getAttribute("y"))).toBeLessThan(heightPx);
    expect(heightPx).toBeGreaterThan(300);
  });

  it("hatches what was not logged, and points nowhere outside the file", () => {
    const { svg } = compose({ legend: [{ colour: null, label: "nothing logged" }] });
    expect(svg).toContain('fill="url(#hatch)"');
    expect(svg.replace('xmlns="http://www.w3.org/2000/svg"', "")).not.toMatch(/https?:/);
  });

  it("shows north inside the map", () => {
    const box = parse(`<svg xmlns="http://www.w3.org/2000/svg">${drawNorth()}</svg>`);
    const y = Number(box.getElementsByTagName("rect")[0]?.getAttribute("y"));
    expect(y).toBeGreaterThan(0);
    expect(y).toBeLessThan(300);
  });
});

describe("the classes in words", () => {
  it("are in the person's unit, with decimals that tell the edges apart", () => {
    // 1 lbf = 4.4482216152605 N (NIST SP 811).
    expect(classLabels([444.82216152605], { symbol: "lbf", factor: 4.4482216152605, decimals: 0 })).toEqual([
      "under 100\u202flbf",
      "100\u202flbf and more",
    ]);
    expect(classLabels([0.021, 0.024], { symbol: "", factor: 1, decimals: 2 })).toEqual([
      "under 0.021",
      "0.021 to 0.024",
      "0.024 and more",
    ]);
    expect(classLabels([], NEWTON)).toEqual(["all readings"]);
  });
});

describe("the words of a picture", () => {
  const source = { field: "East quarter", farm: "Larkspur Flats", log: "Day 1", loggedOn: "", cleaning: "as logged" };

  it("name field, log, cleaning and date, and leave out what is not known", () => {
    expect(sourceLine(source, "1 December 2026")).toBe(
      "Larkspur Flats · East quarter · log Day 1 · as logged · picture made 1 December 2026 · Coulterbook",
    );
    expect(sourceLine({ ...source, farm: null, loggedOn: "14 October 2026" }, "today", "Tiles by the county")).toBe(
      "East quarter · log Day 1 of 14 October 2026 · as logged · picture made today · Coulterbook · Tiles by the county",
    );
    expect(pictureTitle({ title: "Contact", unit: "", subtitle: "" })).toBe("Contact");
  });

  it("make file names that every system takes", () => {
    expect(pictureFileName("Östliche Ecke", "log/1", "Margin, N")).toBe("ostliche-ecke-log-1-margin-n");
    expect(pictureFileName("***")).toBe("picture");
    expect(pictureFileName("a".repeat(300)).length).toBe(100);
  });

  it("break between words only", () => {
    expect(wrapWords("one two three", 40, 10)).toEqual(["one two", "three"]);
    expect(wrapWords("unbreakable", 10, 10)).toEqual(["unbreakable"]);
  });
});
