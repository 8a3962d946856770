import { zipSync } from "fflate";
import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import { writeTimeLogBinary, type WrittenValue } from "@/lib/simulator/writers/write-time-log";

/** One task with the log made in it. */
export interface WrittenTask {
  designator: string;
  log: MachineLog;
}

export interface TaskDataStyle {
  /** Name of the machine in the device description. */
  deviceName: string;
  /** Right of and ahead of the machine's reference point, one a row. */
  rowOffsetsM: ArrayLike<number>;
  rowForwardM: ArrayLike<number>;
  rowWidthM: number;
  /** The machine's clock ahead of UTC. */
  clockAheadMin: number;
  /** The order in which the description lists the rows, as row numbers; a reader must not rely on it. */
  rowOrder: readonly number[] | null;
  /** File names of the archive in small or capital letters. */
  letterCase: "upper" | "lower";
  /** Writes the load on the gauge wheel under an identifier of the maker's own. */
  withMargin: boolean;
}

const DEFAULTS: Omit<TaskDataStyle, "rowOffsetsM" | "rowForwardM"> = {
  deviceName: "Larkspur drill",
  rowWidthM: 0.25,
  clockAheadMin: -300,
  rowOrder: null,
  letterCase: "upper",
  withMargin: false,
};

/** Channels that ISO 11783-11 has an identifier for: its number, and how many of its units one SI unit is. */
const IDENTIFIERS: Partial<Record<string, { ddi: number; perSi: number }>> = {
  downforce: { ddi: 427, perSi: 1 },
  depth: { ddi: 57, perSi: 1000 },
  population: { ddi: 12, perSi: 1000 },
};
const MARGIN = { ddi: 57_600, perSi: 1 };
const WORK_STATE = 141;
const SPEED = 397;
/** Fixed, so the same log gives the same bytes. */
const ZIP_TIME = new Date("2026-09-24T12:00:00");

/** Zipped ISO 11783-10 task data: one device, one element a row with its offsets, one task and one time log a given log. */
export function writeTaskDataZip(
  tasks: readonly WrittenTask[],
  input: Partial<TaskDataStyle> & Pick<TaskDataStyle, "rowOffsetsM" | "rowForwardM">,
): Uint8Array {
  const style: TaskDataStyle = { ...DEFAULTS, ...input };
  const text = new TextEncoder();
  const files: Record<string, Uint8Array> = { "TASKDATA/TASKDATA.XML": text.encode(writeMain(tasks, style)) };
  tasks.forEach(({ log }, index) => {
    const values = listValues(log, style);
    const name = `TASKDATA/${logName(index)}`;
    files[`${name}.XML`] = text.encode(writeHeader(values));
    files[`${name}.BIN`] = writeTimeLogBinary(log, values, style.clockAheadMin);
  });
  const cased = Object.entries(files).map(([name, bytes]): [string, Uint8Array] => [
    style.letterCase === "lower" ? name.toLowerCase() : name,
    bytes,
  ]);
  return zipSync(Object.fromEntries(cased), { mtime: ZIP_TIME, level: 9 });
}

function logName(index: number): string {
  return `TLG${String(index + 1).padStart(5, "0")}`;
}

/** The machine's own values first, then each channel row by row. Element 1 is the device, 2 the function, 3 on the rows. */
function listValues(log: MachineLog, style: TaskDataStyle): WrittenValue[] {
  const values: WrittenValue[] = [];
  const { working, speedMps } = log;
  if (working) values.push({ ddi: WORK_STATE, element: "DET-2", at: (record) => working[record] ?? NaN });
  if (speedMps) values.push({ ddi: SPEED, element: "DET-1", at: (record) => (speedMps[record] ?? NaN) * 1000 });
  for (const channel of log.channels) {
    const known = identify(channel, style);
    if (!known) continue;
    for (let row = 1; row <= channel.rows; row += 1) {
      const at = (record: number) => (channel.values[record * channel.rows + row - 1] ?? NaN) * known.perSi;
      values.push({ ddi: known.ddi, element: `DET-${row + 2}`, at });
    }
  }
  return values;
}

function identify({ id, perRow }: LogChannel, style: TaskDataStyle): { ddi: number; perSi: number } | null {
  if (!perRow) return null;
  return id === "margin" ? (style.withMargin ? MARGIN : null) : (IDENTIFIERS[id] ?? null);
}

function hex(ddi: number): string {
  return ddi.toString(16).toUpperCase().padStart(4, "0");
}

function writeHeader(values: readonly WrittenValue[]): string {
  const lines = values.map(({ ddi, element }) => `<DLV A="${hex(ddi)}" B="" C="${element}"/>`);
  return `<?xml version="1.0" encoding="UTF-8"?>\n<TIM A="" D="4"><PTN A="" B="" D=""/>${lines.join("")}</TIM>\n`;
}

function writeMain(tasks: readonly WrittenTask[], style: TaskDataStyle): string {
  const written = tasks.map(
    ({ designator }, index) =>
      `<TSK A="TSK-${index + 1}" B="${escape(designator)}" G="4"><TLG A="${logName(index)}" C="1"/></TSK>`,
  );
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    '<ISO11783_TaskData VersionMajor="4" VersionMinor="3" ManagementSoftwareManufacturer="Larkspur" ManagementSoftwareVersion="1" DataTransferOrigin="2">',
    ...writeDevice(style),
    ...written,
    "</ISO11783_TaskData>",
    "",
  ].join("\n");
}

/** Object numbers of the description: rows from 100 on, their three properties from 1000 on, process data from 2. */
const FIRST_ROW_OBJECT = 100;
const FIRST_PROPERTY_OBJECT = 1000;
const MARGIN_OBJECT = 6;

function writeDevice(style: TaskDataStyle): string[] {
  const rows = Array.from({ length: style.rowOffsetsM.length }, (_, index) => index + 1);
  const listed = style.rowOrder ?? rows;
  const margin = style.withMargin ? `<DOR A="${MARGIN_OBJECT}"/>` : "";
  const elements = listed.map((row, index) => {
    const first = FIRST_PROPERTY_OBJECT + 3 * row;
    const references = [2, 3, 4, first, first + 1, first + 2].map((object) => `<DOR A="${object}"/>`).join("");
    return `<DET A="DET-${row + 2}" B="${FIRST_ROW_OBJECT + row}" C="5" D="Row unit" E="${index + 2}" F="11">${references}${margin}</DET>`;
  });
  const properties = rows.flatMap((row) => {
    const first = FIRST_PROPERTY_OBJECT + 3 * row;
    const millimetres = (metres: number) => Math.round(metres * 1000);
    return [
      `<DPT A="${first}" B="0086" C="${millimetres(style.rowForwardM[row - 1] ?? 0)}" D="Offset X"/>`,
      `<DPT A="${first + 1}" B="0087" C="${millimetres(style.rowOffsetsM[row - 1] ?? 0)}" D="Offset Y"/>`,
      `<DPT A="${first + 2}" B="0043" C="${millimetres(style.rowWidthM)}" D="Width"/>`,
    ];
  });
  return [
    `<DVC A="DVC-1" B="${escape(style.deviceName)}" D="A000000000000000" F="00000000000000" G="00000000000000">`,
    `<DET A="DET-1" B="10" C="1" D="${escape(style.deviceName)}" E="0" F="0"><DOR A="8"/></DET>`,
    '<DET A="DET-2" B="11" C="2" D="Openers" E="1" F="10"><DOR A="7"/></DET>',
    ...elements,
    ...properties,
    '<DPD A="2" B="01AB" C="1" D="8" E="Downforce"/>',
    '<DPD A="3" B="0039" C="1" D="8" E="Depth" F="5"/>',
    '<DPD A="4" B="000C" C="1" D="8" E="Population"/>',
    '<DVP A="5" B="0" C="0.1" D="1" E="cm"/>',
    `<DPD A="${MARGIN_OBJECT}" B="${hex(MARGIN.ddi)}" C="1" D="8" E="Gauge wheel load" F="9"/>`,
    '<DPD A="7" B="008D" C="1" D="8" E="Work state"/>',
    '<DPD A="8" B="018D" C="1" D="8" E="Speed"/>',
    '<DVP A="9" B="0" C="1" D="0" E="N"/>',
    "</DVC>",
  ];
}

function escape(text: string): string {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll('"', "&quot;");
}
