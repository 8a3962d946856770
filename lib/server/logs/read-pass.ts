import "server-only";
import { AppError } from "@/lib/errors";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import type { ResolvedChannel } from "@/lib/channels/resolve-channel";
import type { PackablePassReadings } from "@/lib/schemas/packed-readings";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel } from "@/lib/server/logs/find-placed-log";

interface PassInput {
  logId: string;
  cleaned?: boolean;
  pass: number;
  channel: string;
  /** Readings as one packed text instead of lists. */
  values?: "lists" | "packed";
}

interface FoundPass {
  placed: PlacedLog;
  pass: Pass;
  channel: ResolvedChannel;
}

async function findPass(container: Container, scope: Scope, input: PassInput): Promise<FoundPass> {
  const { log, placed } = await findPlacedLog(container, scope, { ...input, channel: null });
  const pass = placed.passes.find((one) => one.pass === input.pass);
  if (!pass) throw new AppError("not_found", `This log has no pass ${input.pass}.`);
  return { placed, pass, channel: await loadChannel(container, log, input.channel) };
}

const orNull = (value: number) => (Number.isFinite(value) ? value : null);

function part(values: ArrayLike<number>, { first, records }: Pass): (number | null)[] {
  return Array.from({ length: records }, (_, i) => orNull(values[first + i]!));
}

/** Metres along the pass at each record; a record without a position stands where the one before it stood. */
function distancesM(placed: PlacedLog, { first, records }: Pass): number[] {
  let distance = 0;
  let last = -1;
  return Array.from({ length: records }, (_, i) => {
    const record = first + i;
    if (Number.isNaN(placed.originEastM[record]!)) return distance;
    if (last >= 0) {
      const eastM = placed.originEastM[record]! - placed.originEastM[last]!;
      distance += Math.hypot(eastM, placed.originNorthM[record]! - placed.originNorthM[last]!);
    }
    last = record;
    return distance;
  });
}

/** Where the implement's centre line meets the line of rows; a record without a position takes the one before. */
function positions(placed: PlacedLog, { first, records }: Pass): [number, number][] {
  let last: [number, number] = [placed.plane.longitude, placed.plane.latitude];
  return Array.from({ length: records }, (_, i) => {
    const [east, north] = [placed.originEastM[first + i]!, placed.originNorthM[first + i]!];
    if (Number.isFinite(east)) last = placed.plane.toDegrees(east, north);
    return last;
  });
}

/** All readings of a pass in one channel, with where and how the implement stood at each record. */
export async function readPass(container: Container, scope: Scope, input: PassInput): Promise<PackablePassReadings> {
  const { placed, pass, channel } = await findPass(container, scope, input);
  const { geometry, log } = placed;
  const started = log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
  return {
    channel: channel.id,
    unit: channel.unit,
    rows: channel.rows,
    records: pass.records,
    timesS: part(log.timeMs, pass).map((time) => (time === null ? null : (time - started) / 1000)),
    distancesM: distancesM(placed, pass),
    positions: positions(placed, pass),
    ...(input.values === "packed" ? packValues(channel, pass) : { values: listValues(channel, pass) }),
    pass: pass.pass,
    firstRecord: pass.first,
    headingsDeg: part(placed.headingDeg, pass),
    speedsMps: part(placed.speedMps, pass),
    flags: Array.from(placed.flags.subarray(pass.first, pass.first + pass.records)),
    rowOffsetsM: [...geometry.offsetM],
    rowForwardM: [...geometry.forwardM],
    rowWidthsM: [...geometry.widthM],
  };
}

function listValues({ values, rows }: ResolvedChannel, { first, records }: Pass): (number | null)[][] {
  return Array.from({ length: rows }, (_, row) =>
    Array.from({ length: records }, (_, i) => orNull(values[(first + i) * rows + row]!)),
  );
}

/** The readings of a pass as bytes of their own. */
function copyRun({ values, rows }: ResolvedChannel, { first, records }: Pass): Uint8Array<ArrayBuffer> {
  return new Uint8Array(Float32Array.from(values.subarray(first * rows, (first + records) * rows)).buffer);
}

function packValues(channel: ResolvedChannel, pass: Pass): { values: []; packedValues: string } {
  return { values: [], packedValues: Buffer.from(copyRun(channel, pass).buffer).toString("base64") };
}

/** The same readings packed: little-endian Float32, record by record, row 1 first; NaN where nothing was logged. */
export async function readPassPacked(
  container: Container,
  scope: Scope,
  input: PassInput,
): Promise<{ bytes: Uint8Array<ArrayBuffer>; records: number; rows: number; unit: string }> {
  const { pass, channel } = await findPass(container, scope, input);
  return { bytes: copyRun(channel, pass), records: pass.records, rows: channel.rows, unit: channel.unit };
}
