import { describe, expect, it } from "vitest";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";
import { linkBooks } from "@/lib/map-state/link-books";

function openTwo() {
  const comparison = { mode: "swipe", channel: "depth", logId: null } as const;
  const first = createFieldBookStore({ channel: "margin", pass: 3, row: 17, comparison });
  const second = createFieldBookStore({ channel: "depth" });
  return { first, second };
}

describe("two sides of a comparison", () => {
  it("share pass, cursor, stretch, row and time where both show one log, whoever changes it", () => {
    const { first, second } = openTwo();
    linkBooks(first, second, true);
    expect(second.getState()).toMatchObject({ pass: 3, row: 17, channel: "depth" });
    second.getState().pointAt({ pass: 3, record: 8, row: 2 });
    expect(first.getState().cursor).toEqual({ pass: 3, record: 8, row: 2 });
    second.getState().stepPass(1, [3, 4]);
    expect(first.getState().pass).toBe(4);
    first.getState().brush({ pass: 4, fromM: 10, toM: 40 });
    expect(second.getState().stretch).toEqual({ pass: 4, fromM: 10, toM: 40 });
    first.getState().setTime(90);
    expect(second.getState().timeS).toBe(90);
    expect(first.getState().channel).toBe("margin");
  });

  it("share no pass numbers where they show two logs, but rows and the cleaning", () => {
    const { first, second } = openTwo();
    linkBooks(first, second, false);
    expect(second.getState().pass).toBeNull();
    first.getState().choosePass(9);
    first.getState().setCleaned(false);
    second.getState().chooseRow(5);
    expect(second.getState()).toMatchObject({ pass: null, cleaned: false });
    expect(first.getState()).toMatchObject({ pass: 9, row: 5 });
  });

  it("agree on what the second shows", () => {
    const { first, second } = openTwo();
    linkBooks(first, second, true);
    first.getState().compareWith({ mode: "side", channel: "downforce", logId: null });
    expect(second.getState().channel).toBe("downforce");
    second.getState().chooseChannel("resistance");
    expect(first.getState().comparison).toEqual({ mode: "side", channel: "resistance", logId: null });
  });

  it("begin with what the second can show, if it has not what was asked for", () => {
    const { first } = openTwo();
    const second = createFieldBookStore({ channel: "rowSpeed" });
    linkBooks(first, second, true);
    first.getState().pointAt({ pass: 3, record: 1, row: 1 });
    expect(first.getState().comparison?.channel).toBe("rowSpeed");
    expect(second.getState().channel).toBe("rowSpeed");
  });

  it("go their own ways once parted", () => {
    const { first, second } = openTwo();
    linkBooks(first, second, true)();
    first.getState().chooseRow(2);
    expect(second.getState().row).toBe(17);
  });
});
