"use client";

import type { ColumnChoice } from "@/components/columns/column-choice";
import { unitSign } from "@/components/columns/say-meaning";
import { SelectField, TextField } from "@/components/ui/form-field";
import { channelWords, isRowable, unitsForChannel } from "@/lib/ingest/channel-quantities";
import { KNOWN_CHANNELS, PLACING_CHANNELS, type ChannelId } from "@/lib/logs/channel";
import { getUnit, isUnitId } from "@/lib/units/unit-table";

const MEASURED = KNOWN_CHANNELS.filter((channel) => !(PLACING_CHANNELS as readonly string[]).includes(channel));

export interface MeaningEditorProps {
  /** What is being decided, for screen readers: "column DF_07_lbf". */
  of: string;
  choice: ColumnChoice;
  onChange: (patch: Partial<ColumnChoice>) => void;
  /** A group keeps the row numbers of its columns. */
  withRow: boolean;
  /** Name offered for "something else". */
  ownName: string;
}

function selected(choice: ColumnChoice): string {
  if (choice.use !== "channel" || choice.channel === null) return choice.use === "out" ? "out" : "";
  return choice.channel.startsWith("other:") ? "other" : choice.channel;
}

/** A changed meaning keeps its unit only where that unit can measure it. */
function chooseMeaning(value: string, choice: ColumnChoice, ownName: string): Partial<ColumnChoice> {
  if (value === "" || value === "out") return { use: value === "out" ? "out" : "undecided", channel: null };
  const channel = (value === "other" ? `other:${ownName}` : value) as ChannelId;
  const units = unitsForChannel(channel);
  const kept = choice.unit && units.includes(choice.unit) ? choice.unit : null;
  const unit = kept ?? (units.length === 1 ? (units[0] ?? null) : null);
  // The row is kept, each column's own where a group changes together; a channel without rows has none.
  // A way of writing belongs to its meaning: a pattern of dates says nothing about a force.
  const format = channel === choice.channel ? {} : { format: "" };
  return { use: "channel", channel, unit, ...format, ...(isRowable(channel) ? {} : { row: null }) };
}

const FORMAT_WORDS: Record<string, { label: string; hint: string }> = {
  local: { label: "Written as", hint: "dd day, MM month, yyyy year, HH:mm:ss, a for am/pm" },
  "bu/ac": { label: "A bushel weighs", hint: "such as 48 lb" },
  "gps-week": { label: "Weeks begin", hint: "such as from 2048 where the receiver began again at 0; empty for 0" },
};

/** How degrees are written; each with the half of the globe where the file leaves the sign out. */
function DegreesField({ choice, onChange }: Pick<MeaningEditorProps, "choice" | "onChange">) {
  const half = choice.channel === "latitude" ? { letter: "S", words: "south" } : { letter: "W", words: "west" };
  const ways: [format: string, words: string][] = [
    ["", "plain degrees"],
    [`dd.dddd ${half.letter}`, `plain degrees, ${half.words} without a sign`],
    ["degrees minutes", "degrees and minutes as text"],
    [`degrees minutes ${half.letter}`, `degrees and minutes as text, ${half.words} without a sign`],
    ["ddmm.mmmm", "degrees and minutes in one number"],
    [`ddmm.mmmm ${half.letter}`, `degrees and minutes in one number, ${half.words} without a sign`],
  ];
  return (
    <SelectField
      label="Written as"
      value={choice.format}
      onChange={(event) => onChange({ format: event.target.value })}
    >
      {ways.map(([format, words]) => (
        <option key={format} value={format}>
          {words}
        </option>
      ))}
    </SelectField>
  );
}

/** Meaning, unit, row and way of writing of one column or of a whole group. */
export function MeaningEditor({ of, choice, onChange, withRow, ownName }: MeaningEditorProps) {
  const units = choice.use === "channel" && choice.channel ? unitsForChannel(choice.channel) : [];
  const format = choice.unit ? FORMAT_WORDS[choice.unit] : undefined;
  return (
    <div role="group" aria-label={`Meaning of ${of}`} className="grid gap-3 sm:grid-cols-2 lg:grid-cols-4">
      <SelectField
        label="Is"
        value={selected(choice)}
        onChange={(event) => onChange(chooseMeaning(event.target.value, choice, ownName))}
      >
        <option value="">Choose…</option>
        <option value="out">Leave out</option>
        <optgroup label="Where and when">
          {PLACING_CHANNELS.map((channel) => (
            <option key={channel} value={channel}>
              {channelWords(channel)}
            </option>
          ))}
        </optgroup>
        <optgroup label="What was measured">
          {MEASURED.map((channel) => (
            <option key={channel} value={channel}>
              {channelWords(channel)}
            </option>
          ))}
          <option value="other">something else, kept as “{ownName}”</option>
        </optgroup>
      </SelectField>
      {units.length > 0 ? (
        <SelectField
          label="In"
          value={choice.unit ?? ""}
          onChange={(event) => onChange({ unit: isUnitId(event.target.value) ? event.target.value : null })}
        >
          <option value="">Choose the unit…</option>
          {units.map((unit) => (
            <option key={unit} value={unit}>
              {getUnit(unit).words}
              {unitSign(unit) ? ` (${unitSign(unit)})` : ""}
            </option>
          ))}
        </SelectField>
      ) : null}
      {withRow && choice.use === "channel" && choice.channel && isRowable(choice.channel) ? (
        <TextField
          label="Of row"
          inputMode="numeric"
          hint="1 is leftmost looking forward; empty for the whole machine"
          value={choice.row ?? ""}
          onChange={(event) => {
            const row = Number.parseInt(event.target.value, 10);
            onChange({ row: row >= 1 && row <= 1024 ? row : null });
          }}
        />
      ) : null}
      {choice.channel === "longitude" || choice.channel === "latitude" ? (
        <DegreesField choice={choice} onChange={onChange} />
      ) : null}
      {choice.use === "channel" && choice.channel === "contact" ? (
        <SelectField
          label="Counts"
          value={choice.format}
          onChange={(event) => onChange({ format: event.target.value })}
        >
          <option value="">contact kept</option>
          <option value="lost">contact lost</option>
        </SelectField>
      ) : null}
      {choice.use === "channel" && choice.unit && getUnit(choice.unit).quantity !== "clock" ? (
        <TextField
          label="Counts as missing"
          hint="Numbers that stand for nothing, such as -999, 65535"
          value={choice.missing}
          onChange={(event) => onChange({ missing: event.target.value })}
        />
      ) : null}
      {format ? (
        <TextField
          label={format.label}
          hint={format.hint}
          value={choice.format}
          onChange={(event) => onChange({ format: event.target.value })}
        />
      ) : null}
    </div>
  );
}
