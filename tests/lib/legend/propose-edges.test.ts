import { describe, expect, it } from "vitest";
import { areClassEdges, histogramOf } from "@/lib/legend/class-edges";
import { EDGE_PRESETS, presetsFor, proposeEdges, type EdgeContext } from "@/lib/legend/propose-edges";

const values = Float32Array.from({ length: 2001 }, (_, i) => 300 + i * 0.3);
const MARGIN: EdgeContext = {
  channel: "margin",
  histogram: histogramOf(values, 300, 900, 100),
  targetMarginN: 450,
  marginDeadbandN: 80,
  shownFactor: 1,
};

describe("proposeEdges", () => {
  it("gives margin the target's own tolerance as edges, and the published contact loads on request", () => {
    expect(presetsFor(MARGIN)[0]).toBe("target");
    expect(proposeEdges("target", MARGIN)).toEqual([290, 370, 410, 490, 530, 610]);
    // Hanna, Steward and Aldinger 2010, Appl. Eng. Agric. 26(4):551-556.
    expect(proposeEdges("contact-load", MARGIN)).toEqual([180, 490, 890]);
  });

  it("falls back on the published loads where no target is known", () => {
    expect(presetsFor({ ...MARGIN, targetMarginN: null })[0]).toBe("contact-load");
  });

  it("makes round edges round in the unit shown", () => {
    const pound = 4.4482216152605;
    const edges = proposeEdges("round", { ...MARGIN, channel: "downforce", shownFactor: pound });
    for (const edge of edges) expect((edge / pound) % 10).toBeCloseTo(0, 6);
  });

  it("makes the edges about a target and the published loads round in pounds-force", () => {
    const pound = 4.4482216152605;
    const imperial = { ...MARGIN, shownFactor: pound };
    const shown = proposeEdges("target", imperial).map((edge) => edge / pound);
    // 450 N and 80 N are 101.2 and 18.0 lbf (NIST SP 811); one tolerance off is kept exact.
    expect(shown[1]).toBeCloseTo(370 / pound, 9);
    expect(shown[4]).toBeCloseTo(530 / pound, 9);
    for (const at of [0, 2, 3, 5]) expect(shown[at]! - Math.round(shown[at]!)).toBeCloseTo(0, 6);
    proposeEdges("contact-load", imperial).forEach((edge, at) => {
      expect(edge / pound).toBeCloseTo([40, 110, 200][at]!, 9);
    });
  });

  it("puts 0 in the middle class of differences", () => {
    const histogram = histogramOf(
      Float32Array.from({ length: 1000 }, (_, i) => i - 400),
      -400,
      600,
      100,
    );
    const edges = proposeEdges("round", { ...MARGIN, channel: "deviation:margin", histogram });
    expect(edges).toHaveLength(4);
    expect(edges[1]).toBe(-edges[2]!);
    expect(edges[0]).toBe(-edges[3]!);
  });

  it("always gives edges that can be used, also for a channel that never changes", () => {
    const histogram = histogramOf(Float32Array.of(5, 5, 5), 5, 5, 10);
    for (const preset of EDGE_PRESETS) {
      expect(areClassEdges(proposeEdges(preset, { ...MARGIN, histogram, channel: "depth" })), preset).toBe(true);
    }
  });
});
