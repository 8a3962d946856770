import { screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { CoveragePanel } from "@/components/coverage/coverage-panel";
import { coverageLines } from "@/components/coverage/coverage-lines";
import type { CoverageAreas } from "@/lib/schemas/coverage";
import type { CoverageBody } from "@/lib/schemas/logs";
import { renderInBook } from "@/tests/components/field-book/render-in-book";

afterEach(() => vi.unstubAllGlobals());

const COVERAGE: CoverageBody = {
  sweptM2: 125_000,
  coveredM2: 120_000,
  overlapM2: 5_000,
  skippedM2: 600,
  resolutionM: 0.125,
  overlapByCause: [
    { cause: "headland", areaM2: 4_000 },
    { cause: "point-row", areaM2: 0 },
    { cause: "guess-row", areaM2: 1_000 },
    { cause: "other", areaM2: 0 },
  ],
  skips: { count: 3, areaM2: 600, largestM2: 400 },
};

const NONE: CoverageAreas = { type: "FeatureCollection", features: [] };
const AREAS: CoverageAreas = {
  type: "FeatureCollection",
  features: [
    {
      type: "Feature",
      geometry: {
        type: "Polygon",
        coordinates: [
          [
            [-98.61, 38.41],
            [-98.6, 38.41],
            [-98.6, 38.42],
            [-98.61, 38.41],
          ],
        ],
      },
      properties: { kind: "overlap", cause: "headland", passes: [1, 2], areaM2: 4_000, lengthM: 600 },
    },
  ],
};

function answer(coverage: CoverageBody, areas: CoverageAreas = AREAS) {
  const asked: string[] = [];
  vi.stubGlobal("fetch", async (path: string) => {
    asked.push(path);
    return Response.json(path.endsWith("/coverage") ? coverage : areas);
  });
  return asked;
}

async function openPanel() {
  const panel = within(await screen.findByTestId("coverage"));
  await userEvent.click(panel.getByRole("heading", { name: "Ground" }));
  await panel.findByRole("table");
  return panel;
}

describe("the areas of a log", () => {
  it("are shares of what they are part of", () => {
    const lines = Object.fromEntries(coverageLines(COVERAGE).map((line) => [line.id, line]));
    // Hand-worked: 5000 of 125 000 m2 swept, 600 of 120 000 m2 covered.
    expect(lines.overlap?.share).toBe(0.04);
    expect(lines.skipped?.share).toBe(0.005);
    expect(lines.swept?.share).toBeNull();
  });

  it("name only causes that took ground, and add up", () => {
    const parts = coverageLines(COVERAGE).filter(({ isPart }) => isPart);
    expect(parts.map(({ id }) => id)).toEqual(["headland", "guess-row"]);
    expect(parts.reduce((sum, { areaM2 }) => sum + areaM2, 0)).toBe(COVERAGE.overlapM2);
  });

  it("share nothing of an empty log", () => {
    const lines = coverageLines({ sweptM2: 0, coveredM2: 0, overlapM2: 0, skippedM2: 0, resolutionM: 0.1 });
    expect(lines.map(({ share }) => share)).toEqual([null, null, null, null]);
  });
});

describe("the panel of the ground", () => {
  it("says areas in the person's units, with shares and what they are of", async () => {
    answer(COVERAGE);
    renderInBook(<CoveragePanel />, { system: "imperial" });
    const panel = await openPanel();
    // 5000 m2 / 4046.8564224 m2 an acre (NIST SP 811).
    expect(panel.getByRole("row", { name: /^Overlapped/ })).toHaveTextContent(/1\.24\s?ac4\.0\s?% of swept/);
    expect(panel.getByRole("row", { name: /^Skipped/ })).toHaveTextContent(/in 3 places0\.15\s?ac0\.5\s?% of covered/);
    expect(panel.getByRole("row", { name: /^between passes side by side/ })).toHaveTextContent(/0\.25\s?ac/);
  });

  it("asks for places only when somebody wants to see them", async () => {
    const asked = answer(COVERAGE);
    const { store } = renderInBook(<CoveragePanel />);
    await screen.findByText(/ha covered$/);
    expect(asked).toEqual(["/api/v1/logs/log_east/coverage"]);
    const panel = await openPanel();
    await userEvent.click(panel.getByRole("button", { name: "Show on the map: Overlapped" }));
    expect(store.getState().ground).toEqual(["overlap"]);
    await panel.findByText("Overlapped ground is hatched.");
    expect(asked).toEqual(["/api/v1/logs/log_east/coverage", "/api/v1/logs/log_east/coverage/areas"]);
    await userEvent.click(panel.getByRole("checkbox", { name: "Outline each pass on the map" }));
    expect(store.getState().ground).toEqual(["swaths", "overlap"]);
    await userEvent.click(panel.getByRole("button", { name: "Hide on the map: Overlapped" }));
    expect(store.getState().ground).toEqual(["swaths"]);
  });

  it("says that there are only slivers where no piece is large enough to be drawn, and promises nothing", async () => {
    answer({ ...COVERAGE, skippedM2: 72.56, skips: { count: 0, areaM2: 0, largestM2: 0 } }, NONE);
    renderInBook(<CoveragePanel />, { state: { ground: ["overlap", "skips"] } });
    const panel = await openPanel();
    expect(await panel.findAllByText("Only slivers, too thin to draw.")).toHaveLength(2);
    expect(panel.queryByRole("button", { name: /on the map/ })).toBeNull();
    expect(panel.queryByText(/hatched|thick outline/)).toBeNull();
  });

  it("offers no place where the log was measured without any", async () => {
    answer({ ...COVERAGE, overlapByCause: undefined, skips: undefined });
    renderInBook(<CoveragePanel />);
    const panel = await openPanel();
    expect(panel.queryByRole("button", { name: /on the map/ })).toBeNull();
  });

  it("says that areas could not be fetched", async () => {
    vi.stubGlobal("fetch", async () => new Response("", { status: 404 }));
    renderInBook(<CoveragePanel />);
    await userEvent.click(await screen.findByRole("heading", { name: "Ground" }));
    expect(await screen.findByRole("alert")).toHaveTextContent("could not be fetched");
  });
});
