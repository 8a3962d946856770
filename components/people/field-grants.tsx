"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { CheckField } from "@/components/ui/check-field";
import type { Field } from "@/lib/schemas/fields";
import type { Member } from "@/lib/schemas/people";

export interface FieldGrantsProps {
  member: Member;
  fields: Field[];
  onSave: (fieldIds: string[]) => void;
}

/** A list of fields to tick. */
export function FieldGrants({ member, fields, onSave }: FieldGrantsProps) {
  const [chosen, setChosen] = useState(new Set(member.fieldIds));
  const toggle = (id: string, on: boolean) => {
    const next = new Set(chosen);
    if (on) next.add(id);
    else next.delete(id);
    setChosen(next);
  };
  return (
    <form
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        onSave([...chosen]);
      }}
    >
      <fieldset>
        <legend className="sr-only">Fields</legend>
        {fields.map((field) => (
          <CheckField
            key={field.id}
            label={field.name}
            checked={chosen.has(field.id)}
            onChange={(event) => toggle(field.id, event.target.checked)}
          />
        ))}
        {fields.length === 0 ? <p className="text-ink-soft">There is no field yet.</p> : null}
      </fieldset>
      <Button type="submit" kind="primary">
        Save
      </Button>
    </form>
  );
}
