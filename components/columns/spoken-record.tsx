"use client";

import type { Choices } from "@/components/columns/column-choice";
import { meaningOf } from "@/components/columns/say-meaning";
import { useUnits } from "@/components/units/use-units";
import { speakRecord } from "@/lib/ingest/columns/speak-record";
import type { LogColumns } from "@/lib/schemas/logs";

export interface SpokenRecordProps {
  found: LogColumns;
  choices: Choices;
  timeZone: string;
}

/** One record of the file read out by the meanings chosen so far: what is wrong is heard before it is read. */
export function SpokenRecord({ found, choices, timeZone }: SpokenRecordProps) {
  const { format } = useUnits();
  const { example } = found;
  if (!example) return null;
  const cells = found.columns.flatMap((column, index) => {
    const choice = choices[column.name];
    const meaning = choice ? meaningOf(choice) : null;
    return meaning ? [{ cell: example[index] ?? "", meaning }] : [];
  });
  const sentence = speakRecord(cells, { say: format, decimalComma: found.decimalComma, timeZone });
  if (sentence === null) return null;
  return (
    <section className="sheet space-y-1 p-4" aria-labelledby="spoken-title">
      <h2 id="spoken-title" className="text-section">
        One record, read out
      </h2>
      <p aria-live="polite" className="max-w-prose break-words">
        {sentence}
      </p>
      <p className="text-table text-ink-soft">Does that sound like this machine and this field?</p>
    </section>
  );
}
