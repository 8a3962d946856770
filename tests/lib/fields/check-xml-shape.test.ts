import { describe, expect, it } from "vitest";
import { checkXmlShape } from "@/lib/fields/check-xml-shape";
import { readBoundaryFile } from "@/lib/fields/read-boundary-file";

const codeOf = (text: string) => {
  const read = readBoundaryFile(new TextEncoder().encode(text));
  return read.ok ? null : read.error.code;
};
const kml = (inner: string) => `<?xml version="1.0"?><kml xmlns="http://www.opengis.net/kml/2.2">${inner}</kml>`;

describe("the shape of a place file's XML", () => {
  it("is refused at the first bracket that begins no tag, before a parser sees it", () => {
    expect(codeOf(`<kml>${"<".repeat(500_000)}`)).toBe("file-damaged");
    expect(() => checkXmlShape("<kml><a>1 < 2</a></kml>")).toThrow("character 11 begins no tag");
  });

  it("is refused where elements nest without end, or are too many", () => {
    expect(codeOf(kml("<Folder>".repeat(100_000) + "</Folder>".repeat(100_000)))).toBe("file-unsafe");
    expect(codeOf(kml("<Placemark/>".repeat(200_000)))).toBe("file-unsafe");
  });

  it("is taken with comments, character data, instructions and brackets in attributes", () => {
    const text = kml('<!-- a < b --><name><![CDATA[<b>East</b> < West]]></name><Style id="a"/><?hint <x ?>');
    expect(() => checkXmlShape(text)).not.toThrow();
  });
});
