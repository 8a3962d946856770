import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { LogFacts } from "@/components/upload/log-facts";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(cleanup);

describe("a row order that could not be checked", () => {
  it("is said quietly, not as a warning, beside notes that are", () => {
    const message = "Row order (row 1 left) could not be checked: no rows switch off at angled edges.";
    const notes = [
      { code: "row-order-unchecked", count: 1, message },
      { code: "channel-late", count: 1, message: "Downforce seems logged 1.5 s late." },
    ];
    render(<LogFacts log={makeLogReply({ notes })} />);
    const quiet = screen.getByText(message);
    const warning = screen.getByText("Downforce seems logged 1.5 s late.");
    expect(quiet.className).toBe("text-table text-ink-soft");
    // The warning stands in a block of its own with a mark, the quiet sentence in the list of facts itself.
    expect(quiet.parentElement).toContainElement(warning);
    expect(warning.parentElement).not.toContainElement(quiet);
    expect(quiet.parentElement?.children).toHaveLength(3);
  });
});
