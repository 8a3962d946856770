import { beforeEach, describe, expect, it, vi } from "vitest";
import { useTracksAtHand } from "@/components/field-book/use-tracks-at-hand";
import { renderInBook } from "@/tests/components/field-book/render-in-book";

function Keeper() {
  useTracksAtHand(true);
  return null;
}

const PASSES = [1, 2, 3].map((pass) => ({
  pass,
  startedAt: null,
  endedAt: null,
  headingDeg: 0,
  lengthM: 10,
  records: 2,
  headland: false,
}));

/** Answers what the passes endpoints do, and keeps a list of the passes asked for. */
function answerPasses(): string[] {
  const asked: string[] = [];
  vi.stubGlobal("fetch", async (path: string) => {
    const pass = /passes\/(\d+)\/readings/.exec(path)?.[1];
    if (pass === undefined) return new Response(JSON.stringify({ items: PASSES, nextCursor: null }));
    asked.push(pass);
    const places = {
      timesS: [0, 1],
      distancesM: [0, 1],
      positions: [
        [0, 0],
        [0, 0.00001],
      ],
    };
    const packedValues = Buffer.from(Float32Array.from([1, 2]).buffer).toString("base64");
    return new Response(
      JSON.stringify({ channel: "margin", unit: "N", rows: 1, records: 2, ...places, values: [], packedValues }),
    );
  });
  return asked;
}

beforeEach(() => {
  vi.unstubAllGlobals();
});

describe("passes kept at hand", () => {
  it("are fetched one after the other, those beside the chosen one first", async () => {
    const asked = answerPasses();
    const { store } = renderInBook(<Keeper />, {});
    store.getState().choosePass(3);
    await vi.waitFor(() => expect(asked).toEqual(["3", "2", "1"]), { timeout: 5_000 });
  });

  it("are not fetched for a browser that is to save data", async () => {
    const asked = answerPasses();
    vi.stubGlobal("navigator", { ...navigator, connection: { saveData: true } });
    renderInBook(<Keeper />, {});
    await new Promise((resolve) => setTimeout(resolve, 2_000));
    expect(asked).toEqual([]);
  });
});
