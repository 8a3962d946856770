import { createHash } from "node:crypto";
import { existsSync, mkdirSync, writeFileSync } from "node:fs";
import { withOrganisation } from "@/db/client";
import { hasAuditAction, recordAudit } from "@/db/queries/audit";
import { listFields } from "@/db/queries/fields";
import { findSameBytes } from "@/db/queries/logs";
import { listMachines } from "@/db/queries/machines";
import { replaceGrants } from "@/db/queries/members";
import { DEMO_ORGANISATIONS } from "@/db/seed/organisations";
import { inspectLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { createField } from "@/lib/server/fields/create-field";
import { incomingKey } from "@/lib/server/logs/log-file";
import { readLogJob } from "@/lib/server/logs/read-log-job";
import { ThreadPool } from "@/lib/server/logs/thread-pool";
import { keepUpload } from "@/lib/server/logs/upload-log";
import { createMachine } from "@/lib/server/machines/change-machines";
import { LARKSPUR, LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import {
  writeLarkspurLogs,
  writeLarkspurNextDay,
  type LarkspurFile,
} from "@/lib/simulator/scenario/write-larkspur-logs";

const PAGE = { limit: 500 };
/** Written down at the end, so that what a person deletes from the demo later stays deleted. */
const SEEDED = "demo.seed";
/** Where the browser finds the file that a person drags in on the tour. */
const DEMO_FOLDER = "public/demo";

function ownerScope(slug: string): Scope {
  const organisation = DEMO_ORGANISATIONS.find((one) => one.slug === slug);
  const owner = organisation?.people.find((person) => person.role === "owner");
  if (!organisation || !owner) throw new Error(`the demo has no organisation ${slug} with an owner`);
  return { organisationId: organisation.id, userId: owner.id, role: "owner" };
}

/** Ids of the demo's machines by name; those that are missing are made. */
async function seedMachines(container: Container, scope: Scope): Promise<Map<string, string>> {
  const { rows } = await withOrganisation(scope, (tx) => listMachines(tx, scope, PAGE));
  const ids = new Map(rows.map((row) => [row.name, row.id]));
  for (const machine of LARKSPUR.machines) {
    if (!ids.has(machine.name)) ids.set(machine.name, (await createMachine(container, scope, machine)).id);
  }
  return ids;
}

async function seedFields(
  container: Container,
  scope: Scope,
  wanted: Parameters<typeof createField>[2][],
): Promise<Map<string, string>> {
  const { rows } = await withOrganisation(scope, (tx) => listFields(tx, scope, PAGE));
  const ids = new Map(rows.map((row) => [row.name, row.id]));
  for (const field of wanted) {
    if (!ids.has(field.name)) ids.set(field.name, (await createField(container, scope, field)).id);
  }
  return ids;
}

/** What a person would confirm on the columns screen: every proposal that has a unit. */
async function proposedMapping(file: LarkspurFile, bytes: Uint8Array): Promise<LogMapping> {
  const inspected = await inspectLog(bytesSource(file.fileName, bytes));
  if (!inspected.ok) throw new Error(`${file.fileName}: ${inspected.error.message}`);
  const columns = inspected.value.columns.flatMap(({ name, proposal }) => {
    if (!proposal?.unit) return [];
    const { channel, row, unit, format } = proposal;
    return [{ name, channel, row, unit, format }];
  });
  return { shape: inspected.value.shape, columns };
}

interface SeedPlace {
  container: Container;
  scope: Scope;
  threads: ThreadPool;
}

/** Puts a file through the very steps of an upload: stored, mapped, read, placed. Nothing happens when it is there. */
async function seedLog(
  { container, scope, threads }: SeedPlace,
  file: LarkspurFile,
  into: { fieldId: string; machineId: string | null },
): Promise<void> {
  const bytes = new TextEncoder().encode(file.text);
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  const known = await withOrganisation(scope, (tx) => findSameBytes(tx, scope, { fieldId: into.fieldId, sha256 }));
  if (known) return;
  const key = incomingKey(scope.organisationId, sha256);
  await container.storage.put(key, bytes);
  const files = [{ key, fileName: file.fileName, fileBytes: bytes.length, sha256 }];
  const mapping = await proposedMapping(file, bytes);
  const logId = await keepUpload(container, scope, { ...into, again: false, files, mapping });
  await container.storage.delete(key);
  const { organisationId } = scope;
  await readLogJob({ organisationId, logId }, { threads, signal: new AbortController().signal });
}

/** The file for the tour, made once. */
export function writeDemoFile(): void {
  const path = `${DEMO_FOLDER}/${LARKSPUR_NEXT_DAY.fileName}`;
  if (existsSync(path)) return;
  mkdirSync(DEMO_FOLDER, { recursive: true });
  writeFileSync(path, writeLarkspurNextDay().text);
}

/** Fields, machines and logs of the invented Larkspur Flats farm, once; a killed run is resumed. */
export async function seedDemo(container: Container): Promise<void> {
  const scope = ownerScope("larkspur-flats");
  if (await withOrganisation(scope, (tx) => hasAuditAction(tx, scope, SEEDED))) return;
  const threads = new ThreadPool(container.env);
  try {
    const machineIds = await seedMachines(container, scope);
    const fieldIds = await seedFields(
      container,
      scope,
      LARKSPUR.fields.map(({ name, farm, landowner, boundary }) => ({ name, farm, landowner, boundary })),
    );
    await seedFields(container, ownerScope("otherfarm"), [{ name: "Home field", farm: "Otherfarm" }]);
    for (const file of writeLarkspurLogs()) {
      const field = LARKSPUR.fields.find(({ key }) => key === file.fieldKey);
      const fieldId = fieldIds.get(field?.name ?? "");
      if (!fieldId) throw new Error(`the demo has no field for ${file.fileName}`);
      const machineId = machineIds.get(file.machineName) ?? null;
      await seedLog({ container, scope, threads }, file, { fieldId, machineId });
    }
    const viewer = DEMO_ORGANISATIONS[0]?.people.find((person) => person.role === "viewer");
    const shown = fieldIds.get("East quarter");
    if (viewer && shown) {
      await withOrganisation(scope, (tx) => replaceGrants(tx, scope, { userId: viewer.id, fieldIds: [shown] }));
    }
    const subject = scope.organisationId;
    await withOrganisation(scope, (tx) => recordAudit(tx, scope, { action: SEEDED, subject }));
  } finally {
    await threads.close();
  }
}
