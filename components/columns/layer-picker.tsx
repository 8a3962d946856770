"use client";

import { SelectField } from "@/components/ui/form-field";
import type { LogColumns } from "@/lib/schemas/logs";

/** What the screen shows of a file that holds several logs: the chosen one as if it were the file. */
export function viewLayer(found: LogColumns, layerId: string | null): LogColumns {
  const layer = found.layers?.find((candidate) => candidate.id === layerId);
  if (!layer) return found;
  const { shape, columns, crs, crsCandidates, device, example } = layer;
  return { ...found, shape, columns, crs, crsCandidates, device, example };
}

export interface LayerPickerProps {
  layers: NonNullable<LogColumns["layers"]>;
  value: string | null;
  onChange: (layerId: string) => void;
}

/** Which of several logs in one file is meant. */
export function LayerPicker({ layers, value, onChange }: LayerPickerProps) {
  return (
    <SelectField
      label="Log to read"
      hint="The file holds several. Upload it once more for each other log you want."
      value={value ?? ""}
      onChange={(event) => onChange(event.target.value)}
    >
      {layers.map(({ id, label, records }) => (
        <option key={id} value={id}>
          {label} ({records.toLocaleString("en-US")} records)
        </option>
      ))}
    </SelectField>
  );
}
