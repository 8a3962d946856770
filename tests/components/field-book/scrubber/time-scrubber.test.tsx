import { act, fireEvent, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { TimeScrubber } from "@/components/field-book/scrubber/time-scrubber";
import { buildWorkClock } from "@/lib/map-state/work-clock";
import { LOG, renderInBook } from "@/tests/components/field-book/render-in-book";

const instant = (seconds: number) => new Date(Date.parse(LOG.startedAt!) + seconds * 1000).toISOString();
const pass = (number: number, startS: number, endS: number) => ({
  pass: number,
  startedAt: instant(startS),
  endedAt: instant(endS),
  headingDeg: 20,
  lengthM: 300,
  records: 100,
  headland: false,
});
/** 600 s at work in two passes, ten minutes apart. */
const clock = buildWorkClock([pass(1, 0, 300), pass(2, 900, 1200)], LOG.startedAt)!;

const slider = () => screen.getByRole("slider", { name: "Time at work" });
const open = (timeS: number, startsPlaying = false) =>
  renderInBook(<TimeScrubber clock={clock} startsPlaying={startsPlaying} />, { state: { timeS, pass: 1, row: 4 } });

describe("the time scrubber", () => {
  it("moves by keys over the break, names the pass, and unrolls it", () => {
    const { store } = open(295);
    fireEvent.keyDown(slider(), { key: "ArrowRight" });
    expect(store.getState()).toMatchObject({ timeS: 905, pass: 2 });
    expect(screen.getByTestId("moment")).toHaveTextContent("pass 2");
  });

  it("is moved by hand", () => {
    const { store } = open(0);
    fireEvent.change(slider(), { target: { value: "450" } });
    expect(store.getState()).toMatchObject({ timeS: 1050, pass: 2 });
  });

  it("shows the whole field again when put away", async () => {
    const { store } = open(100);
    await userEvent.click(screen.getByRole("button", { name: "Show all that was seeded" }));
    expect(store.getState().timeS).toBeNull();
  });
});

describe("playing", () => {
  beforeEach(() => {
    vi.useFakeTimers();
    vi.stubGlobal("matchMedia", () => ({ matches: false }));
  });
  afterEach(() => {
    vi.useRealTimers();
    vi.unstubAllGlobals();
  });
  const wait = (milliseconds: number) => act(() => vi.advanceTimersByTime(milliseconds));

  it("runs as fast as asked for, pauses by the space bar, and stops at the end", () => {
    const { store } = open(0, true);
    wait(500);
    // 300 times as fast, half a second: 150 s at work.
    expect(store.getState().timeS).toBeCloseTo(150, 3);
    fireEvent.keyDown(slider(), { key: " " });
    wait(1000);
    expect(store.getState().timeS).toBeCloseTo(150, 3);
    fireEvent.keyDown(slider(), { key: " " });
    wait(5000);
    expect(store.getState()).toMatchObject({ timeS: 1200, pass: 2 });
    expect(screen.getByRole("button", { name: "Play" })).toBeInTheDocument();
  });

  it("goes in steps where no motion is wanted", () => {
    vi.stubGlobal("matchMedia", () => ({ matches: true }));
    const { store } = open(0, true);
    const moments = new Set<number | null>();
    store.subscribe(({ timeS }) => moments.add(timeS));
    wait(1900);
    expect(store.getState().timeS).toBe(0);
    wait(200);
    expect([...moments]).toHaveLength(1);
  });
});
