"use client";

import { NotebookPen } from "lucide-react";
import type { Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import dynamic from "next/dynamic";
import { useEffect, useMemo, useState } from "react";
import { showNotes } from "@/components/notes/note-overlay";
import { useNotesAccess } from "@/components/notes/notes-access";
import { useNotes } from "@/components/notes/use-notes";
import type { Boundary } from "@/lib/schemas/geometry";
import type { Note } from "@/lib/schemas/notes";

/** Reading and writing notes is fetched by those who open them. */
const LazyNotesPanel = dynamic(() => import("@/components/notes/notes-panel").then(({ NotesPanel }) => NotesPanel), {
  ssr: false,
});

export interface MapNotesProps {
  map: MapLibreMap;
  /** Lines that notes are drawn onto. */
  boundary: Boundary | null;
}

/** The field's notes on a map, and the button to read and write them. Nothing where a map shows none. */
export function MapNotes(props: MapNotesProps) {
  const access = useNotesAccess();
  return access ? <NotesOfField {...props} fieldId={access.fieldId} mayWrite={access.mayWrite} /> : null;
}

const NO_NOTES: Note[] = [];

function NotesOfField({ map, boundary, fieldId, mayWrite }: MapNotesProps & { fieldId: string; mayWrite: boolean }) {
  const notes = useNotes(fieldId) ?? NO_NOTES;
  const [isOpen, setOpen] = useState(false);
  const [editedId, setEditedId] = useState<string | null>(null);
  useEffect(() => showNotes(map, notes, editedId), [map, notes, editedId]);
  const guides = useMemo<Position[][]>(() => {
    if (!boundary) return [];
    return boundary.type === "Polygon" ? boundary.coordinates : boundary.coordinates.flat();
  }, [boundary]);
  return (
    <>
      <button
        type="button"
        aria-label={`Notes on this field: ${notes.length}`}
        title="Notes"
        aria-expanded={isOpen}
        onClick={() => setOpen(!isOpen)}
        className="grid size-11 place-items-center text-ink hover:bg-paper aria-expanded:bg-ink aria-expanded:text-paper md:size-9"
      >
        <NotebookPen size={18} strokeWidth={1.5} aria-hidden />
      </button>
      {isOpen ? (
        <LazyNotesPanel
          map={map}
          notes={notes}
          guides={guides}
          fieldId={fieldId}
          mayWrite={mayWrite}
          onEdited={setEditedId}
          onClose={() => setOpen(false)}
        />
      ) : null}
    </>
  );
}
