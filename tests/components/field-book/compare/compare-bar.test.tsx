import { fireEvent, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { CompareBar } from "@/components/field-book/compare/compare-bar";
import { CompareButton } from "@/components/field-book/compare/compare-button";
import { Divider } from "@/components/field-book/compare/divider";
import { InSecondBook, SecondBookProvider } from "@/components/field-book/compare/second-book";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import type { Log } from "@/lib/schemas/logs";
import { LOG, renderInBook } from "@/tests/components/field-book/render-in-book";

const LATER: Log = {
  ...LOG,
  id: "log_later",
  name: "East quarter, after the change",
  channels: LOG.channels.filter(({ id }) => id !== "depth"),
};

function OtherSide() {
  const { log } = useBook();
  const channel = useBookState((state) => state.channel);
  return <p data-testid="other-side">{`${channel} of ${log.id}`}</p>;
}

function Comparing() {
  const comparison = useBookState((state) => state.comparison);
  return (
    <>
      <CompareButton />
      {comparison ? <CompareBar comparison={comparison} /> : null}
      <InSecondBook>
        <OtherSide />
      </InSecondBook>
    </>
  );
}

function open(logs: Log[] = [LOG, LATER]) {
  const children = (
    <SecondBookProvider logs={logs}>
      <Comparing />
    </SecondBookProvider>
  );
  return renderInBook(children, { state: { channel: "margin", pass: 2 } });
}

describe("comparing", () => {
  it("begins with another reading of the same log, and ends as it began", async () => {
    const { store } = open();
    expect(screen.queryByTestId("other-side")).toBeNull();
    await userEvent.click(screen.getByRole("button", { name: "Compare" }));
    expect(store.getState().comparison).toMatchObject({ mode: "swipe", logId: null });
    expect(store.getState().comparison?.channel).not.toBe("margin");
    await userEvent.click(screen.getByRole("button", { name: "Stop comparing" }));
    expect(store.getState().comparison).toBeNull();
    expect(screen.queryByTestId("other-side")).toBeNull();
  });

  it("shows the reading and the log that are chosen", async () => {
    const { store } = open();
    await userEvent.click(screen.getByRole("button", { name: "Compare" }));
    await userEvent.selectOptions(screen.getByRole("combobox", { name: "Compared with" }), "Depth");
    expect(screen.getByTestId("other-side")).toHaveTextContent("depth of log_east");
    // The other log has no depth: it begins with what it has.
    await userEvent.selectOptions(screen.getByRole("combobox", { name: "Log compared with" }), "log_later");
    expect(screen.getByTestId("other-side")).toHaveTextContent("margin of log_later");
    expect(store.getState().comparison).toEqual({ mode: "swipe", channel: "margin", logId: "log_later" });
    await userEvent.click(screen.getByRole("radio", { name: "Side by side" }));
    expect(store.getState().comparison?.mode).toBe("side");
  });

  it("asks for no log where the field has only one", async () => {
    open([LOG]);
    await userEvent.click(screen.getByRole("button", { name: "Compare" }));
    expect(screen.queryByRole("combobox", { name: "Log compared with" })).toBeNull();
  });
});

describe("the divider", () => {
  const press = (key: string, shiftKey = false) => fireEvent.keyDown(screen.getByRole("slider"), { key, shiftKey });

  it("says what lies on either side, and moves by keys within the map", () => {
    const onMove = vi.fn();
    renderInBook(<Divider atPercent={50} onMove={onMove} sides={["Margin", "Depth"]} />);
    expect(screen.getByRole("slider")).toHaveAttribute("aria-valuetext", "Margin on 50 %, Depth on 50 %");
    press("ArrowLeft");
    press("ArrowRight", true);
    press("Home");
    press("End");
    press("a");
    expect(onMove.mock.calls).toEqual([[48], [60], [0], [100]]);
  });

  it("does not leave the map", () => {
    const onMove = vi.fn();
    renderInBook(<Divider atPercent={99} onMove={onMove} sides={["Margin", "Depth"]} />);
    press("ArrowRight");
    expect(onMove).toHaveBeenLastCalledWith(100);
  });
});
