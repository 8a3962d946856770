import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { CleaningScreen } from "@/components/cleaning/cleaning-screen";
import { OFFLINE_BASEMAP } from "@/components/map/basemap-config";
import { UnitsProvider, type UnitSystemName } from "@/components/units/use-units";
import type { Role } from "@/lib/access/permissions";
import type { CleaningRules } from "@/lib/cleaning/rule-catalogue";
import type { Cleaning } from "@/lib/schemas/cleaning";
import type { Field } from "@/lib/schemas/fields";
import { countCleaning, makeCleaning, startingRules } from "@/tests/components/cleaning/make-cleaning";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const FIELD: Field = {
  id: "fld_eastquarter1",
  name: "East quarter",
  farm: "Larkspur Flats",
  landowner: null,
  boundary: null,
  areaM2: null,
  logCount: 1,
  lastLogAt: null,
  newestLog: null,
  waitingLogs: 0,
  createdAt: "2031-09-01T08:00:00.000Z",
  updatedAt: "2031-09-01T08:00:00.000Z",
};

interface Asked {
  method: string;
  path: string;
  body: { rules?: CleaningRules; revert?: number; note?: string } | undefined;
}

/** A server with one log, whose rules can be changed and gone back to. */
function serve(start: Cleaning = makeCleaning()) {
  const asked: Asked[] = [];
  let now = start;
  const kept = new Map([[start.revision, start.rules]]);
  const revise = (rules: CleaningRules, note: string | null, revertedTo: number | null): Cleaning => {
    const revision = now.revision + 1;
    kept.set(revision, rules);
    const entry = { revision, at: "2031-10-14T16:05:00.000Z", by: "Ada Field", note, revertedTo };
    now = makeCleaning({ rules, revision, history: [entry, ...now.history] });
    return now;
  };
  vi.stubGlobal("fetch", async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? "GET";
    const body = typeof init.body === "string" ? (JSON.parse(init.body) as Asked["body"]) : undefined;
    asked.push({ method, path, body });
    if (path.endsWith("/preview")) return Response.json(countCleaning(body?.rules ?? now.rules));
    if (path.endsWith("/undo")) {
      const back = body?.revert ?? now.revision - 1;
      return Response.json(revise(kept.get(back) ?? now.rules, null, back));
    }
    if (path.endsWith("/cleaning")) {
      return Response.json(method === "POST" ? revise(body?.rules ?? now.rules, body?.note ?? null, null) : now);
    }
    if (path.includes("/delays")) return Response.json({ state: "none", progress: 0, channels: [], items: [] });
    if (path.includes("/fields/")) return Response.json(FIELD);
    const channels = ["margin", "downforce", "contact"].map((id) => ({
      id,
      unit: "N",
      min: 0,
      max: 900,
      perRow: true,
    }));
    return Response.json(makeLogReply({ fieldId: FIELD.id, channels }));
  });
  return asked;
}

function open({ role = "agronomist", system = "metric" }: { role?: Role; system?: UnitSystemName } = {}) {
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <UnitsProvider start={system} keep={false}>
        <CleaningScreen fieldId={FIELD.id} logId="log_larkspur0001" role={role} basemap={OFFLINE_BASEMAP} />
      </UnitsProvider>
    </QueryClientProvider>,
  );
}

const findSwitch = (name: string) => screen.findByRole("switch", { name });
const ruleLine = (code: string) => document.querySelector<HTMLElement>(`[data-rule="${code}"]`)!;

describe("the rules of a log", () => {
  it("stand in their order, each with its words, its numbers and what it would take out", async () => {
    serve();
    open();
    await findSwitch("Turning");
    const names = screen.getAllByRole("switch").map((found) => found.closest("li")?.dataset.rule);
    expect(names).toEqual(Object.keys(startingRules()));
    const turning = within(ruleLine("turning"));
    expect(turning.getByRole("switch")).not.toBeChecked();
    expect(turning.getByRole("switch")).toHaveAccessibleDescription(/Leaves out readings that were logged in a turn/);
    expect(turning.getByText(/would take out/)).toHaveTextContent(/600 readings, 6\.0\s?%/);
    expect(within(ruleLine("speed")).getByText(/would take out/)).toHaveTextContent(/1 reading, 0\.01\s?%/);
  });

  it("say the measure of what stands alone in words beside its number", async () => {
    serve();
    open();
    await findSwitch("Stands alone");
    const line = within(ruleLine("local-outlier"));
    expect(line.getByRole("textbox", { name: "more usual spreads than" })).toHaveValue("5");
    expect(line.getByRole("switch")).toHaveAccessibleDescription(
      /half of all readings lie within two thirds of a spread/,
    );
    expect(line.queryByText(/robust|z-score/i)).toBeNull();
  });

  it("cannot be switched off where nothing would have a place, and say why", async () => {
    serve();
    open();
    const fixed = await findSwitch("No position");
    expect(fixed).toBeDisabled();
    expect(fixed).toHaveAccessibleDescription(/Always on\. A record without a position stands nowhere/);
  });

  it("are tried before they are used, used, and undone", async () => {
    const asked = serve();
    open();
    await userEvent.click(await findSwitch("Turning"));
    const bar = within(screen.getByRole("region", { name: "Changed rules" }));
    expect(bar.getByText(/Turning changed/)).toBeVisible();
    await bar.findByText(/Would leave out 6\.0\s?% of the readings in passes; now it is 0\s?%/);
    expect(screen.getByTestId("cleaning-total")).toHaveTextContent(/600 readings of 10\s000/);
    // Nothing is kept yet.
    expect(asked.filter(({ method, path }) => method === "POST" && !path.endsWith("/preview"))).toEqual([]);

    await userEvent.type(bar.getByRole("textbox", { name: "Why (for the history)" }), "Turns at the pond");
    await userEvent.click(bar.getByRole("button", { name: "Use these rules" }));
    await waitFor(() => expect(screen.queryByRole("region", { name: "Changed rules" })).toBeNull());
    const sent = asked.find(({ method, path }) => method === "POST" && path.endsWith("/cleaning"))?.body;
    expect(sent?.rules?.turning.on).toBe(true);
    expect(sent?.note).toBe("Turns at the pond");
    expect(await screen.findByText(/are left out/)).toBeVisible();
    expect(screen.getByText("Change 1").closest("li")).toHaveTextContent(/Turns at the pond.*Ada Field.*In force/);

    await userEvent.click(screen.getByRole("button", { name: "Undo the last change" }));
    await waitFor(() => expect(screen.getByRole("switch", { name: "Turning" })).not.toBeChecked());
    expect(screen.getByText("Change 2").closest("li")).toHaveTextContent("back to the log as read");
    // What undoing an undo does is what its button says.
    expect(screen.queryByRole("button", { name: "Undo the last change" })).toBeNull();
    await userEvent.click(screen.getByRole("button", { name: "Redo the last change" }));
    await waitFor(() => expect(screen.getByRole("switch", { name: "Turning" })).toBeChecked());
    await userEvent.click(await screen.findByRole("button", { name: "Undo the last change" }));
    await waitFor(() => expect(screen.getByRole("switch", { name: "Turning" })).not.toBeChecked());
    await userEvent.click(screen.getByRole("button", { name: "Go back to change 1" }));
    await waitFor(() => expect(screen.getByRole("switch", { name: "Turning" })).toBeChecked());
  });

  it("are asked about once the person pauses, not at every key", async () => {
    const asked = serve();
    open();
    await findSwitch("Turning");
    const number = within(ruleLine("turning")).getByRole("textbox", { name: "more than" });
    await userEvent.clear(number);
    await userEvent.type(number, "60");
    await waitFor(() => expect(asked.some(({ path }) => path.endsWith("/preview"))).toBe(true));
    const tried = asked.filter(({ path }) => path.endsWith("/preview")).map(({ body }) => body?.rules?.turning.turnDeg);
    expect(tried).toEqual([60]);
  });

  it("name a number by what it bounds, and leave its unit to the unit", async () => {
    serve();
    open({ system: "imperial" });
    await findSwitch("Start of a pass");
    // 5 m = 16.40 ft (NIST SP 811).
    const first = within(ruleLine("start-ramp")).getByRole("textbox", { name: "first" });
    expect(first).toHaveValue("16.4");
    expect(first).toHaveAccessibleDescription("ft");
    expect(within(ruleLine("end-ramp")).getByRole("textbox", { name: "last" })).toHaveValue("16.4");
    for (const code of ["start-ramp", "end-ramp"]) expect(ruleLine(code)).not.toHaveTextContent(/metre/);
  });

  it("stand in columns where a rule has many numbers, and in a line where it has few", async () => {
    serve();
    open();
    await findSwitch("Beyond what can be");
    const linesOf = (code: string) =>
      within(ruleLine(code))
        .getAllByRole("textbox")
        .map((box) => box.parentElement!.parentElement!.className);
    const many = linesOf("physical-range");
    expect(many).toHaveLength(6);
    for (const line of many) expect(line).toMatch(/(^| )grid grid-cols-/);
    for (const line of linesOf("speed")) expect(line).not.toMatch(/grid/);
  });

  it("warn of leaving out the low margins that the verdict looks for", async () => {
    serve();
    open();
    await findSwitch("Beyond what can be");
    const line = within(ruleLine("physical-range"));
    const limit = line.getByRole("textbox", { name: "margin under" });
    expect(line.queryByText(/improves the verdict/)).toBeNull();
    await userEvent.clear(limit);
    await userEvent.type(limit, "100");
    expect(line.getByText(/lost contact is what it looks for/)).toBeVisible();
    await userEvent.clear(limit);
    await userEvent.type(limit, "0");
    expect(line.queryByText(/improves the verdict/)).toBeNull();
  });

  it("take numbers in the person's units, and refuse what makes no sense", async () => {
    const asked = serve();
    open({ system: "imperial" });
    await findSwitch("Speed");
    const slow = within(ruleLine("speed")).getByRole("textbox", { name: "slower than" });
    // 0.5 m/s is 1.11847 mph (NIST SP 811), shown to four figures.
    expect(slow).toHaveValue("1.118");
    await userEvent.clear(slow);
    await userEvent.type(slow, "2");
    await waitFor(() => expect(asked.some(({ path }) => path.endsWith("/preview"))).toBe(true));
    // 2 mph = 0.89408 m/s.
    expect(asked.find(({ path }) => path.endsWith("/preview"))?.body?.rules?.speed.minMps).toBeCloseTo(0.89408, 5);
    await userEvent.clear(slow);
    await userEvent.type(slow, "fast");
    expect(slow).toHaveAccessibleDescription(/Enter a number/);
    expect(screen.getByRole("button", { name: "Use these rules" })).toBeDisabled();
    await userEvent.click(screen.getByRole("button", { name: "Drop the changes" }));
    expect(within(ruleLine("speed")).getByRole("textbox", { name: "slower than" })).toHaveValue("1.118");
  });

  it("show what they do to each measure, sortable, in a table", async () => {
    const rules = startingRules();
    serve(makeCleaning({ rules: { ...rules, turning: { ...rules.turning, on: true } }, revision: 4 }));
    open();
    const table = within(await screen.findByRole("table", { name: "Each measure as logged and with the rules" }));
    expect(table.getByRole("row", { name: /^Mean/ })).toHaveTextContent(
      /As logged400\.0\s?NWith the rules410\.0\s?NChange\+10\.0\s?NChange, % of as logged\+2\.5\s?%$/,
    );
    expect(table.getByRole("row", { name: /^Under target/ })).toHaveTextContent(
      /As logged12\.0\s?%With the rules10\.0\s?%Change\u22122\.0\s?%.*–$/,
    );
    await userEvent.click(table.getByRole("button", { name: "Change" }));
    expect(table.getByRole("columnheader", { name: "Change" })).toHaveAttribute("aria-sort", "ascending");
  });

  it("are to look at only for a researcher, and say who may change them", async () => {
    serve();
    open({ role: "researcher" });
    expect(await findSwitch("Turning")).toBeDisabled();
    expect(screen.getByText(/You are here as researcher\. An owner or an agronomist/)).toBeVisible();
    expect(screen.queryByRole("button", { name: /Undo|Go back|Look for delays/ })).toBeNull();
  });

  it("that cannot be fetched say so", async () => {
    const detail = "This log has not been read yet.";
    const problem = { type: "about:blank", title: "Conflict", status: 409, detail, code: "log_not_ready" };
    vi.stubGlobal("fetch", async () => Response.json(problem, { status: 409 }));
    open();
    expect(await screen.findByRole("alert")).toHaveTextContent(detail);
  });
});
