"use client";

import { useState } from "react";
import { BoundaryDrawing, type BoundaryDrawingProps } from "@/components/drawing/boundary-drawing";
import { BoundarySketch } from "@/components/fields/boundary-sketch";
import { readBoundaryBytes, readBoundaryText, type ReadBoundary } from "@/components/fields/read-boundary-text";
import type { BoundaryChange } from "@/components/hooks/use-fields";
import { Button } from "@/components/ui/button";
import { TextArea } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { Quantity } from "@/components/units/quantity";
import { DropZone } from "@/components/upload/drop-zone";
import type { Boundary } from "@/lib/schemas/geometry";

const KINDS = ".geojson,.json,.kml,.gpx,.zip";

interface Chosen {
  change: BoundaryChange;
  /** As the server will read it when saved. */
  read: ReadBoundary | null;
  fileName: string | null;
}

const NOTHING: Chosen = { change: { kind: "none" }, read: null, fileName: null };

export interface BoundaryFieldProps {
  /** `isWrong`: something was given that is no boundary. */
  onChange: (change: BoundaryChange, isWrong: boolean) => void;
  error?: string;
  /** Where it can be drawn: the boundary there is and the ground to draw it on. */
  drawing?: Omit<BoundaryDrawingProps, "onBoundary">;
}

/** A boundary from a file, drawn on a map or from pasted GeoJSON, with its outline and area before anything is saved. */
export function BoundaryField({ onChange, error, drawing }: BoundaryFieldProps) {
  const [chosen, setChosen] = useState<Chosen>(NOTHING);
  const [problem, setProblem] = useState<string | null>(null);
  const [pasting, setPasting] = useState(false);
  const [isDrawing, setDrawing] = useState(false);

  const choose = (next: Chosen, trouble: string | null) => {
    setChosen(next);
    setProblem(trouble);
    onChange(next.change, trouble !== null);
  };
  const takeText = (text: string) => {
    if (text.trim() === "") return choose(NOTHING, null);
    const result = readBoundaryText(text);
    if (!result.ok) return choose(NOTHING, result.error);
    const { geometry } = result.value;
    choose({ change: { kind: "geometry", geometry }, read: result.value, fileName: null }, null);
  };
  const takeDrawn = (geometry: Boundary | null) => {
    if (geometry === null) return choose(NOTHING, null);
    takeText(JSON.stringify(geometry));
  };
  const takeFile = async (file: File) => {
    const result = await readBoundaryBytes(new Uint8Array(await file.arrayBuffer()));
    if (!result.ok) return choose(NOTHING, result.error);
    choose({ change: { kind: "file", file }, read: result.value, fileName: file.name }, null);
  };

  return (
    <fieldset className="space-y-3">
      <legend className="font-semibold">Boundary</legend>
      <p className="text-table text-ink-soft">
        Optional, and can be added later. It gives the field its area and shows logs that were dropped on the wrong
        field.
      </p>
      <DropZone
        words={chosen.fileName ?? "Choose a boundary file"}
        hint="GeoJSON, KML, a zipped shapefile, or a GPX track driven or walked round the field"
        accept={KINDS}
        onFiles={([file]) => void (file && takeFile(file))}
      />
      {drawing && isDrawing ? <BoundaryDrawing {...drawing} onBoundary={takeDrawn} /> : null}
      {drawing && !isDrawing ? (
        <Button kind="quiet" className="-ml-3" onClick={() => setDrawing(true)}>
          {drawing.start ? "Change it on a map" : "Draw it on a map"}
        </Button>
      ) : null}
      {pasting ? (
        <TextArea
          label="GeoJSON"
          rows={6}
          spellCheck={false}
          hint="A Polygon or MultiPolygon, positions as [longitude, latitude] in degrees."
          onChange={(event) => takeText(event.target.value)}
        />
      ) : (
        <Button kind="quiet" className="-ml-3" onClick={() => setPasting(true)}>
          Paste GeoJSON instead
        </Button>
      )}
      <div aria-live="polite">
        {(problem ?? error) ? <Notice state="act">{problem ?? error}</Notice> : null}
        {chosen.read ? (
          <div className="sheet flex items-center gap-4 p-3">
            <BoundarySketch boundary={chosen.read.geometry} className="h-24 w-24" label="Outline of the boundary" />
            <p>
              Area <Quantity value={chosen.read.areaM2} unit="m2" />
            </p>
          </div>
        ) : null}
        {chosen.read?.notes.map((note) => (
          <Notice key={note} state="look">
            {note}
          </Notice>
        ))}
      </div>
    </fieldset>
  );
}
