import type { Map as MapLibreMap } from "maplibre-gl";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { colourExpression, recolourValues, showValues, type ShownValues } from "@/components/map/value-layer";
import type { TileJson } from "@/lib/schemas/logs";

/** As much of a map as values need: which source is shown, in what colour. */
function makeMap() {
  const shown = { tiles: null as string | null, colour: null as unknown, changes: 0 };
  const map = {
    getLayer: () => (shown.tiles === null ? undefined : { id: "values" }),
    getSource: () => (shown.tiles === null ? undefined : { id: "values" }),
    addSource: (_: string, { tiles }: { tiles: string[] }) => (shown.tiles = tiles[0] ?? null),
    addLayer: ({ paint }: { paint: Record<string, unknown> }) => (shown.colour = paint["color-relief-color"]),
    setPaintProperty: (_layer: string, _name: string, colour: unknown) => {
      shown.colour = colour;
      shown.changes += 1;
    },
    removeLayer: () => undefined,
    removeSource: () => (shown.tiles = null),
    on: () => undefined,
    once: (name: string, then: () => void) => name === "remove" && (onRemove = then),
  };
  let onRemove: () => void = () => undefined;
  return { map: map as unknown as MapLibreMap, shown, remove: () => onRemove() };
}

const ENCODING = { offset: 0, step: 1 } as TileJson["encoding"];
const colourOf = (edge: number) => colourExpression([edge], ["#000000", "#ffffff"], ENCODING);
const valuesOf = (channel: string, edge: number): ShownValues => ({
  tileJson: { tiles: [`https://larkspur.example/${channel}/{z}/{x}/{y}.png`] } as TileJson,
  colour: colourOf(edge),
  beforeLayer: "boundary-line",
});

beforeEach(() => {
  vi.useFakeTimers();
});

describe("values on a map", () => {
  it("stand there at once where there were none, and change once the page has answered", () => {
    const { map, shown } = makeMap();
    showValues(map, valuesOf("margin", 300));
    expect(shown.tiles).toContain("/margin/");
    showValues(map, valuesOf("depth", 40));
    expect(shown.tiles).toContain("/margin/");
    vi.runAllTimers();
    expect(shown.tiles).toContain("/depth/");
    expect(shown.colour).toEqual(colourOf(40));
  });

  it("are coloured once for many changes within a frame, in the last colours", () => {
    const { map, shown } = makeMap();
    showValues(map, valuesOf("margin", 300));
    for (const edge of [310, 320, 330]) recolourValues(map, colourOf(edge));
    expect(shown.colour).toEqual(colourOf(300));
    vi.runAllTimers();
    expect(shown.colour).toEqual(colourOf(330));
    expect(shown.changes).toBe(1);
  });

  it("take new colours with them when they are still awaited", () => {
    const { map, shown } = makeMap();
    showValues(map, valuesOf("margin", 300));
    showValues(map, valuesOf("depth", 40));
    recolourValues(map, colourOf(50));
    vi.runAllTimers();
    expect(shown.tiles).toContain("/depth/");
    expect(shown.colour).toEqual(colourOf(50));
    expect(shown.changes).toBe(0);
  });

  it("are left alone on a map that is gone", () => {
    const { map, shown, remove } = makeMap();
    showValues(map, valuesOf("margin", 300));
    recolourValues(map, colourOf(310));
    remove();
    vi.runAllTimers();
    expect(shown.changes).toBe(0);
  });
});
