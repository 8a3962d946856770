import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { DelaySection } from "@/components/cleaning/delay-section";
import { sayChannelDelay } from "@/components/cleaning/say-delay";
import type { ChannelDelay, DelaysBody } from "@/lib/schemas/alignment";

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const FOUND: ChannelDelay = {
  channel: "margin",
  unit: "N",
  state: "estimated",
  delayS: 1.52,
  delayIntervalS: [1.31, 1.7],
  distanceM: 0.1,
  distanceIntervalM: [-0.3, 0.4],
  shiftM: 3.4,
  shiftIntervalM: [3.1, 3.7],
  separable: true,
  usualSpeedMps: 2.2,
  pairs: 24,
  sharpness: 0.6,
  // Least where the delay is, the square of 92 N.
  curve: [-3, 0, 1.5, 3, 20].map((delayS) => ({ delayS, j: 92 ** 2 + 400 * (delayS - 1.5) ** 2 })),
  method: "Each pair of passes compared on a grid along the way.",
  applied: null,
};

const REFUSED: ChannelDelay = {
  ...FOUND,
  channel: "depth",
  unit: "m",
  state: "refused",
  reason: "Only 2 pairs of neighbouring passes run in opposite directions; 6 are needed.",
  reasonCode: "few-pairs",
  delayS: null,
  delayIntervalS: null,
  distanceM: null,
  distanceIntervalM: null,
  curve: [],
};

function serve(body: Partial<DelaysBody>) {
  const asked: { method: string; body: unknown }[] = [];
  let now: DelaysBody = { state: "done", progress: 1, channels: ["margin", "depth"], items: [], ...body };
  vi.stubGlobal("fetch", async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? "GET";
    const sent: unknown = typeof init.body === "string" ? JSON.parse(init.body) : undefined;
    asked.push({ method, body: sent });
    if (!path.endsWith("/delays")) throw new Error(`nobody should ask for ${path}`);
    if (method === "POST") now = { ...now, state: "working", progress: 0.4 };
    if (method === "PUT") {
      const { delaysS } = sent as { delaysS: Record<string, number> };
      now = { ...now, items: now.items.map((item) => ({ ...item, applied: delaysS[item.channel] || item.applied })) };
    }
    return Response.json(now, { status: method === "POST" ? 202 : 200 });
  });
  return asked;
}

function open(mayChange = true) {
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <DelaySection logId="log_east" mayChange={mayChange} />
    </QueryClientProvider>,
  );
}

const lineOf = (channel: string) => document.querySelector<HTMLElement>(`[data-channel="${channel}"]`)!;

describe("the delay of a channel in words", () => {
  it("comes with its interval and what it was found from", () => {
    const [found, distance] = sayChannelDelay(FOUND, "metric");
    expect(found).toBe(
      "Margin seems logged 1.5\u202fs late (1.3\u202fs to 1.7\u202fs, 95\u202f% interval), from 24 pairs of neighbouring passes driven in opposite directions.",
    );
    expect(distance).toBe("Besides, no distance between antenna and rows seems wrong.");
  });

  it("tells a distance beside it in the person's units", () => {
    const item: ChannelDelay = { ...FOUND, delayS: -0.02, distanceM: 1.2, distanceIntervalM: [0.9, 1.5] };
    const [found, distance] = sayChannelDelay(item, "imperial");
    expect(found).toMatch(/^Margin seems logged without delay \(/);
    // 1.2 m = 3.937 ft, 0.9 m = 2.953 ft, 1.5 m = 4.921 ft (NIST SP 811).
    expect(distance).toMatch(
      /^Besides, its readings belong 3\.9\sft behind .* \(3\.0\sft to 4\.9\sft, 95\s% interval\)/,
    );
  });

  it("owns that a delay and a distance could not be told apart", () => {
    const item: ChannelDelay = { ...FOUND, separable: false, distanceM: null, distanceIntervalM: null };
    expect(sayChannelDelay(item, "metric")[1]).toMatch(
      /cannot|too little to tell a delay from a distance: .* 3\.4\sm at 7\.9\skm\/h/,
    );
  });

  it("is refused with the reason", () => {
    expect(sayChannelDelay(REFUSED, "metric")).toEqual([
      "No delay can be told for depth. Only 2 pairs of neighbouring passes run in opposite directions; 6 are needed.",
    ]);
  });
});

describe("the section on delays", () => {
  it("shows what was found with a curve that says its least point, and takes it out on demand", async () => {
    const asked = serve({ items: [FOUND, REFUSED] });
    open();
    await screen.findByRole("heading", { name: "Margin" });
    const margin = within(lineOf("margin"));
    expect(margin.getByRole("img")).toHaveAccessibleName(/least, 92\sN, at 1\.5\ss/);
    expect(margin.getByText("Delay tried, s")).toBeInTheDocument();
    expect(within(lineOf("depth")).queryByRole("button")).toBeNull();
    await userEvent.click(margin.getByRole("button", { name: /^Use 1\.5\ss for Margin$/ }));
    expect(asked.find(({ method }) => method === "PUT")?.body).toMatchObject({ delaysS: { margin: 1.5 } });
    expect(await margin.findByText(/1\.5\ss are taken out/)).toBeVisible();
    expect(margin.queryByRole("button", { name: /^Use/ })).toBeNull();
    await userEvent.click(margin.getByRole("button", { name: "Put Margin back as logged" }));
    expect(asked.filter(({ method }) => method === "PUT").at(-1)?.body).toMatchObject({ delaysS: { margin: 0 } });
  });

  it("looks for delays when asked, and says that it is at work", async () => {
    serve({ state: "none" });
    open();
    await userEvent.click(await screen.findByRole("button", { name: "Look for delays" }));
    expect(await screen.findByRole("status")).toHaveTextContent("Comparing neighbouring passes");
    expect(screen.queryByRole("button", { name: /Look/ })).toBeNull();
  });

  it("offers nothing to change to those who may only look", async () => {
    serve({ items: [FOUND] });
    open(false);
    await screen.findByRole("heading", { name: "Margin" });
    expect(screen.queryByRole("button")).toBeNull();
  });
});
