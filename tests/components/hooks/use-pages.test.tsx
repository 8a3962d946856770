import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, it } from "vitest";
import { usePages } from "@/components/hooks/use-pages";
import { DataTable } from "@/components/ui/data-table";

afterEach(cleanup);

const PAGES: Record<string, { items: { id: string }[]; nextCursor: string | null }> = {
  first: { items: [{ id: "North quarter" }], nextCursor: "second" },
  second: { items: [{ id: "South quarter" }], nextCursor: null },
};

function Fields() {
  const { items, more } = usePages({ queryKey: ["fields"], load: async (cursor) => PAGES[cursor ?? "first"]! });
  return (
    <DataTable
      caption="Fields"
      rows={items ?? []}
      columns={[{ id: "name", header: "Field", value: (row) => row.id }]}
      rowId={(row) => row.id}
      fileName="fields"
      more={more}
    />
  );
}

it("shows the first page, says that there is more, and adds the next where it is asked for", async () => {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <Fields />
    </QueryClientProvider>,
  );
  await screen.findByText("North quarter");
  expect(screen.queryByText("South quarter")).toBeNull();
  expect(screen.getByText(/The first 1 are here/)).toBeInTheDocument();
  await userEvent.setup().click(screen.getByRole("button", { name: "Show more" }));
  await screen.findByText("South quarter");
  expect(screen.getByText("North quarter")).toBeInTheDocument();
  expect(screen.queryByRole("button", { name: "Show more" })).toBeNull();
});
