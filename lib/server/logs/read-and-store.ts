import { withOrganisation } from "@/db/client";
import { endJobs } from "@/db/queries/jobs";
import { listLogFiles } from "@/db/queries/log-files";
import { saveLogResult } from "@/db/queries/log-results";
import { changeLog, findBoundaryOfLog, findMachineOfLog, type LogRow } from "@/db/queries/logs";
import { noteRepeated } from "@/lib/ingest/join-parts";
import type { Inspection } from "@/lib/ingest/log-format";
import type { LogNote } from "@/lib/logs/machine-log";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { Seeder } from "@/lib/machines/machine";
import type { Boundary } from "@/lib/schemas/geometry";
import { chooseMapping, type ChosenMapping } from "@/lib/server/logs/choose-mapping";
import type { LogFile } from "@/lib/server/logs/log-file";
import { LogFailure } from "@/lib/server/logs/log-failure";
import type { LogProgress } from "@/lib/server/logs/log-progress";
import { notePlace } from "@/lib/server/logs/note-place";
import type { ThreadPool } from "@/lib/server/logs/thread-pool";
import { VersionWriter } from "@/lib/server/logs/version-writer";
import { workerScope } from "@/lib/server/logs/worker-scope";

/**
 * From the stored file to a stored version, or to the question what the columns mean.
 * @throws LogFailure for a file that cannot be read, LogInterrupted when told to stop
 */
export async function readAndStore(log: LogRow, threads: ThreadPool, progress: LogProgress): Promise<void> {
  const context = await readContext(log);
  await threads.use(async (thread) => {
    const ask = {
      signal: progress.signal,
      onProgress: (stage: string, share: number) => progress.tell(stage, share, share < 0.5 ? "reading" : "building"),
    };
    progress.tell("Looking at the columns", 0.01);
    const { files, repeated } = context;
    const inspected = await thread.inspect({ files, near: context.near }, ask);
    if (!inspected.ok) throw new LogFailure(inspected.error);
    inspected.value.notes.push(...repeated);
    const chosen = await chooseMapping(log, inspected.value);
    await keepInspection(log, inspected.value, chosen);
    if (!chosen) return waitForMapping(log, inspected.value, progress);
    progress.tell("Reading the records", 0.05);
    const { machine, workingWidthM, boundary } = context;
    const { mapping } = chosen;
    const writer = new VersionWriter(log, machine, progress);
    let stood: PackedPlacedLog | undefined;
    const onPlaced = (placed: PackedPlacedLog) => {
      stood = placed;
      writer.begin(placed);
    };
    try {
      const built = await thread.read({ files, mapping, machine, workingWidthM, boundary }, { ...ask, onPlaced });
      if (!built.ok) throw new LogFailure(built.error);
      const place = stood ? await notePlace(log, stood.log) : [];
      await writer.finish({ ...built.value, notes: [...place, ...repeated, ...built.value.notes] });
    } catch (error) {
      await writer.undo(error);
      throw error;
    }
  });
}

interface LogContext {
  /** In the order sent, each with bytes of its own. */
  files: LogFile[];
  /** Says which files were sent twice. */
  repeated: LogNote[];
  machine: Seeder | null;
  /** Of a named machine that is no seeder: a combine's header. */
  workingWidthM: number | null;
  boundary: Boundary | null;
  near: { longitude: number; latitude: number } | null;
}

async function readContext(log: LogRow): Promise<LogContext> {
  const scope = workerScope(log.organisationId);
  return withOrganisation(scope, async (tx) => {
    const boundary = await findBoundaryOfLog(tx, scope, log.fieldId);
    const machine = log.machineId ? await findMachineOfLog(tx, scope, log.machineId) : null;
    const ring = boundary?.type === "Polygon" ? boundary.coordinates[0] : boundary?.coordinates[0]?.[0];
    const corner = ring?.[0];
    const rows = await listLogFiles(tx, scope, log.id);
    const copies = rows.flatMap((row) => row.copies);
    return {
      files: rows.map(({ organisationId, sha256, fileName, fileBytes }) => {
        return { organisationId, sha256, fileName, fileBytes };
      }),
      repeated: copies.length === 0 ? [] : [noteRepeated(copies)],
      machine: machine?.kind === "seeder" ? machine : null,
      workingWidthM: machine?.kind === "combine" ? machine.headerWidthM : null,
      boundary,
      near: corner ? { longitude: corner[0] ?? 0, latitude: corner[1] ?? 0 } : null,
    };
  });
}

/** What was found in the file, kept under version 0: it belongs to the file, not to one reading of it. */
async function keepInspection(log: LogRow, inspection: Inspection, chosen: ChosenMapping | null): Promise<void> {
  const scope = workerScope(log.organisationId);
  await withOrganisation(scope, async (tx) => {
    await saveLogResult(tx, scope, { logId: log.id, version: 0, kind: "columns", body: inspection });
    if (chosen) await changeLog(tx, scope, log.id, chosen);
  });
}

async function waitForMapping(log: LogRow, inspection: Inspection, progress: LogProgress): Promise<void> {
  await progress.end();
  const scope = workerScope(log.organisationId);
  await withOrganisation(scope, async (tx) => {
    const stage = "Waiting for you to confirm what the columns mean";
    await changeLog(tx, scope, log.id, { status: "needs-mapping", stage, progress: 0, notes: inspection.notes });
    await endJobs(tx, scope, { subject: log.id, state: "done" });
  });
}
