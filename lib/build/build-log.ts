import type { MultiPolygon, Polygon } from "geojson";
import { describePasses } from "@/lib/build/describe-passes";
import { placeAntenna, type AntennaPositions } from "@/lib/build/log-plane";
import { measureMotion, type Motion } from "@/lib/build/log-motion";
import { flagNotes, flagRecords, STANDING_STILL_MPS, workingRecords } from "@/lib/cleaning/flag-records";
import { FLAGS } from "@/lib/cleaning/flags";
import { markImpossibleSteps } from "@/lib/cleaning/position-steps";
import { boundaryInPlane } from "@/lib/geo/boundary-in-plane";
import type { LogNote, MachineLog } from "@/lib/logs/machine-log";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";
import { labelHeadlands } from "@/lib/passes/label-headlands";
import { segmentPasses, type PassRange } from "@/lib/passes/segment-passes";
import { fail, succeed, type Result } from "@/lib/result";
import { guessRowGeometry } from "@/lib/rows/guess-row-geometry";
import { placeRows, type RowLine } from "@/lib/rows/place-rows";
import { implementWidthM, machineRowGeometry } from "@/lib/rows/row-geometry";

export interface BuildOptions {
  boundary?: Polygon | MultiPolygon | null;
  /** Working width of the named machine where that is no seeder. */
  workingWidthM?: number | null;
  /** Called with 0..1 as the work goes on. */
  onProgress?: (share: number) => void;
}

export interface BuildError {
  code: "rows-differ" | "no-positions";
  message: string;
}

export interface BuiltLog {
  placed: PlacedLog;
  notes: LogNote[];
}

/** Passes shorter than this, in metres or in records, are flagged; they still count. */
const SHORT_PASS = { lengthM: 10, records: 10 };

/**
 * Puts a log on the ground: a plane about it, heading and speed, flags, passes and the place of the rows. Nothing is
 * deleted; what could not be used is flagged and told in the notes.
 */
export function buildLog(
  log: MachineLog,
  machine: Seeder | null,
  options: BuildOptions = {},
): Result<BuiltLog, BuildError> {
  const problem = checkRows(log, machine);
  if (problem) return fail(problem);
  const antenna = placeAntenna(log);
  if (!antenna) return fail({ code: "no-positions", message: noPositions(log) });
  options.onProgress?.(0.3);

  const ground = trackOnGround(log, antenna, machine);
  options.onProgress?.(0.6);
  const { works, line, turning, ranges } = ground;
  const along = { eastM: line.originEastM, northM: line.originNorthM };
  const passes = describePasses({ ranges, works, timeMs: log.timeMs, headingDeg: line.headingDeg, ...along });
  const guessed = machine ? null : guessRowGeometry({ log, passes, ...along, workingWidthM: options.workingWidthM });
  const geometry = guessed?.geometry ?? machineRowGeometry(machine as Seeder);
  const boundaryRings = options.boundary ? boundaryInPlane(options.boundary, antenna.plane) : null;
  labelHeadlands({ passes, ...along, implementWidthM: implementWidthM(geometry), boundaryRings });
  addFlags(ground.flags, { turning, line, passes });
  options.onProgress?.(0.9);
  const placed: PlacedLog = {
    log,
    machine,
    geometry,
    plane: antenna.plane,
    originEastM: line.originEastM,
    originNorthM: line.originNorthM,
    headingDeg: line.headingDeg,
    speedMps: implementSpeed(ground.motion, line, log),
    flags: ground.flags,
    passOf: passNumbers(works, passes),
    passes,
  };
  const notes = [
    ...passNotes(log, passes),
    ...ground.motion.notes,
    ...machineNotes(machine, guessed?.note),
    ...flagNotes(log, ground.flags),
  ];
  options.onProgress?.(1);
  return succeed({ placed, notes });
}

interface GroundTrack {
  motion: Motion;
  flags: Uint32Array;
  line: RowLine;
  /** 1 where a record works and stands somewhere. */
  works: Uint8Array;
  ranges: PassRange[];
  turning: Uint8Array;
}

/** Everything that needs no row: jumps taken out, motion, flags, the line of rows, and where passes begin and end. */
function trackOnGround(log: MachineLog, antenna: AntennaPositions, machine: Seeder | null): GroundTrack {
  const jumps = markImpossibleSteps({ ...antenna, timeMs: log.timeMs, speedMps: log.speedMps });
  jumps.forEach((jump, i) => {
    if (jump === 1) antenna.eastM[i] = antenna.northM[i] = NaN;
  });
  const working = workingRecords(log);
  const motion = measureMotion(log, antenna, working);
  const flags = flagRecords(log, motion.speedMps, working).map((bits, i) =>
    jumps[i] === 1 ? bits | FLAGS["impossible-step"] : bits,
  );
  motion.backwards.forEach((back, i) => {
    if (back === 1 && !(motion.speedMps[i]! < STANDING_STILL_MPS)) flags[i]! |= FLAGS.reversing;
  });
  const line = placeRows({ ...antenna, ...motion }, machine);
  const works = working.map((value, i) => (value === 1 && Number.isFinite(line.originEastM[i]!) ? 1 : 0));
  const { headingDeg } = motion;
  const { timeMs, speedMps, loggedPass } = log;
  const cut = segmentPasses({ ...antenna, headingDeg, timeMs, speedMps, works, loggedPass });
  return { motion, flags, line, works, ...cut };
}

function checkRows(log: MachineLog, machine: Seeder | null): BuildError | null {
  if (!machine || !log.channels.some((channel) => channel.perRow) || log.rows === machine.rowCount) return null;
  const message =
    `The log has ${log.rows} rows and the machine "${machine.name}" has ${machine.rowCount}. ` +
    "Choose the machine that made the log, or correct its number of rows.";
  return { code: "rows-differ", message };
}

function noPositions(log: MachineLog): string {
  return `None of the ${log.records} records has a usable position (missing, out of range, or 0, 0), so no row can be put on the ground.`;
}

function machineNotes(machine: Seeder | null, guess: LogNote | undefined): LogNote[] {
  if (guess) return [guess];
  if (machine?.hitch !== "trailed" || machine.antennaToHitchM !== undefined) return [];
  const message =
    "The distance from antenna to hitch pin is not given; it is taken from the other two distances of the machine.";
  return [{ code: "hitch-distance-assumed", message, count: 1 }];
}

/** More single-record passes than this share are no way to drive: times, positions or pass numbers must be wrong. */
const MANY_LONE_RECORDS = 0.2;

function passNotes(log: MachineLog, passes: Pass[]): LogNote[] {
  const lone = passes.filter((pass) => pass.records === 1);
  if (lone.length <= MANY_LONE_RECORDS * passes.length) return [];
  const message =
    `${lone.length} of ${passes.length} passes are a single record, so the log fell to pieces and its distances and shares ` +
    "are not to be trusted. Check its times, positions and pass numbers.";
  const firstLine = log.sourceLine[lone[0]!.first];
  return [{ code: "passes-of-one-record", message, count: lone.length, firstLine }];
}

function addFlags(flags: Uint32Array, from: { turning: Uint8Array; line: RowLine; passes: Pass[] }): void {
  for (let i = 0; i < flags.length; i++) {
    if (from.turning[i] === 1) flags[i]! |= FLAGS.turning;
    if (from.line.unsettled?.[i] === 1) flags[i]! |= FLAGS["hitch-unsettled"];
    if (from.line.jackKnifed?.[i] === 1) flags[i]! |= FLAGS["jack-knife"];
  }
  for (const pass of from.passes) {
    if (pass.lengthM >= SHORT_PASS.lengthM && pass.records >= SHORT_PASS.records) continue;
    for (let i = pass.first; i < pass.first + pass.records; i++) flags[i]! |= FLAGS["short-pass"];
  }
}

function passNumbers(works: Uint8Array, passes: Pass[]): Int32Array {
  const passOf = new Int32Array(works.length);
  for (const pass of passes) {
    for (let i = pass.first; i < pass.first + pass.records; i++) if (works[i] === 1) passOf[i] = pass.pass;
  }
  return passOf;
}

/** Speed of the line of rows: the machine's on a rigid hitch; from its own track where it trails. */
function implementSpeed(motion: Motion, line: RowLine, log: MachineLog): Float32Array {
  if (!line.unsettled) return motion.speedMps;
  const own = measureMotion(
    { ...log, speedMps: null, headingDeg: null },
    { eastM: line.originEastM, northM: line.originNorthM },
  );
  return own.speedMps.map((speed, i) => (Number.isFinite(speed) ? speed : motion.speedMps[i]!));
}
