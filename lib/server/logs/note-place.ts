import { withOrganisation, type Transaction } from "@/db/client";
import { listFieldPlaces, nameFields } from "@/db/queries/log-places";
import type { LogRow } from "@/db/queries/logs";
import { findHoldingField, liesElsewhere, samplePlaces, sayElsewhere } from "@/lib/fields/find-other-field";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { workerScope } from "@/lib/server/logs/worker-scope";

/** A note where the log lies outside its field, with the field that holds it; nothing without a boundary. */
export async function notePlace(
  { organisationId, fieldId }: Pick<LogRow, "organisationId" | "fieldId">,
  log: Pick<MachineLog, "records" | "longitude" | "latitude">,
): Promise<Log["notes"]> {
  const scope = workerScope(organisationId);
  const known = await withOrganisation(scope, (tx) => listFieldPlaces(tx, scope));
  const own = known.find((field) => field.id === fieldId);
  if (!own) return [];
  const places = samplePlaces(log);
  const found = liesElsewhere(places, own.boundary);
  if (!found) return [];
  const others = known.filter((field) => field.id !== fieldId);
  const holding = findHoldingField(places, others);
  const count = Math.round(found.shareElsewhere * log.records);
  const message = sayElsewhere(own.name, found);
  return [{ code: OUTSIDE_FIELD, count, message, ...(holding === null ? {} : { fieldId: holding }) }];
}

/** Adds the name of the holding field for those who may see that field, and takes its id away from those who may not. */
export async function nameHoldingFields(tx: Transaction, scope: Scope, logs: Log[]): Promise<Log[]> {
  const ids = logs.flatMap((log) => log.notes.flatMap((note) => (note.fieldId === undefined ? [] : [note.fieldId])));
  if (ids.length === 0) return logs;
  const names = await nameFields(tx, scope, [...new Set(ids)]);
  return logs.map((log) => ({ ...log, notes: log.notes.map((note) => nameField(note, names)) }));
}

function nameField({ fieldId, ...note }: Log["notes"][number], names: Map<string, string>): Log["notes"][number] {
  const name = fieldId === undefined ? undefined : names.get(fieldId);
  if (name === undefined) return note;
  return { ...note, fieldId, message: note.message.replace(/\.$/, `, in ${name}.`) };
}
