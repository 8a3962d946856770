"use client";

import { SelectField } from "@/components/ui/form-field";
import { LOG_SHAPES, type LogShape } from "@/lib/ingest/mapping";

const SHAPE_WORDS: Record<LogShape, string> = {
  wide: "one column a row: rows side by side in a line",
  long: "one line a row: a column says which row",
  single: "one value a record: no rows apart",
};

export interface ShapeChoiceProps {
  value: LogShape;
  onChange: (shape: LogShape) => void;
}

/** How the file lays its rows out. Follows what is said of the columns; here to correct it. */
export function ShapeChoice({ value, onChange }: ShapeChoiceProps) {
  return (
    <SelectField
      label="Layout of the file"
      hint="Changes by itself when several columns are the same thing, or a row number is typed."
      value={value}
      onChange={(event) => onChange(LOG_SHAPES.find((shape) => shape === event.target.value) ?? value)}
    >
      {LOG_SHAPES.map((shape) => (
        <option key={shape} value={shape}>
          {SHAPE_WORDS[shape]}
        </option>
      ))}
    </SelectField>
  );
}
