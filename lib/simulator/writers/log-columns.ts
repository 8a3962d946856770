import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import { DEPTH_DECIMALS, type FileStyle, PER_SI_UNIT, SPEED_DECIMALS } from "@/lib/simulator/writers/file-style";

/** A column of a written log: its heading, and its number (or text) at a record; null where the log holds nothing. */
export interface LogColumn {
  name: string;
  /** Decimals of the number; -1 for text. */
  decimals: number;
  at(record: number): number | string | null;
}

/** One measured channel as written: wording, unit and factor. */
export interface WrittenChannel {
  channel: LogChannel;
  factor: number;
  decimals: number;
  nameOf(row: number | null): string;
}

const WORDS: Record<string, { plain: string; short: string }> = {
  downforce: { plain: "Downforce", short: "DF" },
  margin: { plain: "Margin", short: "MG" },
  depth: { plain: "Depth", short: "DP" },
  yieldFlow: { plain: "Grain flow", short: "FLOW" },
  moisture: { plain: "Moisture", short: "MOIST" },
  swathWidth: { plain: "Cut width", short: "WIDTH" },
};

/** How a channel is worded and measured in a style. */
export function describeWrittenChannel(channel: LogChannel, style: FileStyle): WrittenChannel {
  const words = WORDS[channel.id] ?? { plain: channel.id, short: channel.id.toUpperCase() };
  const { unit, factor, decimals } = measure(channel, style);
  return {
    channel,
    factor,
    decimals,
    nameOf(row) {
      if (style.naming === "short") {
        const rowPart = row === null ? "" : `_${String(row).padStart(2, "0")}`;
        return `${words.short}${rowPart}_${unit === "%" ? "pct" : unit.replace("/", "p")}`;
      }
      return `${words.plain}${row === null ? "" : ` row ${row}`} (${unit})`;
    },
  };
}

function measure(channel: LogChannel, style: FileStyle): { unit: string; factor: number; decimals: number } {
  if (channel.unit === "N") {
    return { unit: style.force, factor: PER_SI_UNIT[style.force], decimals: style.forceDecimals };
  }
  if (channel.id === "depth") {
    return { unit: style.depth, factor: PER_SI_UNIT[style.depth], decimals: DEPTH_DECIMALS[style.depth] };
  }
  if (channel.unit === "fraction") return { unit: "%", factor: 100, decimals: 1 };
  if (channel.unit === "m") return { unit: "m", factor: 1, decimals: 3 };
  return { unit: channel.unit, factor: 1, decimals: 2 };
}

/** Columns that place a record: time, position, and whatever else the log has. */
export function placingColumns(log: MachineLog, style: FileStyle): LogColumn[] {
  const plain = style.naming === "plain";
  const columns: LogColumn[] = [
    timeColumn(log, style),
    number(plain ? "Longitude (deg)" : "LON_deg", style.positionDecimals, log.longitude),
    number(plain ? "Latitude (deg)" : "LAT_deg", style.positionDecimals, log.latitude),
  ];
  if (log.headingDeg) columns.push(number(plain ? "Heading (deg)" : "HDG_deg", 1, log.headingDeg));
  if (log.speedMps) {
    const unit = style.speed.replace("/", plain ? "/" : "p");
    const name = plain ? `Speed (${unit})` : `SPD_${unit}`;
    columns.push(number(name, SPEED_DECIMALS[style.speed], log.speedMps, PER_SI_UNIT[style.speed]));
  }
  if (log.working) columns.push(number(plain ? "Working (0 or 1)" : "WORKING", 0, log.working));
  if (log.loggedPass) columns.push(number(plain ? "Pass" : "PASS", 0, log.loggedPass));
  if (style.unexplainedColumn !== null) {
    columns.push({ name: style.unexplainedColumn, decimals: 0, at: (record) => 17 + (Math.floor(record / 40) % 9) });
  }
  return columns;
}

// kernel: a heading, its digits, the values and their factor
function number(
  name: string,
  decimals: number,
  values: Float64Array | Float32Array | Uint8Array | Int32Array,
  factor = 1,
): LogColumn {
  return {
    name,
    decimals,
    at(record) {
      const value = values[record] ?? NaN;
      return Number.isNaN(value) ? null : value * factor;
    },
  };
}

function timeColumn(log: MachineLog, style: FileStyle): LogColumn {
  const plain = style.naming === "plain";
  if (style.time === "unix-s") return number(plain ? "Time (unix s)" : "TIME_unix_s", 1, log.timeMs, 0.001);
  if (style.time === "unix-ms") return number(plain ? "Time (unix ms)" : "TIME_unix_ms", 0, log.timeMs);
  return {
    name: plain ? "Time (UTC)" : "TIME_utc",
    decimals: -1,
    at(record) {
      const ms = log.timeMs[record] ?? NaN;
      return Number.isNaN(ms) ? null : new Date(ms).toISOString();
    },
  };
}

/** All columns of the wide layout: placing ones, then each channel's rows side by side. */
export function wideColumns(log: MachineLog, style: FileStyle): LogColumn[] {
  const measured = log.channels.flatMap((channel) => {
    const written = describeWrittenChannel(channel, style);
    if (!channel.perRow) return [rowColumn(written, null)];
    return Array.from({ length: channel.rows }, (_, row) => rowColumn(written, row + 1));
  });
  return [...placingColumns(log, style), ...measured];
}

/** A channel's column for one row (1-based), or its only one. */
export function rowColumn(written: WrittenChannel, row: number | null): LogColumn {
  const { values, rows } = written.channel;
  const first = (row ?? 1) - 1;
  return {
    name: written.nameOf(row),
    decimals: written.decimals,
    at(record) {
      const value = values[record * rows + first] ?? NaN;
      return Number.isNaN(value) ? null : value * written.factor;
    },
  };
}
