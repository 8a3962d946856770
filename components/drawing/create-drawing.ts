import type { Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import {
  TerraDraw,
  TerraDrawLineStringMode,
  TerraDrawModeUndoRedo,
  TerraDrawPointMode,
  TerraDrawPolygonMode,
  TerraDrawSelectMode,
  TerraDrawSessionUndoRedo,
  TerraDrawUndoRedoKeyboardShortcuts,
  type GeoJSONStoreFeatures,
  type SnapToCustom,
} from "terra-draw";
import { TerraDrawMapLibreGLAdapter } from "terra-draw-maplibre-gl-adapter";
import type { Drawing, DrawingMode, DrawingState, DrawnShape, ShapeGeometry } from "@/components/drawing/drawing";
import { DRAWING_STYLES } from "@/components/drawing/drawing-styles";
import { snapToRings } from "@/lib/drawing/snap-to-rings";

export interface DrawingOptions {
  map: MapLibreMap;
  start: readonly ShapeGeometry[];
  mode: DrawingMode;
  /** Lines of the ground that corners go onto, beside those that are drawn. */
  guides: readonly Position[][];
  onChange: (state: DrawingState) => void;
  /** A new shape is complete. */
  onFinish?: (shape: DrawnShape) => void;
}

const MODE_OF: Record<ShapeGeometry["type"], DrawingMode> = {
  Point: "point",
  LineString: "linestring",
  Polygon: "polygon",
};

/** Whether a feature is a shape, not one of the dots and lines that help to draw it. */
function isShape({ geometry, properties }: GeoJSONStoreFeatures): boolean {
  return properties.mode === MODE_OF[geometry.type];
}

function createModes(guides: readonly Position[][]) {
  const toCustom: SnapToCustom = (event, { project, unproject }) =>
    snapToRings({ x: event.containerX, y: event.containerY }, guides, { project, unproject });
  const snapping = { toCoordinate: true, toLine: true, toCustom };
  const corners = { midpoints: true, draggable: true, deletable: true, snappable: snapping };
  return [
    new TerraDrawPolygonMode({ snapping, showCoordinatePoints: true, styles: DRAWING_STYLES.polygon }),
    new TerraDrawLineStringMode({ snapping, showCoordinatePoints: true, styles: DRAWING_STYLES.line }),
    new TerraDrawPointMode({ styles: DRAWING_STYLES.point }),
    new TerraDrawSelectMode({
      flags: {
        polygon: { feature: { draggable: false, coordinates: corners } },
        linestring: { feature: { draggable: true, coordinates: corners } },
        point: { feature: { draggable: true } },
      },
      styles: DRAWING_STYLES.select,
    }),
  ];
}

/** Drawing on a map by mouse, finger and keys (Enter ends a shape, Escape drops it, Delete takes the chosen one away, Ctrl+Z undoes). */
export function createDrawing(options: DrawingOptions): Drawing {
  const { map, start, mode, guides, onChange, onFinish } = options;
  const draw = new TerraDraw({
    adapter: new TerraDrawMapLibreGLAdapter({ map, coordinatePrecision: 9 }),
    modes: createModes(guides),
    undoRedo: {
      modeLevel: new TerraDrawModeUndoRedo(),
      sessionLevel: new TerraDrawSessionUndoRedo(),
      keyboardShortcuts: new TerraDrawUndoRedoKeyboardShortcuts(),
    },
  });
  let selectedId: string | null = null;
  const tell = () => onChange(describeDrawing(draw, selectedId));
  const select = (id: string | null) => {
    selectedId = id;
    tell();
  };
  draw.start();
  draw.addFeatures(
    start.map((geometry) => ({ type: "Feature", geometry, properties: { mode: MODE_OF[geometry.type] } })),
  );
  // What was there before is not the person's doing, and not undone.
  draw.clearUndoRedoHistory();
  draw.setMode(mode);
  draw.on("change", tell);
  draw.on("history", tell);
  draw.on("select", (id) => select(String(id)));
  draw.on("deselect", () => select(null));
  draw.on("finish", (id, { action }) => {
    if (action !== "draw") return tell();
    const shape = draw.getSnapshotFeature(id)?.geometry;
    if (shape) onFinish?.({ id: String(id), geometry: shape });
    tell();
  });
  const quieten = quietMap(map);
  tell();
  return {
    setMode: (next) => {
      draw.setMode(next);
      tell();
    },
    select: (id) => draw.selectFeature(id),
    undo: () => draw.undo(),
    redo: () => draw.redo(),
    remove: (id) => {
      if (id === selectedId) draw.deselectFeature(id);
      if (draw.hasFeature(id)) draw.removeFeatures([id]);
    },
    stop: () => {
      quieten();
      // A map that is gone has taken its layers along.
      if (map.getCanvas().isConnected) draw.stop();
    },
  };
}

function describeDrawing(draw: TerraDraw, selectedId: string | null): DrawingState {
  const shapes = draw.getSnapshot().filter(isShape);
  const open = shapes.find(({ properties }) => properties.currentlyDrawing === true);
  return {
    mode: draw.getMode() as DrawingMode,
    shapes: shapes.filter((shape) => shape !== open).map(({ id, geometry }) => ({ id: String(id), geometry })),
    open: open?.geometry ?? null,
    selectedId,
    canUndo: draw.canUndo(),
    canRedo: draw.canRedo(),
  };
}

/** While one draws, a click is a corner and nothing else, and one finger draws rather than scrolls. Answers how to end it. */
function quietMap(map: MapLibreMap): () => void {
  const hush = (event: Event) => event.stopPropagation();
  const frame = map.getCanvasContainer();
  frame.addEventListener("click", hush, { capture: true });
  const wasGentle = map.cooperativeGestures.isEnabled();
  if (wasGentle) map.cooperativeGestures.disable();
  return () => {
    frame.removeEventListener("click", hush, { capture: true });
    if (wasGentle && map.getCanvas().isConnected) map.cooperativeGestures.enable();
  };
}
