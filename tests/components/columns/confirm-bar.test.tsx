import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { ConfirmBar } from "@/components/columns/confirm-bar";

afterEach(cleanup);

describe("what stands in the way of reading", () => {
  it.each([
    [{ A: "Choose the unit." }, "1 column lacks a right answer."],
    [{ A: "Choose the unit.", B: "Choose the unit." }, "2 columns lack a right answer."],
  ])("is counted as answers, not as wrong columns: %o", (problems, words) => {
    const asks = { needsCrs: false, needsTimeZone: false, asksContact: false, asksRowOrder: false };
    const check = { waiting: [], questions: 0, general: [], ...asks, problems };
    render(<ConfirmBar check={check} pending={false} failure={null} />);
    expect(screen.getByText(words)).toBeInTheDocument();
    expect(screen.getByRole("button", { name: "Read the log" })).toBeDisabled();
  });

  it("is counted as cards to answer, however many columns stand on them", () => {
    const asks = { needsCrs: false, needsTimeZone: false, asksContact: false, asksRowOrder: false };
    const waiting = Array.from({ length: 49 }, (_, index) => `C${index}`);
    const check = { waiting, questions: 3, general: [], problems: {}, ...asks };
    render(<ConfirmBar check={check} pending={false} failure={null} />);
    expect(screen.getByText("3 questions still need you.")).toBeInTheDocument();
  });
});
