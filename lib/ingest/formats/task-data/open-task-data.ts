import type { Element } from "@xmldom/xmldom";
import { readDevices, type DeviceElement } from "@/lib/ingest/formats/task-data/read-devices";
import { attributeOf, childrenOf, readXmlRoot } from "@/lib/ingest/formats/task-data/read-xml";
import type { ZipEntry } from "@/lib/ingest/formats/zip/list-entries";
import { unpackEntry, type ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";

/** One time log of one task, by its files. */
export interface TimeLogFiles {
  /** `TSK-1/TLG00001`, with the folder before it where the archive holds several. */
  id: string;
  label: string;
  /** The task it belongs to, and what that is called. */
  task: string;
  taskLabel: string;
  header: ZipEntry;
  binary: ZipEntry;
  elements: Map<string, DeviceElement>;
}

export interface TaskData {
  logs: TimeLogFiles[];
  /** Time logs named by a task whose files are not in the archive. */
  absent: string[];
}

const MAIN_FILE = /(?:^|\/)taskdata\.xml$/i;

export function holdsTaskData({ entries }: ZipArchive): boolean {
  return entries.some((entry) => MAIN_FILE.test(entry.name) && !/(?:^|\/)(?:__MACOSX|\._)/.test(entry.name));
}

/** The time logs of all tasks in an archive. File names may be in any letter case. Stops with `task-data-damaged` or `no-readings`. */
export async function openTaskData(archive: ZipArchive): Promise<TaskData> {
  const mains = archive.entries.filter(
    (entry) => MAIN_FILE.test(entry.name) && !/(?:^|\/)(?:__MACOSX|\._)/.test(entry.name),
  );
  const found: TaskData = { logs: [], absent: [] };
  for (const main of mains) {
    const folder = main.name.slice(0, main.name.length - "taskdata.xml".length);
    const part = await openFolder(archive, main, folder);
    const prefix = mains.length > 1 ? folder : "";
    found.logs.push(...part.logs.map((log) => withPrefix(log, prefix)));
    found.absent.push(...part.absent);
  }
  if (found.logs.length === 0) {
    const why =
      found.absent.length > 0
        ? `the files of its time logs (such as ${found.absent[0] ?? ""}.bin) are not in the archive`
        : "none of its tasks has a time log";
    stopReading(
      "no-readings",
      `The task data in "${archive.name}" holds no log: ${why}. Zip the whole TASKDATA folder after the work is done.`,
    );
  }
  if (found.logs.length > READ_LIMITS.layers) {
    stopReading(
      "file-too-large",
      `The task data in "${archive.name}" holds ${found.logs.length} time logs; ${READ_LIMITS.layers} are read at once. Zip fewer tasks.`,
    );
  }
  return found;
}

function withPrefix(log: TimeLogFiles, prefix: string): TimeLogFiles {
  const { id, label, task, taskLabel } = log;
  return { ...log, id: prefix + id, label: prefix + label, task: prefix + task, taskLabel: prefix + taskLabel };
}

async function openFolder(archive: ZipArchive, main: ZipEntry, folder: string): Promise<TaskData> {
  const files = new Map(archive.entries.map((entry) => [entry.name.toLowerCase(), entry]));
  const find = (name: string) => files.get((folder + name).toLowerCase()) ?? null;
  const root = readXmlRoot(await unpackXml(archive, main), main.name);
  const roots = [root];
  // Parts of the task file may stand in files of their own (XFR).
  for (const reference of childrenOf(root, "XFR")) {
    const entry = find(`${attributeOf(reference, "A") ?? ""}.xml`);
    if (entry) roots.push(readXmlRoot(await unpackXml(archive, entry), entry.name));
  }
  const elements = readDevices(roots);
  const found: TaskData = { logs: [], absent: [] };
  for (const task of roots.flatMap((part) => childrenOf(part, "TSK"))) {
    for (const log of childrenOf(task, "TLG")) {
      const fileName = attributeOf(log, "A") ?? "";
      const [header, binary] = [find(`${fileName}.xml`), find(`${fileName}.bin`)];
      if (header && binary) found.logs.push({ ...nameLog(task, fileName), header, binary, elements });
      else found.absent.push(fileName);
    }
  }
  return found;
}

function nameLog(task: Element, fileName: string): Pick<TimeLogFiles, "id" | "label" | "task" | "taskLabel"> {
  const taskId = attributeOf(task, "A") ?? "task";
  const taskLabel = attributeOf(task, "B") ?? taskId;
  return { id: `${taskId}/${fileName}`, label: `${taskLabel}, ${fileName}`, task: taskId, taskLabel };
}

export async function unpackXml(archive: ZipArchive, entry: ZipEntry): Promise<Uint8Array> {
  if (entry.unpackedBytes <= READ_LIMITS.xmlBytes) return unpackEntry(archive, entry);
  stopReading(
    "file-too-large",
    `"${entry.name}" in "${archive.name}" is larger than 16 MB, which no description of tasks and devices is. Export less.`,
  );
}
