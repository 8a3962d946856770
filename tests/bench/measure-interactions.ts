import type { Page } from "playwright-core";
import { noteInteractions, timeInteraction, upperQuartile } from "@/tests/bench/event-timing";
import { openRows, type RowsVisit } from "@/tests/bench/open-rows";
import { medianOf, printLimit } from "@/tests/bench/ratios";

/** Interactions of a kind. */
const TIMES = 12;

/** What a person does in a field's book, the n-th time. */
const KINDS: Record<string, (page: Page, time: number) => Promise<void>> = {
  "channel switch": (page, time) =>
    page
      .getByRole("radiogroup", { name: "Reading shown" })
      .getByRole("radio")
      .nth((time + 1) % 3)
      .click(),
  "class edit": async (page, time) => {
    await page
      .getByTestId("histogram")
      .getByRole("slider")
      .nth(1)
      .press(time % 2 === 0 ? "ArrowRight" : "ArrowLeft");
  },
  "row select": (page, time) =>
    page.locator(`[data-row="${3 + time * 3}"]`).click({ position: { x: 2, y: 40 }, force: true }),
  "pass step": (page) => page.getByRole("button", { name: "Pass after" }).click(),
};

/** From click or key to the paint after it, and what pointing asks of the server. */
export async function measureInteractions(visit: RowsVisit): Promise<void> {
  const page = await visit.context.newPage();
  await noteInteractions(page);
  await openRows(page, visit);
  for (const [kind, act] of Object.entries(KINDS)) {
    const times: number[] = [];
    for (let time = 0; time < TIMES; time++) times.push(await timeInteraction(page, () => act(page, time)));
    const note = `median ${medianOf(times).toFixed(0)}, longest ${Math.max(...times).toFixed(0)}, n = ${TIMES}`;
    printLimit(`${kind}: to the next paint, p75`, upperQuartile(times), { atMost: 200, unit: "ms", note });
  }
  await measurePointing(page);
  await page.close();
}

/** Places over the map that the pointer rests at. */
const PLACES = 12;

/** Nothing is asked for so long once the passes of the channel are all at hand. */
const QUIET_MS = 4_000;

async function untilQuiet(page: Page): Promise<void> {
  let latest = Date.now();
  const note = () => (latest = Date.now());
  page.on("request", note);
  while (Date.now() - latest < QUIET_MS) await page.waitForTimeout(200);
  page.off("request", note);
}

async function measurePointing(page: Page): Promise<void> {
  const asked: string[] = [];
  const box = (await page.locator("canvas.maplibregl-canvas").boundingBox())!;
  const note = (request: { url: () => string }) => asked.push(new URL(request.url()).pathname);
  await page.mouse.move(box.x + 5, box.y + 5);
  await untilQuiet(page);
  page.on("request", note);
  let named = 0;
  for (let place = 0; place < PLACES; place++) {
    const part = (place + 0.5) / PLACES;
    await page.mouse.move(box.x + box.width * (0.3 + 0.4 * part), box.y + box.height * (0.35 + 0.3 * part), {
      steps: 4,
    });
    await page.waitForTimeout(400);
    named += (await page.getByTestId("readout").getByText("Row ").count()) > 0 ? 1 : 0;
  }
  page.off("request", note);
  const words = `${named} of ${PLACES} places named a reading`;
  printLimit("pointing: requests to the server", asked.length, { atMost: 0, unit: "requests", note: words });
}
