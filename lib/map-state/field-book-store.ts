import { createStore } from "zustand/vanilla";
import type { Comparison } from "@/lib/map-state/comparison";
import { toggleGroundLayer, type GroundLayer } from "@/lib/map-state/ground-layers";

/** A reading pointed at: pass, record within the pass (from 0) and row (from 1). */
export interface Cursor {
  pass: number;
  record: number;
  row: number;
}

/** A stretch along a pass, metres from where its first cell begins. */
export interface Stretch {
  pass: number;
  fromM: number;
  toM: number;
}

export type Bounds = [west: number, south: number, east: number, north: number];

/** The map's own view: centre and zoom. */
export interface MapView {
  longitude: number;
  latitude: number;
  zoom: number;
}

export interface FieldBookState {
  channel: string;
  pass: number | null;
  /** The selected row, lit everywhere. */
  row: number | null;
  /** Where the pointer is, on the map or on the unrolled pass. */
  cursor: Cursor | null;
  stretch: Stretch | null;
  view: MapView | null;
  /** Class edges that the person set, by channel, in the channel's SI unit. */
  edges: Record<string, number[]>;
  /** GeoJSON of the finding last asked for, drawn on the map until another is. */
  place: unknown;
  /** A wish to see a place on the map; `wish` grows so that the same place can be asked for twice. */
  frame: { bounds: Bounds; wish: number } | null;
  /** Whether cleaning rules apply to everything shown; false for the log as it was read. */
  cleaned: boolean;
  /** What of the ground lies over the readings. */
  ground: readonly GroundLayer[];
  /** What it is compared with; null for nothing. */
  comparison: Comparison | null;
  /** Only what was worked until then is shown, seconds since the log began; null for all of it. */
  timeS: number | null;
}

export interface FieldBookActions {
  chooseChannel(channel: string): void;
  choosePass(pass: number | null): void;
  /** Steps through the passes that exist, in order, stopping at the ends. */
  stepPass(by: 1 | -1, passes: readonly number[]): void;
  /** Chooses a row; the chosen one again lets it go. */
  chooseRow(row: number | null): void;
  pointAt(cursor: Cursor | null): void;
  brush(stretch: Stretch | null): void;
  setView(view: MapView): void;
  setEdges(channel: string, edges: number[] | null): void;
  showPlace(place: unknown): void;
  askToFrame(bounds: Bounds): void;
  setCleaned(cleaned: boolean): void;
  toggleGround(layer: GroundLayer): void;
  compareWith(comparison: Comparison | null): void;
  setTime(timeS: number | null): void;
}

export type FieldBookStore = ReturnType<typeof createFieldBookStore>;
export type FieldBook = FieldBookState & FieldBookActions;

const EMPTY: FieldBookState = {
  channel: "margin",
  pass: null,
  row: null,
  cursor: null,
  stretch: null,
  view: null,
  edges: {},
  place: null,
  frame: null,
  cleaned: true,
  ground: [],
  comparison: null,
  timeS: null,
};

/** What a person looks at in one field's book. Knows nothing of React or of the server. */
export function createFieldBookStore(initial: Partial<FieldBookState> = {}) {
  return createStore<FieldBook>()((set, get) => ({
    ...EMPTY,
    ...initial,
    chooseChannel: (channel) => set({ channel, cursor: null }),
    choosePass: (pass) => {
      if (pass !== get().pass) set({ pass, cursor: null, stretch: null });
    },
    stepPass: (by, passes) => {
      const at = passes.indexOf(get().pass ?? NaN);
      const next = at < 0 ? passes[0] : passes[Math.min(passes.length - 1, Math.max(0, at + by))];
      const { cursor } = get();
      if (next === undefined || next === get().pass) return;
      // The row pointed at stays pointed at: who walks by keys follows it from pass to pass.
      set({ pass: next, stretch: null, cursor: cursor ? { ...cursor, pass: next } : null });
    },
    chooseRow: (row) => set((state) => ({ row: row === state.row ? null : row })),
    pointAt: (cursor) => {
      if (!isSameCursor(cursor, get().cursor)) set({ cursor });
    },
    brush: (stretch) => set({ stretch }),
    setView: (view) => set({ view }),
    setEdges: (channel, edges) =>
      set((state) => {
        const others = Object.entries(state.edges).filter(([name]) => name !== channel);
        return { edges: Object.fromEntries(edges ? [...others, [channel, edges]] : others) };
      }),
    showPlace: (place) => set({ place }),
    askToFrame: (bounds) => set((state) => ({ frame: { bounds, wish: (state.frame?.wish ?? 0) + 1 } })),
    setCleaned: (cleaned) => set({ cleaned }),
    toggleGround: (layer) => set((state) => ({ ground: toggleGroundLayer(state.ground, layer) })),
    compareWith: (comparison) => set({ comparison }),
    setTime: (timeS) => set({ timeS }),
  }));
}

function isSameCursor(a: Cursor | null, b: Cursor | null): boolean {
  return a === b || (!!a && !!b && a.pass === b.pass && a.record === b.record && a.row === b.row);
}
