import { act, screen } from "@testing-library/react";
import { expect, it } from "vitest";
import { MapWords } from "@/components/field-book/map-words";
import type { Classes } from "@/components/field-book/use-classes";
import { renderInBook } from "@/tests/components/field-book/render-in-book";

const CLASSES: Classes = {
  edges: [100, 300],
  colours: ["#000000", "#777777", "#ffffff"],
  context: {
    channel: "margin",
    histogram: { minimum: 0, maximum: 400, counts: [1, 1, 1, 1] },
    // Metres of row at 50, 150, 250 and 350 N.
    distribution: { offset: 50, step: 100, codes: [0, 1, 2, 3], distancesM: [10, 40, 30, 20] },
    targetMarginN: null,
    marginDeadbandN: null,
    shownFactor: 1,
  },
};
const MAP = { getContainer: () => ({ clientWidth: 1024, clientHeight: 512 }) as HTMLElement };
const words = () => screen.getByTestId("map-words").textContent?.replaceAll("\u202f", " ");

it("says where the map is, how much ground it shows, the share of each class, and what is chosen", () => {
  const { store } = renderInBook(<MapWords map={MAP} classes={CLASSES} unit="N" />, {
    state: { channel: "margin", view: { longitude: -98.6, latitude: 0, zoom: 15 } },
  });
  // Equator of WGS 84: 40 075 016.7 m round; 1024 of 512 * 2^15 px are 2446.0 m of it.
  expect(words()).toMatch(/^The map shows 2446\.0 m by 12\d\d\.\d m around 0\.00000° north, 98\.60000° west\./);
  expect(words()).toContain("by distance: 10 % under 100 N, 70 % from 100 N to 300 N, 20 % from 300 N up.");
  expect(words()).toContain("No row is chosen.");
  act(() => store.getState().chooseRow(5));
  act(() => store.getState().choosePass(7));
  expect(words()).toMatch(/Pass 7 is unrolled below\. Row 5 is outlined\.$/);
});
