import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { Figure } from "@/components/pictures/figure";
import { setGreyInk } from "@/components/pictures/grey-ink";
import { PictureButton } from "@/components/pictures/picture-button";
import { PicturesProvider } from "@/components/pictures/picture-context";
import { usePrintSheet } from "@/components/pictures/use-print-sheet";

const SOURCE = { field: "East quarter", farm: null, log: "Day 1", loggedOn: "14 October 2026", cleaning: "as logged" };
const FIGURE: Figure = {
  id: "line-up",
  order: 1,
  words: { title: "Margin", unit: "N", subtitle: "Rows from left to right." },
  legend: [{ colour: "#123456", label: "under 180 N" }],
  element: () => document.querySelector<HTMLElement>("[data-figure='line-up']"),
};

/** What was handed to the person. */
let saved: { name: string; blob: Blob }[] = [];

beforeEach(() => {
  saved = [];
  HTMLElement.prototype.getBoundingClientRect = () => new DOMRect(0, 0, 400, 200);
  SVGElement.prototype.getBoundingClientRect = () => new DOMRect(0, 0, 400, 200);
  Range.prototype.getBoundingClientRect = () => new DOMRect(10, 20, 50, 14);
  let latest: Blob | null = null;
  URL.createObjectURL = (blob) => {
    latest = blob as Blob;
    return "blob:picture";
  };
  URL.revokeObjectURL = () => undefined;
  vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function (this: HTMLAnchorElement) {
    if (latest) saved.push({ name: this.download, blob: latest });
  });
});

afterEach(() => {
  cleanup();
  setGreyInk(false);
  vi.restoreAllMocks();
});

function Chart({ drawn = true }: { drawn?: boolean }) {
  return (
    <PicturesProvider source={SOURCE} hasGrey>
      {drawn ? (
        <div data-figure="line-up">
          <button className="no-print">Press me</button>
          <span className="sr-only">Only heard</span>
          <span style={{ color: "rgb(10, 20, 30)" }}>Row &lt;7&gt;</span>
          <svg width="400" height="200" className="chart">
            <rect className="bar" x="1" y="2" width="3" height="4" style={{ fill: "#C29A45" }} data-row="7" />
            <text x="5" y="6" style={{ fontSize: "11px" }}>
              943
            </text>
          </svg>
        </div>
      ) : null}
      <PictureButton figure={FIGURE} withPrint />
    </PicturesProvider>
  );
}

async function take(words: RegExp) {
  await userEvent.click(screen.getByRole("button", { name: "Picture of Margin, N" }));
  await userEvent.click(await screen.findByRole("menuitem", { name: words }));
}

describe("the picture button", () => {
  it("saves a chart as SVG with its styles, text, legend and source, and nothing that is pressed", async () => {
    render(<Chart />);
    await take(/SVG/);
    await waitFor(() => expect(saved).toHaveLength(1));
    expect(saved[0]!.name).toBe("east-quarter-day-1-margin-line-up.svg");
    const text = await saved[0]!.blob.text();
    const picture = new DOMParser().parseFromString(text, "image/svg+xml");
    expect(picture.querySelector("parsererror")).toBeNull();
    const words = Array.from(picture.querySelectorAll("text"), (line) => line.textContent.trim());
    expect(words).toContain("East quarter: Margin, N");
    expect(words).toContain("Row <7>");
    expect(words).toContain("943");
    expect(words).toContain("under 180 N");
    expect(words.join(" ")).toMatch(
      /East quarter · log Day 1 of 14 October 2026 · as logged · picture made \d+ \w+ \d{4}/,
    );
    expect(text).not.toMatch(/Press me|Only heard|class=|data-row/);
    expect(picture.querySelector("rect[x='1'][y='2']")?.getAttribute("fill")).toMatch(/c29a45|rgb\(194, 154, 69\)/i);
  });

  it("says so where nothing is drawn yet", async () => {
    render(<Chart drawn={false} />);
    await take(/SVG/);
    expect(await screen.findByRole("alert")).toHaveTextContent("There is nothing drawn here yet");
    expect(saved).toEqual([]);
  });

  it("is left out on a page that names no source", () => {
    render(<PictureButton figure={FIGURE} />);
    expect(screen.queryByRole("button")).toBeNull();
  });
});

function Printed() {
  usePrintSheet({ title: "East quarter: Margin", sentences: ["Row 7 carried 180 N less."] });
  return null;
}

describe("the page on paper", () => {
  it("is one sheet of figures, sentences and source, and is taken away afterwards", async () => {
    vi.useFakeTimers();
    render(
      <PicturesProvider source={SOURCE} hasGrey>
        <Printed />
        <div data-figure="line-up">
          <span>Row 7</span>
        </div>
        <PictureButton figure={FIGURE} />
      </PicturesProvider>,
    );
    await vi.advanceTimersByTimeAsync(2000);
    vi.useRealTimers();
    await import("@/components/pictures/build-print-sheet");
    await Promise.resolve();
    window.dispatchEvent(new Event("beforeprint"));
    const sheet = document.querySelector(".print-sheet");
    expect(sheet?.querySelector("h1")).toHaveTextContent("East quarter: Margin");
    expect(sheet).toHaveTextContent("Row 7 carried 180 N less.");
    expect(sheet?.querySelectorAll("figure svg")).toHaveLength(1);
    expect(sheet?.querySelector("footer")).toHaveTextContent("log Day 1");
    expect(document.body).toHaveClass("has-print-sheet");
    window.dispatchEvent(new Event("afterprint"));
    expect(document.querySelector(".print-sheet")).toBeNull();
    expect(document.body).not.toHaveClass("has-print-sheet");
  });
});
