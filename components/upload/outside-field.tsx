"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { useFields } from "@/components/hooks/use-fields";
import { useMoveLog } from "@/components/hooks/use-logs";
import { Button } from "@/components/ui/button";
import { SelectField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import type { Log } from "@/lib/schemas/logs";

export interface OutsideFieldProps {
  log: Log;
  /** `/org/fields/fld_…` of the field the log is in now. */
  fieldPath: string;
  mayMove: boolean;
}

/** The note that a log lies outside its field, if it has one. */
export function outsideFieldNote(log: Pick<Log, "notes">): Log["notes"][number] | undefined {
  return log.notes.find((note) => note.code === OUTSIDE_FIELD);
}

/** Said before the verdict: the readings are of other ground; and the way to put the log where it belongs. */
export function OutsideField({ log, fieldPath, mayMove }: OutsideFieldProps) {
  const note = outsideFieldNote(log);
  if (!note) return null;
  return (
    <Notice state="look" urgent title="These readings lie elsewhere">
      <p>{note.message}</p>
      <p>What is said of rows and ground is about the place where they lie, not about this field.</p>
      {mayMove ? <MoveLog log={log} fieldPath={fieldPath} proposed={note.fieldId ?? ""} /> : null}
    </Notice>
  );
}

interface MoveLogProps {
  log: Log;
  fieldPath: string;
  proposed: string;
}

function MoveLog({ log, fieldPath, proposed }: MoveLogProps) {
  const router = useRouter();
  const fields = useFields().data?.items ?? [];
  const move = useMoveLog(log.id);
  const [chosen, setChosen] = useState(proposed);
  const others = fields.filter((field) => field.id !== log.fieldId);
  const name = others.find((field) => field.id === chosen)?.name;
  const fieldsPath = fieldPath.slice(0, fieldPath.lastIndexOf("/"));
  const goThere = () => router.push(`${fieldsPath}/${chosen}/logs/${log.id}`);
  if (others.length === 0) return null;
  return (
    <div className="space-y-3 pt-3">
      <SelectField label="Field it belongs to" value={chosen} onChange={(event) => setChosen(event.target.value)}>
        <option value="">Choose a field</option>
        {others.map((field) => (
          <option key={field.id} value={field.id}>
            {field.name}
          </option>
        ))}
      </SelectField>
      <Button
        kind="primary"
        disabled={name === undefined || move.isPending}
        onClick={() => move.mutate(chosen, { onSuccess: goThere })}
      >
        {name === undefined ? "Move the log" : `Move it to ${name}`}
      </Button>
      {move.error ? <p role="alert">{describeFailure(move.error)}</p> : null}
    </div>
  );
}
