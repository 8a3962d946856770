import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { ColumnsForm } from "@/components/columns/columns-form";
import { ApiProblem } from "@/lib/api/api-problem";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Log } from "@/lib/schemas/logs";
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
    expect(screen.getByText("1 column still needs you.")).toBeInTheDocument();
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
