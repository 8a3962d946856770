import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { WorkspaceChapters } from "@/components/ui/workspace-chapters";

const place = vi.hoisted(() => ({ params: {} as Record<string, string> }));
vi.mock("next/navigation", () => ({ useParams: () => place.params, usePathname: () => "/larkspur/fields/fld_1" }));
afterEach(cleanup);

describe("the chapters of a field", () => {
  it.each([
    [{ fieldId: "fld_1" }, "/larkspur/fields/fld_1/rows"],
    [{ fieldId: "fld_1", logId: "log_1" }, "/larkspur/fields/fld_1/rows?log=log_1"],
  ])("lead from %o to the rows at %s", (params, href) => {
    place.params = params;
    render(<WorkspaceChapters slug="larkspur" role="operator" />);
    expect(screen.getByRole("link", { name: "Rows" })).toHaveAttribute("href", href);
  });
});
