"use client";

import type { Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useState } from "react";
import type { DrawingMode, DrawingState } from "@/components/drawing/drawing";
import { MeasureWords } from "@/components/drawing/measure-words";
import { ToolButton } from "@/components/drawing/tool-button";
import { useDrawing } from "@/components/drawing/use-drawing";
import { useSaveNote } from "@/components/notes/use-notes";
import { Button } from "@/components/ui/button";
import { TextArea } from "@/components/ui/form-field";
import { describeFailure } from "@/lib/api/api-problem";
import type { Note, NoteGeometry } from "@/lib/schemas/notes";

export interface NoteEditorProps {
  map: MapLibreMap;
  fieldId: string;
  /** The note to change; null for a new one. */
  note: Note | null;
  mode: DrawingMode;
  guides: readonly Position[][];
  onDone: () => void;
}

/** What is drawn, where it can hold a note. */
function noteGeometryOf({ shapes }: DrawingState): NoteGeometry | null {
  const geometry = shapes.at(-1)?.geometry;
  return geometry === undefined || geometry.type === "Polygon" ? null : geometry;
}

/** One note: its place on the map, its words, and saving it. */
export function NoteEditor({ map, fieldId, note, mode, guides, onDone }: NoteEditorProps) {
  const [text, setText] = useState(note?.text ?? "");
  const save = useSaveNote(fieldId);
  const { state, drawing } = useDrawing(map, {
    start: note ? [note.geometry] : [],
    mode,
    guides,
    // One note has one place: what is drawn is now there to be moved.
    onFinish: ({ id }) => setTimeout(() => drawing.current?.select(id)),
  });
  const geometry = noteGeometryOf(state);
  const canSave = geometry !== null && text.trim() !== "" && !save.isPending;
  return (
    <form
      className="space-y-2 pt-1"
      onSubmit={(event) => {
        event.preventDefault();
        if (canSave) save.mutate({ note, input: { text, geometry } }, { onSuccess: onDone });
      }}
    >
      <p role="status" className="text-table text-ink-soft">
        <PlaceWords state={state} mode={mode} />
      </p>
      <div className="flex gap-1.5">
        <ToolButton disabled={!state.canUndo} onClick={() => drawing.current?.undo()}>
          Undo
        </ToolButton>
        <ToolButton disabled={!state.canRedo} onClick={() => drawing.current?.redo()}>
          Redo
        </ToolButton>
      </div>
      {/* First the place: on a phone the words would lie over the ground that is drawn on. */}
      {geometry ? (
        <TextArea
          label="What is there"
          rows={3}
          maxLength={2000}
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
      ) : null}
      {save.error ? (
        <p role="alert" className="text-table text-clay">
          {describeFailure(save.error)}
        </p>
      ) : null}
      <div className="flex gap-2">
        {geometry ? (
          <Button type="submit" kind="primary" disabled={!canSave}>
            {save.isPending ? "Saving…" : "Save note"}
          </Button>
        ) : null}
        <Button kind="quiet" onClick={onDone}>
          Leave it
        </Button>
      </div>
    </form>
  );
}

function PlaceWords({ state, mode }: { state: DrawingState; mode: DrawingMode }) {
  const shape = state.open ?? state.shapes.at(-1)?.geometry;
  if (shape?.type === "LineString") {
    return (
      <>
        <MeasureWords geometry={shape} isOpen={state.open !== null} />
        {state.open ? ". Enter, or the last corner again, ends the line." : ""}
      </>
    );
  }
  if (shape) return <>The place is marked; drag it to move it.</>;
  return mode === "linestring" ? <>Click or tap along the line.</> : <>Click or tap the place.</>;
}
