import { describe, expect, it } from "vitest";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";

describe("the state of a field's book", () => {
  it("steps through the passes that exist and stops at the ends", () => {
    const store = createFieldBookStore({ pass: 4 });
    const passes = [2, 4, 9];
    store.getState().stepPass(1, passes);
    expect(store.getState().pass).toBe(9);
    store.getState().stepPass(1, passes);
    expect(store.getState().pass).toBe(9);
    store.getState().stepPass(-1, passes);
    store.getState().stepPass(-1, passes);
    store.getState().stepPass(-1, passes);
    expect(store.getState().pass).toBe(2);
  });

  it("forgets cursor and stretch of the pass before when another is chosen, not when the same is", () => {
    const store = createFieldBookStore({ pass: 1 });
    store.getState().pointAt({ pass: 1, record: 3, row: 2 });
    store.getState().choosePass(1);
    expect(store.getState().cursor).not.toBeNull();
    store.getState().choosePass(2);
    expect(store.getState().cursor).toBeNull();
  });

  it("lets a row go when it is chosen again", () => {
    const store = createFieldBookStore();
    store.getState().chooseRow(17);
    expect(store.getState().row).toBe(17);
    store.getState().chooseRow(17);
    expect(store.getState().row).toBeNull();
  });

  it("keeps a person's edges by channel and gives them up on request", () => {
    const store = createFieldBookStore();
    store.getState().setEdges("margin", [1, 2]);
    store.getState().setEdges("depth", [3]);
    store.getState().setEdges("margin", null);
    expect(store.getState().edges).toEqual({ depth: [3] });
  });

  it("counts wishes to frame, so that the same place can be asked for twice", () => {
    const store = createFieldBookStore();
    store.getState().askToFrame([0, 0, 1, 1]);
    const first = store.getState().frame;
    store.getState().askToFrame([0, 0, 1, 1]);
    expect(store.getState().frame?.wish).toBe((first?.wish ?? 0) + 1);
  });

  it("tells nobody when the pointer stays on the same reading", () => {
    const store = createFieldBookStore();
    let told = 0;
    store.subscribe(() => (told += 1));
    store.getState().pointAt({ pass: 1, record: 3, row: 2 });
    store.getState().pointAt({ pass: 1, record: 3, row: 2 });
    expect(told).toBe(1);
  });
});

describe("stepping from pass to pass", () => {
  it("keeps the row pointed at", () => {
    const store = createFieldBookStore({ pass: 1, cursor: { pass: 1, record: 30, row: 7 } });
    store.getState().stepPass(1, [1, 2, 3]);
    expect(store.getState().cursor).toEqual({ pass: 2, record: 30, row: 7 });
    store.getState().stepPass(-1, [1, 2, 3]);
    store.getState().stepPass(-1, [1, 2, 3]);
    expect(store.getState().pass).toBe(1);
    expect(store.getState().cursor?.row).toBe(7);
  });
});
