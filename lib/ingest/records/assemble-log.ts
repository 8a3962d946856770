import { trimTo } from "@/lib/ingest/records/growing-columns";
import { measureResolution } from "@/lib/ingest/records/measure-resolution";
import type { ChannelStore, RecordCollector } from "@/lib/ingest/records/record-collector";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";

const SEEDING: readonly ChannelId[] = ["downforce", "margin", "contact", "depth", "population"];
const HARVEST: readonly ChannelId[] = ["yieldFlow", "yieldMass"];

/** The finished log: arrays cut to size. */
export function assembleLog(collector: RecordCollector): MachineLog {
  const { records, plan } = collector;
  const channels = collector.stores.map((store) => assembleChannel(collector, store));
  return {
    kind: judgeKind(channels),
    records,
    rows: channels.some((channel) => channel.perRow) ? collector.rows : 1,
    timeMs: trimTo(collector.timeMs, records),
    timeIsRelative: plan.time?.isRelative ?? false,
    longitude: trimTo(collector.longitude, records),
    latitude: trimTo(collector.latitude, records),
    headingDeg: collector.heading && trimTo(collector.heading, records),
    speedMps: collector.speed && trimTo(collector.speed, records),
    working: collector.working && trimTo(collector.working, records),
    loggedPass: collector.pass && trimTo(collector.pass, records),
    sourceLine: trimTo(collector.sourceLine, records),
    channels,
  };
}

function assembleChannel(collector: RecordCollector, store: ChannelStore): LogChannel {
  const { id, unit, perRow } = store.plan;
  const rows = collector.widthOf(store.plan);
  const values = collector.takeValues(store);
  if (store.plan.isLost) for (let i = 0; i < values.length; i++) values[i] = 1 - (values[i] ?? NaN);
  return { id, unit, rows, perRow, values, resolution: measureResolution(values, commonFactor(store)) };
}

/** Factor of the first row that has a column. */
function commonFactor({ plan }: ChannelStore): number {
  for (const factor of plan.factors) if (factor !== 1) return factor;
  return 1;
}

function judgeKind(channels: readonly LogChannel[]): MachineLog["kind"] {
  const has = (ids: readonly ChannelId[]) => channels.some((channel) => ids.includes(channel.id));
  if (has(SEEDING)) return "seeding";
  return has(HARVEST) ? "harvest" : "other";
}
