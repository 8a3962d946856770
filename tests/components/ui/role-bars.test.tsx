import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, expect, it, vi } from "vitest";
import { PageGone } from "@/components/ui/page-gone";
import { RoleBars } from "@/components/ui/role-bars";

vi.mock("next/navigation", () => ({ useParams: () => ({ org: "larkspur-flats" }) }));
afterEach(cleanup);

it("says that the role bars the page, not that the page is lost, and leads back", () => {
  render(<RoleBars />);
  expect(screen.getByText("Your role does not open this page")).toBeInTheDocument();
  expect(screen.getByText(/An owner of the organisation can give you another role/)).toBeInTheDocument();
  expect(screen.getByRole("link", { name: "Back to the fields" })).toHaveAttribute("href", "/larkspur-flats/fields");
});

it("says that a page is not here without telling whether it ever was", () => {
  render(<PageGone />);
  expect(screen.getByRole("heading", { name: "This page is not here" })).toBeInTheDocument();
  expect(screen.getByRole("link", { name: "To the fields" })).toHaveAttribute("href", "/larkspur-flats/fields");
});
