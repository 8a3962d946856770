"use client";

import { SelectField, TextField } from "@/components/ui/form-field";
import { QuantityInput } from "@/components/units/quantity-input";
import type { ContactDefinition } from "@/lib/ingest/mapping";

const KINDS: { kind: ContactDefinition["kind"]; label: string }[] = [
  { kind: "share-of-time", label: "The share of time the gauge wheel carried load" },
  { kind: "at-the-moment", label: "A yes or no at the moment of each record" },
  { kind: "other", label: "Another way, described below" },
];

export interface ContactFieldsProps {
  /** Null: nobody said. */
  value: ContactDefinition | null;
  onChange: (value: ContactDefinition | null) => void;
}

/** How this log defines ground contact. No file says it, and logs that define it differently must not be compared. */
export function ContactFields({ value, onChange }: ContactFieldsProps) {
  const change = (patch: Partial<ContactDefinition>) => {
    if (!value) return;
    const whole = { ...value, ...patch };
    const kept = Object.entries(whole).filter(([, part]) => part !== undefined && part !== "");
    onChange({ ...Object.fromEntries(kept), kind: whole.kind });
  };
  return (
    <fieldset className="min-w-0 space-y-4 md:col-span-2">
      <legend className="font-semibold">Ground contact</legend>
      <div className="grid gap-5 md:grid-cols-2">
        <SelectField
          label="What it means in this log"
          hint="Ask whoever set up the machine. It is kept with the log, the recipe and every export."
          value={value?.kind ?? ""}
          onChange={(event) => {
            const kind = KINDS.find((candidate) => candidate.kind === event.target.value)?.kind;
            onChange(kind ? { ...value, kind } : null);
          }}
        >
          <option value="">Nobody has said</option>
          {KINDS.map(({ kind, label }) => (
            <option key={kind} value={kind}>
              {label}
            </option>
          ))}
        </SelectField>
        {value ? (
          <>
            <QuantityInput
              label="Load from which it counts as contact"
              hint="Leave empty if nobody knows."
              unit="N"
              value={value.thresholdN}
              onChange={(thresholdN) => change({ thresholdN })}
            />
            {value.kind === "share-of-time" ? (
              <QuantityInput
                label="Over how long"
                hint="The time that each share is of."
                unit="s"
                value={value.windowS}
                onChange={(windowS) => change({ windowS })}
              />
            ) : null}
            <TextField
              label="In their words"
              value={value.words ?? ""}
              maxLength={300}
              onChange={(event) => change({ words: event.target.value })}
            />
          </>
        ) : null}
      </div>
    </fieldset>
  );
}
