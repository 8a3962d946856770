import type { StoredRun } from "@/db/queries/pass-readings";
import type { LocalPlane } from "@/lib/geo/local-plane";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { RecordColumnName, RecordRun } from "@/lib/logs/packed-columns";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { PlacedBody } from "@/lib/server/logs/placed-body";

/** What is known of a log without its records. */
export interface LogFrame {
  body: PlacedBody;
  plane: LocalPlane;
  /** Logged channels to load. */
  channels: PlacedBody["channels"];
}

/** A stored run of records as a log of its own; null where stored arrays are missing, as when a newer version replaced them. */
export function placeRun(frame: LogFrame, run: RecordRun, stored: readonly StoredRun[]): PlacedLog | null {
  const byName = new Map(stored.map((one) => [one.channel, one]));
  const isWhole = (name: string) => byName.get(name)?.records === run.records;
  if (!ALWAYS_STORED.every(isWhole) || !frame.channels.every(({ id }) => isWhole(id))) return null;
  const of = (name: RecordColumnName) => storedNumbers(byName.get(name)!);
  const optional = (name: RecordColumnName) => (byName.has(name) ? of(name) : null);
  const { body } = frame;
  const pass = body.passes.find((one) => one.pass === run.pass);
  const [logged, speed] = [optional("record:loggedHeading"), optional("record:loggedSpeed")];
  const [working, loggedPass] = [optional("record:working"), optional("record:loggedPass")];
  return {
    ...frameOf(frame),
    log: {
      kind: body.kind,
      records: run.records,
      rows: body.rows,
      timeIsRelative: body.timeIsRelative,
      timeMs: Float64Array.from(of("record:time")),
      longitude: Float64Array.from(of("record:longitude")),
      latitude: Float64Array.from(of("record:latitude")),
      headingDeg: logged && Float32Array.from(logged),
      speedMps: speed && Float32Array.from(speed),
      working: working && Uint8Array.from(working),
      loggedPass: loggedPass && Int32Array.from(loggedPass),
      sourceLine: Uint32Array.from(of("record:sourceLine")),
      channels: frame.channels.map((channel) => loadedChannel(channel, byName.get(channel.id)!)),
    },
    originEastM: Float64Array.from(of("record:originEast")),
    originNorthM: Float64Array.from(of("record:originNorth")),
    headingDeg: Float32Array.from(of("record:heading")),
    speedMps: Float32Array.from(of("record:speed")),
    flags: Uint32Array.from(of("record:flags")),
    passOf: Int32Array.from(of("record:passOf")),
    passes: pass ? [{ ...toPass(pass), first: 0, records: run.records }] : [],
  };
}

/** The log without a record, its channels empty. */
export function outlineOfFrame(frame: LogFrame): PlacedLog {
  const { body } = frame;
  const none = { f4: new Float32Array(0), f8: new Float64Array(0), u4: new Uint32Array(0) };
  return {
    ...frameOf(frame),
    log: {
      kind: body.kind,
      records: 0,
      rows: body.rows,
      timeIsRelative: body.timeIsRelative,
      timeMs: none.f8,
      longitude: none.f8,
      latitude: none.f8,
      headingDeg: null,
      speedMps: null,
      working: null,
      loggedPass: null,
      sourceLine: none.u4,
      channels: frame.channels.map((channel) => ({ ...channel, id: channel.id as LogChannel["id"], values: none.f4 })),
    },
    originEastM: none.f8,
    originNorthM: none.f8,
    headingDeg: none.f4,
    speedMps: none.f4,
    flags: none.u4,
    passOf: new Int32Array(0),
    passes: body.passes.map(toPass),
  };
}

const ALWAYS_STORED: readonly RecordColumnName[] = [
  "record:time",
  "record:longitude",
  "record:latitude",
  "record:sourceLine",
  "record:originEast",
  "record:originNorth",
  "record:heading",
  "record:speed",
  "record:flags",
  "record:passOf",
];

function frameOf({ body, plane }: LogFrame): Pick<PlacedLog, "machine" | "geometry" | "plane"> {
  const { rows, offsetM, forwardM, widthM } = body.geometry;
  return {
    machine: body.machine,
    plane,
    geometry: {
      rows,
      offsetM: Float64Array.from(offsetM),
      forwardM: Float64Array.from(forwardM),
      widthM: Float64Array.from(widthM),
    },
  };
}

function toPass(pass: PlacedBody["passes"][number]): PlacedLog["passes"][number] {
  const number = (value: number | null) => value ?? NaN;
  return {
    ...pass,
    startedAtMs: number(pass.startedAtMs),
    endedAtMs: number(pass.endedAtMs),
    headingDeg: number(pass.headingDeg),
  };
}

function loadedChannel(channel: PlacedBody["channels"][number], stored: StoredRun): LogChannel {
  const values = Float32Array.from(storedNumbers(stored));
  return { ...channel, id: channel.id as LogChannel["id"], values };
}

/** Both ends are little-endian; fields of a COPY are not aligned, a copy is. */
function storedNumbers({ values, element }: StoredRun): Float64Array | Float32Array | Uint32Array {
  const aligned = Uint8Array.from(values).buffer;
  if (element === "f8") return new Float64Array(aligned);
  return element === "f4" ? new Float32Array(aligned) : new Uint32Array(aligned);
}
