import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { DataTable, type DataColumn } from "@/components/ui/data-table";

interface Field {
  id: string;
  name: string;
  areaHa: number | undefined;
}

const FIELDS: Field[] = [
  { id: "a", name: "Mill bottom", areaHa: 2.8 },
  { id: "b", name: "East quarter", areaHa: 10.4 },
  { id: "c", name: "Creek piece", areaHa: undefined },
];
const COLUMNS: DataColumn<Field>[] = [
  { id: "name", header: "Field", value: (field) => field.name },
  { id: "area", header: "Area", numeric: true, value: (field) => field.areaHa },
];

afterEach(() => {
  cleanup();
  vi.restoreAllMocks();
});

function show() {
  render(<DataTable caption="Fields" rows={FIELDS} columns={COLUMNS} rowId={(field) => field.id} fileName="fields" />);
  return userEvent.setup();
}

function names(): string[] {
  return screen
    .getAllByRole("row")
    .slice(1)
    .map((row) => within(row).getAllByRole("cell")[0]?.textContent ?? "");
}

describe("a table", () => {
  it("sorts numbers as numbers, both ways, the missing last", async () => {
    const user = show();
    await user.click(screen.getByRole("button", { name: "Area" }));
    expect(names()).toEqual(["Mill bottom", "East quarter", "Creek piece"]);
    expect(screen.getByRole("columnheader", { name: "Area" })).toHaveAttribute("aria-sort", "ascending");
    await user.click(screen.getByRole("button", { name: "Area" }));
    expect(names()).toEqual(["East quarter", "Mill bottom", "Creek piece"]);
  });

  it("finds rows by any of their words, and says when there is none", async () => {
    const user = show();
    await user.type(screen.getByRole("searchbox", { name: "Find" }), "quarter");
    expect(names()).toEqual(["East quarter"]);
    await user.type(screen.getByRole("searchbox", { name: "Find" }), "zzz");
    expect(screen.getByRole("status")).toHaveTextContent("Nothing here contains");
  });

  it("saves what is shown, as shown", async () => {
    const user = show();
    const saved: Blob[] = [];
    vi.stubGlobal(
      "URL",
      Object.assign(URL, { createObjectURL: (blob: Blob) => (saved.push(blob), "blob:x"), revokeObjectURL: vi.fn() }),
    );
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(() => undefined);
    await user.click(screen.getByRole("button", { name: "Field" }));
    await user.click(screen.getByRole("button", { name: "Save as CSV" }));
    const text = new TextDecoder("utf-8", { ignoreBOM: true }).decode(await saved[0]?.arrayBuffer());
    expect(text).toBe("\uFEFFField,Area\r\nCreek piece,\r\nEast quarter,10.4\r\nMill bottom,2.8\r\n");
  });
});
