"use client";

import { useId, useMemo } from "react";
import { Button } from "@/components/ui/button";
import { SelectField, TextField } from "@/components/ui/form-field";
import { ContactFields } from "@/components/columns/contact-fields";
import type { CrsCandidate } from "@/lib/ingest/log-format";
import type { ContactDefinition } from "@/lib/ingest/mapping";
import type { MachineReply } from "@/lib/schemas/machines";

export interface Extras {
  crs: string;
  timeZone: string;
  save: string;
  machineId: string;
  /** How this log defines ground contact; null where nobody said. */
  contact: ContactDefinition | null;
  /** The file counts its rows from the right. */
  rowsFromRight: boolean;
}

export interface MappingExtrasProps {
  extras: Extras;
  onChange: (patch: Partial<Extras>) => void;
  needsCrs: boolean;
  needsTimeZone: boolean;
  asksContact: boolean;
  asksRowOrder: boolean;
  /** Systems that put the log near the field, where the file does not name one. */
  crsCandidates: CrsCandidate[];
  machines: MachineReply[];
}

/** What the columns alone do not say: machine, time zone, coordinate system; and a name to keep it all under. */
export function MappingExtras({
  extras,
  onChange,
  needsCrs,
  needsTimeZone,
  asksContact,
  asksRowOrder,
  crsCandidates,
  machines,
}: MappingExtrasProps) {
  const zonesId = useId();
  const zones = useMemo(() => (needsTimeZone ? Intl.supportedValuesOf("timeZone") : []), [needsTimeZone]);
  return (
    <div className="grid gap-5 md:grid-cols-2">
      <SelectField
        label="Machine that made the log"
        hint="Its row spacing and antenna place the rows on the ground."
        value={extras.machineId}
        onChange={(event) => onChange({ machineId: event.target.value })}
      >
        <option value="">Not chosen: rows cannot be placed sideways</option>
        {machines.map((machine) => (
          <option key={machine.id} value={machine.id}>
            {machine.name}
          </option>
        ))}
      </SelectField>
      {asksRowOrder ? (
        <SelectField
          label="Row 1 of this file"
          hint="Looking forward. A log that counts from the right is turned round, so that its left is the field's left."
          value={extras.rowsFromRight ? "right" : "left"}
          onChange={(event) => onChange({ rowsFromRight: event.target.value === "right" })}
        >
          <option value="left">is the leftmost row</option>
          <option value="right">is the rightmost row</option>
        </SelectField>
      ) : null}
      {needsTimeZone ? (
        <div>
          <TextField
            label="Time zone of the log's clock"
            hint="Such as America/Chicago, or UTC. Daylight saving is taken into account."
            list={zonesId}
            value={extras.timeZone}
            onChange={(event) => onChange({ timeZone: event.target.value })}
          />
          <datalist id={zonesId}>
            {zones.map((zone) => (
              <option key={zone} value={zone} />
            ))}
          </datalist>
        </div>
      ) : null}
      {needsCrs ? (
        <div className="space-y-2">
          <TextField
            label="Coordinate system of easting and northing"
            hint="Such as EPSG:32614 (UTM zone 14 north), or a proj4 text."
            value={extras.crs}
            onChange={(event) => onChange({ crs: event.target.value })}
          />
          {crsCandidates.map(({ crs, words }) => (
            <Button key={crs} aria-pressed={extras.crs === crs} onClick={() => onChange({ crs })}>
              Use {words}
            </Button>
          ))}
        </div>
      ) : null}
      {asksContact ? <ContactFields value={extras.contact} onChange={(contact) => onChange({ contact })} /> : null}
      <TextField
        label="Keep these meanings as a recipe"
        hint="Give it a name, and the next file with the same columns is read without asking. A name that is there already gains a version. Leave empty to keep nothing."
        value={extras.save}
        maxLength={120}
        onChange={(event) => onChange({ save: event.target.value })}
      />
    </div>
  );
}
