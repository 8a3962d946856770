import type { LineString, Point, Polygon } from "geojson";

export type ShapeGeometry = Point | LineString | Polygon;
/** What a click does: begins or goes on with a shape, or takes one in hand. */
export type DrawingMode = "polygon" | "linestring" | "point" | "select";

export interface DrawnShape {
  id: string;
  geometry: ShapeGeometry;
}

/** What is on the drawing, told at every change. */
export interface DrawingState {
  mode: DrawingMode;
  /** Finished shapes. */
  shapes: DrawnShape[];
  /** The one that is being drawn, up to the pointer. */
  open: ShapeGeometry | null;
  selectedId: string | null;
  canUndo: boolean;
  canRedo: boolean;
}

export interface Drawing {
  setMode: (mode: DrawingMode) => void;
  /** Takes one shape in hand, its corners to be moved. */
  select: (id: string) => void;
  undo: () => void;
  redo: () => void;
  remove: (id: string) => void;
  /** Takes everything off the map again. */
  stop: () => void;
}

export const NOTHING_DRAWN: DrawingState = {
  mode: "select",
  shapes: [],
  open: null,
  selectedId: null,
  canUndo: false,
  canRedo: false,
};
