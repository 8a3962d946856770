import { act, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, it } from "vitest";
import { TapSheet } from "@/components/field-book/tap-sheet";
import { renderInBook } from "./render-in-book";

it("shows the reading that was tapped, and goes away when asked", async () => {
  const { store } = renderInBook(<TapSheet />);
  expect(screen.queryByTestId("tap-sheet")).toBeNull();
  act(() => store.getState().pointAt({ pass: 1, record: 0, row: 3 }));
  expect(screen.getByTestId("tap-sheet")).toBeInTheDocument();
  await userEvent.click(screen.getByRole("button", { name: "Put the reading away" }));
  expect(store.getState().cursor).toBeNull();
  expect(screen.queryByTestId("tap-sheet")).toBeNull();
});
