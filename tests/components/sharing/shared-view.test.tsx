import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import { ClosedShare } from "@/components/sharing/closed-share";
import { toShareInput } from "@/components/sharing/new-share";
import { rankFindings } from "@/components/sharing/shared-finding";
import { SharedView } from "@/components/sharing/shared-view";
import { UnitsProvider } from "@/components/units/use-units";
import type { SharedView as SharedViewBody } from "@/lib/schemas/shared";
import { ShareInput } from "@/lib/schemas/shares";

afterEach(cleanup);

const finding = { value: 180, unit: "N", interval: null, confidence: "high", method: "", place: null, caution: null };

const VIEW: SharedViewBody = {
  audience: "landowner",
  layers: ["verdict", "coverage"],
  expiresAt: "2031-11-24T12:00:00.000Z",
  organisationName: "Larkspur Flats",
  fieldName: "East quarter",
  blurLocation: false,
  boundary: null,
  areaM2: null,
  log: {
    name: "east-quarter-seeding",
    kind: "seeding",
    status: "ready",
    startedAt: "2031-09-24T17:00:00.000Z",
    endedAt: null,
    rows: 24,
    passes: 12,
    version: 1,
    bbox: null,
    channels: [],
  },
  verdict: {
    rowsUnderTarget: [3, 17],
    rowsAtLimit: [],
    weight: { headroomN: null, shareLiftedM2: null, state: "unknown" },
    findings: [
      { ...finding, id: "f1", kind: "target-held", severity: "ok", sentence: "Most rows held.", check: "" },
      {
        ...finding,
        id: "f2",
        kind: "row-stands-out",
        severity: "act",
        sentence: "Row 17 carried 180 N less.",
        sentenceTemplate: "Row 17 carried {difference} less.",
        values: { difference: { value: 180, unit: "N" } },
        check: "Check its disc and bushing.",
        caution: "Stop the engine and take the key before reaching under it.",
      },
    ],
  },
  coverage: { sweptM2: 80_000, coveredM2: 74_380, overlapM2: 5_620, skippedM2: 0, resolutionM: 0.25 },
};

function show(view: SharedViewBody) {
  render(
    <UnitsProvider start="imperial" keep={false}>
      <SharedView view={view} token="t" />
    </UnitsProvider>,
  );
}

describe("the page a link opens", () => {
  it("puts the gravest sentence first, in the reader's units, and says what is to be checked", async () => {
    show(VIEW);
    // 180 N / 4.4482216152605 N is 40.47 lbf (NIST SP 811), said without decimals
    const sentence = screen.getByText(/Row 17 carried 40\slbf less\./);
    const other = screen.getByText("Most rows held.");
    expect(sentence.compareDocumentPosition(other) & Node.DOCUMENT_POSITION_FOLLOWING).toBeTruthy();
    const asked = screen.getByText("Check its disc and bushing.");
    expect(within(asked).getByText("Stop the engine and take the key before reaching under it.")).toBeInTheDocument();
    await userEvent.setup().click(screen.getByRole("radio", { name: "Metric" }));
    expect(screen.getByText(/Row 17 carried 180\sN less\./)).toBeInTheDocument();
  });

  it("shows nothing that was not shared", () => {
    show({ ...VIEW, verdict: null, coverage: null });
    expect(screen.queryByText(/Row 17/)).toBeNull();
    expect(screen.queryByText(/of 24/)).toBeNull();
    expect(screen.getByText("rows logged")).toBeInTheDocument();
  });

  it("puts doubt about the readings before all that was read from them", () => {
    const [held, row] = VIEW.verdict!.findings;
    const doubt = { ...held!, id: "f3", kind: "readings-doubtful", severity: "look" as const };
    const ranked = rankFindings({ ...VIEW.verdict!, findings: [held!, row!, doubt] });
    expect(ranked.map(({ id }) => id)).toEqual(["f3", "f2", "f1"]);
  });

  it("counts the rows on target where the target is known, whatever sentences were left out", () => {
    const verdict = { ...VIEW.verdict!, findings: VIEW.verdict!.findings.slice(1) };
    show({ ...VIEW, verdict: { ...verdict, known: { underTarget: true, atLimit: true } } });
    expect(screen.getByText(/of 24/)).toBeInTheDocument();
    cleanup();
    show({ ...VIEW, verdict: { ...verdict, known: { underTarget: false, atLimit: true } } });
    expect(screen.getByText("rows logged")).toBeInTheDocument();
  });

  it("tells kindly why it shows nothing, and nothing of the field", () => {
    render(<ClosedShare state="revoked" />);
    expect(screen.getByRole("heading")).toHaveTextContent("This link was withdrawn");
    cleanup();
    render(<ClosedShare state="expired" />);
    expect(screen.getByRole("heading")).toHaveTextContent("This link has run out");
  });
});

describe("a new link", () => {
  it("asks for what was chosen and leaves out what was left empty", () => {
    const now = new Date("2031-09-24T12:00:00.000Z");
    const chosen = {
      audience: "landowner",
      layers: ["verdict"],
      logId: "",
      days: "30",
      passcode: "",
      emailTo: "",
      blurLocation: false,
    };
    const input = toShareInput(chosen as Parameters<typeof toShareInput>[0], now);
    expect(input).toEqual({
      audience: "landowner",
      layers: ["verdict"],
      expiresAt: "2031-10-24T12:00:00.000Z",
      blurLocation: false,
    });
    expect(ShareInput.safeParse(input).success).toBe(true);
  });
});
