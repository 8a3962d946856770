import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { act, cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeAll, describe, expect, it, vi } from "vitest";
import { ComparisonResult } from "@/components/compare-logs/comparison-result";
import { ComparisonScreen } from "@/components/compare-logs/comparison-screen";
import { readCompareAddress, writeCompareAddress } from "@/components/compare-logs/compare-address";
import { sayComparison } from "@/components/compare-logs/say-comparison";
import { OFFLINE_BASEMAP } from "@/components/map/basemap-config";
import { UnitsProvider, type UnitSystemName } from "@/components/units/use-units";
import { compareLogs } from "@/lib/comparison/compare-logs";
import { giveElementsSize } from "@/tests/components/field-book/render-in-book";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";
import { madeSide, toCompare } from "@/tests/lib/comparison/made-comparison";

const navigation = vi.hoisted(() => ({ search: "", replaced: [] as string[] }));
vi.mock("next/navigation", () => ({
  useSearchParams: () => new URLSearchParams(navigation.search),
  useRouter: () => ({ replace: (address: string) => navigation.replaced.push(address) }),
}));

beforeAll(() => giveElementsSize(600, 240));
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
  giveElementsSize(600, 240);
});

const BODY = compareLogs(
  toCompare(madeSide({ passes: 20, seed: 1 })),
  toCompare(madeSide({ passes: 20, seed: 2, allN: -120, row: { row: 5, byN: 90 } }), { name: "Day two" }),
);
const TOO_FEW = compareLogs(
  toCompare(madeSide({ passes: 5, seed: 1 })),
  toCompare(madeSide({ passes: 20, seed: 2 }), { name: "Day two" }),
);

function show(node: React.ReactNode, system: UnitSystemName = "metric") {
  return render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <UnitsProvider start={system} keep={false}>
        {node}
      </UnitsProvider>
    </QueryClientProvider>,
  );
}

describe("what two logs come to", () => {
  it("is said with number, interval and row, in the person's units", () => {
    show(<ComparisonResult body={BODY} />, "imperial");
    const said = within(screen.getByRole("region", { name: "What changed" }));
    expect(
      said.getByText(/^Margin of all rows together: \d+ lbf before, \d+ lbf after; −2\d lbf, 95 % interval/u),
    ).toBeVisible();
    expect(said.getByText(/^Beyond the other rows changed row 5 by \+(19|20|21) lbf\.$/u)).toBeVisible();
    expect(said.getByText(/only strips with and without the change, side by side, would tell/)).toBeVisible();
  });

  it("is not claimed from too few passes, and the reason stands beside it", () => {
    const [mean, rows] = sayComparison(TOO_FEW, "metric");
    expect(mean?.text).toMatch(/these passes cannot tell\.$/);
    expect(rows?.text).toBe("Whether a row changed beyond the others, these passes cannot tell.");
    show(<ComparisonResult body={TOO_FEW} />);
    expect(screen.getByText("What these logs cannot tell")).toBeVisible();
    expect(
      screen.getByText(/^An interval of all rows together needs 8 passes on either side; Day one has 5\.$/),
    ).toBeVisible();
  });

  it("marks the row that changed with a shape of its own, reached by the arrow keys", async () => {
    const { container } = show(<ComparisonResult body={BODY} />);
    expect(
      [...container.querySelectorAll("[data-told]")].map((mark) =>
        mark.closest("[data-row]")?.getAttribute("data-row"),
      ),
    ).toEqual(["5"]);
    act(() => screen.getByRole("listbox").focus());
    await userEvent.keyboard("{ArrowRight}{ArrowRight}");
    expect(screen.getByText(/^Row 2: .* cannot tell\.$|^Row 2: .* too small to matter\.$/)).toBeVisible();
  });

  it("stands in tables that sort and light a row in the charts", async () => {
    show(<ComparisonResult body={BODY} />);
    await userEvent.click(screen.getByRole("button", { name: "Beyond the other rows, N" }));
    await userEvent.click(screen.getByRole("button", { name: "Beyond the other rows, N" }));
    expect(screen.getAllByRole("button", { name: /^Light row/ })[0]).toHaveAccessibleName("Light row 5 in the charts");
    await userEvent.click(screen.getByRole("button", { name: "Light row 5 in the charts" }));
    expect(screen.getByRole("option", { name: "Row 5, more than before, beyond the others" })).toHaveAttribute(
      "aria-selected",
      "true",
    );
  });
});

describe("choosing the logs", () => {
  const field = (id: string, name: string) => ({
    id,
    name,
    farm: null,
    landowner: null,
    boundary: null,
    areaM2: null,
    logCount: 2,
    lastLogAt: null,
    newestLog: null,
    waitingLogs: 0,
    createdAt: "2031-09-01T08:00:00.000Z",
    updatedAt: "2031-09-01T08:00:00.000Z",
  });
  const FIELDS = [field("fld_east", "East quarter"), field("fld_mill", "Mill bottom")];
  const LOGS = [
    makeLogReply({ id: "log_one", fieldId: "fld_east", name: "Day one" }),
    makeLogReply({ id: "log_two", fieldId: "fld_east", name: "Day two" }),
    makeLogReply({ id: "log_new", fieldId: "fld_east", name: "Unread", status: "queued" }),
  ];
  const serve = () =>
    vi.stubGlobal("fetch", async (path: string) => {
      if (/\/fields\/\w+\/logs/.test(path)) {
        return Response.json({ items: LOGS.filter((log) => path.includes(log.fieldId)), nextCursor: null });
      }
      if (/\/fields\/\w+$/.test(path)) return Response.json(FIELDS.find(({ id }) => path.endsWith(id)));
      return Response.json({ items: FIELDS, nextCursor: null });
    });
  const open = (search: string) => {
    serve();
    navigation.search = search;
    navigation.replaced = [];
    show(
      <ComparisonScreen start={{ beforeFieldId: "fld_east", afterFieldId: "fld_east" }} basemap={OFFLINE_BASEMAP} />,
    );
    return screen.findAllByRole("option", { name: /^Day one/ });
  };

  it("offers logs that were read, never the one on the other side, and keeps the choice in the address", async () => {
    await open("b=log_two");
    expect(screen.getByText("Choose two logs")).toBeVisible();
    const before = within(screen.getByRole("group", { name: "Before the change" }));
    expect(before.queryByRole("option", { name: /Day two|Unread/ })).toBeNull();
    await userEvent.selectOptions(before.getByLabelText("Log"), "log_one");
    expect(navigation.replaced).toEqual(["?a=log_one&b=log_two"]);
  });

  it("swaps the two, and takes a log from another field", async () => {
    await open("b=log_two&channel=margin");
    await userEvent.click(screen.getByRole("button", { name: "Swap" }));
    expect(navigation.replaced).toEqual(["?a=log_two&channel=margin"]);
    const after = within(screen.getByRole("group", { name: "After the change" }));
    await userEvent.selectOptions(after.getByLabelText("Field"), "fld_mill");
    expect(after.getByText("No other log here has been read")).toBeInTheDocument();
  });

  it("reads from an address what it writes", () => {
    const address = { before: "log_a", after: "log_b", channel: "deviation:margin" };
    expect(readCompareAddress(new URLSearchParams(writeCompareAddress(address)))).toEqual(address);
    expect(readCompareAddress(new URLSearchParams("channel=nothing"))).toEqual({
      before: null,
      after: null,
      channel: null,
    });
  });
});
