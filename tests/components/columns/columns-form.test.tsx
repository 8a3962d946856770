import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { ColumnsForm } from "@/components/columns/columns-form";
import { ApiProblem } from "@/lib/api/api-problem";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Log } from "@/lib/schemas/logs";
import type { MachineReply } from "@/lib/schemas/machines";
import { makeColumn, makeFound } from "@/tests/components/columns/make-columns";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(cleanup);

const log: Log = makeLogReply({ status: "needs-mapping" });

function show(found = makeFound([makeColumn("AUX_3", null)]), failure: unknown = null) {
  const onSave = vi.fn<(mapping: LogMapping, machineId: string | null) => void>();
  render(<ColumnsForm log={log} found={found} machines={[]} pending={false} failure={failure} onSave={onSave} />);
  return { onSave, user: userEvent.setup() };
}

describe("the columns screen", () => {
  it("cannot be confirmed while a column is undecided, and can once it is left out", async () => {
    const { onSave, user } = show();
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    expect(screen.getByText("1 question still needs you.")).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Leave out" }));
    expect(screen.getByText(/'AUX_3'/).closest("p")).toHaveTextContent("Column 'AUX_3' is not used.");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].columns).toHaveLength(5);
  });

  it("says a sentence anew when the unit of a whole group changes", async () => {
    const { onSave, user } = show(makeFound());
    const group = screen.getByRole("article", { name: "3 columns" });
    await user.click(within(group).getByRole("button", { name: "Change all" }));
    await user.selectOptions(within(group).getByLabelText("In"), "N");
    expect(group).toHaveTextContent("are the downforce of rows 1 to 3 in newtons");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    const forces = onSave.mock.calls[0]?.[0].columns.filter((column) => column.channel === "downforce");
    expect(forces?.map(({ row, unit }) => [row, unit])).toEqual([
      [1, "N"],
      [2, "N"],
      [3, "N"],
    ]);
  });

  it("asks a person to look at an unsure column before it is read", async () => {
    const unsure = makeColumn("HDG", {
      channel: "heading",
      unit: "deg",
      confidence: 0.5,
      reason: "values from 0 to 360",
    });
    const { user } = show(makeFound([unsure]));
    expect(screen.getByText("please check")).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    await user.click(screen.getByRole("button", { name: "That is right" }));
    expect(screen.getByRole("button", { name: "Read the log" })).toBeEnabled();
  });

  it("puts the server's words beside the column they are about", () => {
    const problem = new ApiProblem({
      type: "about:blank",
      title: "The input breaks a rule",
      status: 422,
      detail: "The mapping cannot be used.",
      code: "unit-does-not-fit",
      errors: [{ column: "LON_deg", message: "Longitude is not a force." }],
    });
    show(makeFound(), problem);
    const card = screen.getByRole("article", { name: "Column LON_deg" });
    expect(within(card).getByRole("alert")).toHaveTextContent("Longitude is not a force.");
  });
});

describe("what the file leaves open", () => {
  it("offers the logs of a file that holds several, and names the chosen one", async () => {
    const found = makeFound();
    const west = makeFound([makeColumn("AUX_3", null)], 2);
    const layers = [
      { id: "TSK-2/TLG00002", label: "East", records: 1234, shape: "wide" as const, columns: found.columns },
      { id: "TSK-1/TLG00001", label: "West", records: 40, shape: "wide" as const, columns: west.columns },
    ];
    const { onSave, user } = show({ ...found, layers });
    const picker = screen.getByLabelText("Log to read");
    expect(within(picker).getAllByRole("option")).toHaveLength(2);
    expect(picker).toHaveDisplayValue("East (1,234 records)");
    await user.selectOptions(picker, "TSK-1/TLG00001");
    // The other log has a column of its own that nobody has decided.
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    await user.click(screen.getByRole("button", { name: "Leave out" }));
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0]).toMatchObject({ layer: "TSK-1/TLG00001" });
    expect(onSave.mock.calls[0]?.[0].columns).toHaveLength(4);
  });

  it("turns rows round that are counted from the right, and keeps that when the meanings are sent again", async () => {
    const { onSave, user } = show(makeFound());
    await user.selectOptions(screen.getByLabelText("Row 1 of this file"), "is the rightmost row");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    const sent = onSave.mock.calls[0]?.[0];
    expect(sent).toMatchObject({ rowsFromRight: true });
    cleanup();
    const again = show({ ...makeFound(), mapping: sent });
    expect(screen.getByLabelText("Row 1 of this file")).toHaveDisplayValue("is the rightmost row");
    await again.user.selectOptions(screen.getByLabelText("Row 1 of this file"), "is the leftmost row");
    await again.user.click(screen.getByRole("button", { name: /^Read the log/ }));
    expect(again.onSave.mock.calls[0]?.[0]).not.toHaveProperty("rowsFromRight");
  });

  it("does not ask for a log where there is one", () => {
    show(makeFound());
    expect(screen.queryByLabelText("Log to read")).not.toBeInTheDocument();
  });

  it("offers the systems that put the log near the field, and takes one only when it is pressed", async () => {
    const found = makeFound();
    found.columns.splice(
      0,
      2,
      makeColumn("E", { channel: "easting", unit: "m" }),
      makeColumn("N", { channel: "northing", unit: "m" }),
    );
    const crsCandidates = [{ crs: "EPSG:32614", words: "UTM zone 14 north, which puts the log 2 km from the field" }];
    const { onSave, user } = show({ ...found, crsCandidates });
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    await user.click(screen.getByRole("button", { name: /Use UTM zone 14 north/ }));
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].crs).toBe("EPSG:32614");
  });

  it("proposes what counts as missing, says it, and refuses what is no number", async () => {
    const { onSave, user } = show(
      makeFound([makeColumn("DEPTH_mm", { channel: "depth", unit: "mm", missing: [-999] })]),
    );
    const card = screen.getByRole("article", { name: "Column DEPTH_mm" });
    expect(card).toHaveTextContent("-999 counts as missing");
    await user.click(within(card).getByRole("button", { name: "Change" }));
    const field = within(card).getByLabelText("Counts as missing");
    await user.clear(field);
    await user.type(field, "none");
    expect(within(card).getByRole("alert")).toHaveTextContent("as numbers");
    await user.clear(field);
    await user.type(field, "-999, 65535");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].columns.at(-1)).toMatchObject({ name: "DEPTH_mm", missing: [-999, 65535] });
  });

  it("lets a person say how degrees are written", async () => {
    const found = makeFound();
    const { onSave, user } = show(found);
    const card = screen.getByRole("article", { name: "Column LON_deg" });
    await user.click(within(card).getByRole("button", { name: "Change" }));
    await user.selectOptions(within(card).getByLabelText("Written as"), "dd.dddd W");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].columns[0]).toMatchObject({ channel: "longitude", format: "dd.dddd W" });
  });
});

/** 3 rows a quarter metre apart, as a file describes its own machine. */
const device = {
  name: "Larkspur drill",
  rows: 3,
  rowSpacingM: 0.25,
  widthM: 0.75,
  rowOffsetsM: [-0.25, 0, 0.25],
  rowForwardM: [0, 0, 0],
  rowWidthsM: [0.25, 0.25, 0.25],
  rowsBehindReferenceM: null,
};

describe("a file that describes its machine", () => {
  const chosen = (rowSpacingM: number): MachineReply => ({
    kind: "seeder",
    id: "mac_1",
    name: "Chosen drill",
    rowCount: 3,
    rowSpacingM,
    antennaToRowsM: 2,
    antennaRightM: 0,
    hitch: "rigid",
    rowUnitMassKg: 80,
    createdAt: "2026-12-01T12:00:00Z",
    updatedAt: "2026-12-01T12:00:00Z",
  });
  const showDevice = (machines: MachineReply[], makeMachineHref: string | null) =>
    render(
      <ColumnsForm
        log={log}
        found={{ ...makeFound(), device }}
        machines={machines}
        machineId={machines[0]?.id ?? null}
        makeMachineHref={makeMachineHref}
        pending={false}
        failure={null}
        onSave={vi.fn()}
      />,
    );

  it("says so, and offers to make a machine of it to those who may", () => {
    showDevice([], "/larkspur/machines/new?log=log_1");
    expect(screen.getByText(/Larkspur drill: 3 rows/)).toBeInTheDocument();
    const link = screen.getByRole("link", { name: "Make a machine from this" });
    expect(link).toHaveAttribute("href", "/larkspur/machines/new?log=log_1");
    cleanup();
    showDevice([], null);
    expect(screen.queryByRole("link", { name: "Make a machine from this" })).not.toBeInTheDocument();
    expect(screen.getByText(/An owner or agronomist can make a machine/)).toBeInTheDocument();
  });

  it("warns where the chosen machine is another, and says when it is the same", () => {
    showDevice([chosen(0.3)], "/larkspur/machines/new?log=log_1");
    expect(screen.getByText("Chosen drill is another machine than that")).toBeInTheDocument();
    expect(screen.getByText(/wide, the chosen one/)).toBeInTheDocument();
    cleanup();
    showDevice([chosen(0.25)], "/larkspur/machines/new?log=log_1");
    expect(screen.getByText("Chosen drill has its rows in the same places.")).toBeInTheDocument();
  });
});

describe("ground contact", () => {
  const contactColumn = makeColumn("GW_01", { channel: "contact", row: 1, unit: "percent" });

  it("is asked how it is defined, and the answer is sent with the meanings", async () => {
    const { onSave, user } = show(makeFound([contactColumn]));
    await user.selectOptions(screen.getByLabelText("What it means in this log"), "share-of-time");
    await user.type(screen.getByLabelText("Over how long"), "1");
    await user.type(screen.getByLabelText("In their words"), "gauge wheel pin");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].contact).toEqual({
      kind: "share-of-time",
      windowS: 1,
      words: "gauge wheel pin",
    });
  });

  it("can be counted as lost", async () => {
    const { onSave, user } = show(makeFound([contactColumn]));
    const card = screen.getByRole("article", { name: "Column GW_01" });
    await user.click(within(card).getByRole("button", { name: "Change" }));
    await user.selectOptions(within(card).getByLabelText("Counts"), "lost");
    expect(card).toHaveTextContent("counted where it was lost");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].columns.at(-1)).toMatchObject({ channel: "contact", format: "lost" });
  });

  it("stays unsaid where nobody says it, and is not asked of other files", async () => {
    const { onSave, user } = show(makeFound([contactColumn]));
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0]).not.toHaveProperty("contact");
    cleanup();
    show(makeFound());
    expect(screen.queryByLabelText("What it means in this log")).not.toBeInTheDocument();
  });

  it("does not send what is no number", async () => {
    const { user } = show(makeFound([contactColumn]));
    await user.selectOptions(screen.getByLabelText("What it means in this log"), "at-the-moment");
    await user.type(screen.getByLabelText("Load from which it counts as contact"), "much");
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    expect(screen.getByText(/write the load and the time as numbers/)).toBeInTheDocument();
  });
});

describe("times that name no offset", () => {
  const stamped = (text: string) => makeFound([makeColumn("TIME", { channel: "time", unit: "iso8601" }, [text])]);

  it("ask for the zone of the log's clock, and send it", async () => {
    const { onSave, user } = show(stamped("2026-09-24T14:05:00"));
    const zone = screen.getByLabelText("Time zone of the log's clock");
    await user.clear(zone);
    await user.type(zone, "America/Chicago");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0].timeZone).toBe("America/Chicago");
  });

  it("are read as UTC where nobody names one; a zone nobody was asked for is never sent", async () => {
    const { onSave, user } = show(stamped("2026-09-24T14:05:00"));
    await user.clear(screen.getByLabelText("Time zone of the log's clock"));
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0]).not.toHaveProperty("timeZone");
    cleanup();
    const zoned = show(stamped("2026-09-24T14:05:00Z"));
    expect(screen.queryByLabelText("Time zone of the log's clock")).not.toBeInTheDocument();
    await zoned.user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(zoned.onSave.mock.calls[0]?.[0]).not.toHaveProperty("timeZone");
  });
});

/** `ts,lat,lon,A1..A4,foo`: nothing in the header says what the numbered columns are. */
function makeUnhelpful() {
  const bare = ["A1", "A2", "A3", "A4"].map((name) => makeColumn(name, null));
  return { ...makeFound(bare, 0), shape: "single" as const };
}

describe("a wide file whose header says nothing", () => {
  it("numbers the rows of a group by itself and sends the mapping as wide", async () => {
    const { onSave, user } = show(makeUnhelpful());
    const group = screen.getByRole("article", { name: "4 columns" });
    await user.selectOptions(within(group).getByLabelText("Is"), "downforce");
    await user.selectOptions(within(group).getByLabelText("In"), "lbf");
    expect(group).toHaveTextContent("are the downforce of rows 1 to 4 in pounds-force");
    expect(screen.getByLabelText("Layout of the file")).toHaveValue("wide");
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    const sent = onSave.mock.calls[0]?.[0];
    expect(sent?.shape).toBe("wide");
    expect(sent?.columns.flatMap(({ row }) => row ?? [])).toEqual([1, 2, 3, 4]);
  });

  it("opens a mapping with the mapping's own layout", async () => {
    const columns = [
      { name: "LON_deg", channel: "longitude", unit: "deg" },
      { name: "LAT_deg", channel: "latitude", unit: "deg" },
      ...["A1", "A2", "A3", "A4"].map((name, index) => ({ name, channel: "downforce", row: 4 - index, unit: "lbf" })),
    ];
    const { onSave, user } = show({ ...makeUnhelpful(), mapping: { columns, shape: "wide" } });
    await user.click(screen.getByRole("button", { name: "Read the log" }));
    expect(onSave.mock.calls[0]?.[0]).toMatchObject({ columns, shape: "wide" });
  });

  it("lets the layout be corrected, and says what then stands in the way", async () => {
    const { user } = show(makeFound());
    await user.selectOptions(screen.getByLabelText("Layout of the file"), "long");
    expect(screen.getByText(/say which column is the row number/)).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
    await user.selectOptions(screen.getByLabelText("Layout of the file"), "wide");
    expect(screen.getByRole("button", { name: "Read the log" })).toBeEnabled();
  });
});

describe("for a role that may only look", () => {
  it("shows every meaning and lets nothing be changed or sent", () => {
    render(
      <ColumnsForm
        log={log}
        found={makeFound()}
        machines={[]}
        pending={false}
        failure={null}
        mayChange={false}
        onSave={vi.fn()}
      />,
    );
    expect(screen.getByText(/rows 1 to 3/)).toBeInTheDocument();
    for (const button of screen.getAllByRole("button")) expect(button).toBeDisabled();
    expect(screen.queryByRole("button", { name: "Read the log" })).not.toBeInTheDocument();
  });
});
