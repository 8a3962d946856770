import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, expect, it } from "vitest";
import { RoleBars } from "@/components/ui/role-bars";

afterEach(cleanup);

it("says that the role bars the page, not that the page is lost", () => {
  render(<RoleBars role="operator" toDo="describe machines" />);
  expect(screen.getByText("Your role may not describe machines")).toBeInTheDocument();
  expect(screen.getByText(/You are here as operator/)).toBeInTheDocument();
});
