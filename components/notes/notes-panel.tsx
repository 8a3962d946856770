"use client";

import type { Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useState } from "react";
import { MeasureWords } from "@/components/drawing/measure-words";
import { ToolButton } from "@/components/drawing/tool-button";
import { NoteEditor } from "@/components/notes/note-editor";
import { useRemoveNote } from "@/components/notes/use-notes";
import { formatDay } from "@/components/ui/format-date";
import { boundsOfGeometry, openBounds } from "@/lib/map-state/geometry-bounds";
import type { Note } from "@/lib/schemas/notes";

export interface NotesPanelProps {
  map: MapLibreMap;
  notes: readonly Note[];
  guides: readonly Position[][];
  fieldId: string;
  mayWrite: boolean;
  /** The note that is being changed on the map. */
  onEdited: (id: string | null) => void;
  onClose: () => void;
}

type Work = { note: Note } | { kind: "point" | "linestring" };

/** The notes beside the map: read, found, written, changed and taken away. */
export function NotesPanel({ map, notes, guides, fieldId, mayWrite, onEdited, onClose }: NotesPanelProps) {
  const [work, setWork] = useState<Work | null>(null);
  const begin = (next: Work | null) => {
    setWork(next);
    onEdited(next && "note" in next ? next.note.id : null);
  };
  return (
    <section
      aria-label="Notes"
      className="absolute right-14 top-0 z-20 max-h-[22rem] w-64 overflow-y-auto rounded border border-edge bg-sheet p-3 md:right-12 md:w-80"
    >
      <div className="flex items-center justify-between">
        <h3 className="font-semibold">Notes</h3>
        <button
          type="button"
          onClick={() => {
            begin(null);
            onClose();
          }}
          className="min-h-11 px-1 text-table text-slate underline md:min-h-7"
        >
          Close
        </button>
      </div>
      {work ? (
        <NoteEditor
          key={"note" in work ? work.note.id : work.kind}
          map={map}
          fieldId={fieldId}
          note={"note" in work ? work.note : null}
          mode={"note" in work ? "select" : work.kind}
          guides={guides}
          onDone={() => begin(null)}
        />
      ) : (
        <>
          {mayWrite ? (
            <div className="flex gap-1.5 py-1">
              <ToolButton onClick={() => begin({ kind: "point" })}>Note on a place</ToolButton>
              <ToolButton onClick={() => begin({ kind: "linestring" })}>Along a line</ToolButton>
            </div>
          ) : null}
          {notes.length === 0 ? (
            <p className="py-1 text-table text-ink-soft">
              No notes yet. {mayWrite ? "A wet spot, a stone, where a row was mended: write it on the map." : ""}
            </p>
          ) : (
            <ol className="divide-y divide-rule">
              {notes.map((note, index) => (
                <NoteLine
                  key={note.id}
                  note={note}
                  number={index + 1}
                  mayWrite={mayWrite}
                  onSee={() => seeNote(map, note)}
                  onChange={() => begin({ note })}
                />
              ))}
            </ol>
          )}
        </>
      )}
    </section>
  );
}

/** Closer than this, a place is only itself. */
const NEAREST_ZOOM = 19;

function seeNote(map: MapLibreMap, { geometry }: Note): void {
  const bounds = boundsOfGeometry(geometry);
  if (bounds) map.fitBounds(openBounds(bounds, 0.3, 0.0005), { maxZoom: NEAREST_ZOOM, animate: false });
}

interface NoteLineProps {
  note: Note;
  number: number;
  mayWrite: boolean;
  onSee: () => void;
  onChange: () => void;
}

function NoteLine({ note, number, mayWrite, onSee, onChange }: NoteLineProps) {
  const remove = useRemoveNote();
  const link = "min-h-11 text-slate underline md:min-h-7";
  return (
    <li className="py-2 text-table">
      <p className="flex gap-2">
        <span className="tabular font-semibold">{number}</span>
        <span className="min-w-0 whitespace-pre-line wrap-anywhere">{note.text}</span>
      </p>
      <p className="text-ink-soft">
        {note.createdBy ? `${note.createdBy.name}, ` : ""}
        {formatDay(note.createdAt)}
        {note.geometry.type === "LineString" ? (
          <>
            {" · "}
            <MeasureWords geometry={note.geometry} />
          </>
        ) : null}
      </p>
      <div className="flex gap-4">
        <button type="button" className={link} onClick={onSee} aria-label={`See note ${number} on the map`}>
          See it
        </button>
        {mayWrite ? (
          <>
            <button type="button" className={link} onClick={onChange} aria-label={`Change note ${number}`}>
              Change
            </button>
            <button type="button" className={link} onClick={() => remove(note)} aria-label={`Delete note ${number}`}>
              Delete
            </button>
          </>
        ) : null}
      </div>
    </li>
  );
}
