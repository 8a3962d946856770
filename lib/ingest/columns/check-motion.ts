import { medianOf, sampledNumbers, type SampleSource } from "@/lib/ingest/columns/sampled-readings";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import { parseIsoTime } from "@/lib/ingest/records/parse-time";
import { unitFactor } from "@/lib/units/convert-unit";
import type { UnitId } from "@/lib/units/unit-table";

const SPEED_UNITS = ["m/s", "km/h", "mph"] as const satisfies readonly UnitId[];
const TIME_UNITS_S: Partial<Record<UnitId, number>> = { s: 1, ms: 0.001, "unix-s": 1, "unix-ms": 0.001, "gps-s": 1 };
const METRES_A_DEGREE = 111_320;
const FEWEST = 20;
/** Logged speeds are rounded and filtered; the nearest two units differ by 60 %. */
const SAME_WITHIN = 0.15;
const SLOWEST_MPS = 0.3;
const LONGEST_STEP_S = 10;

/** The unit of a speed by the ground covered between records: proposed where nothing names one, doubted where one is named. */
export function checkMotion(
  proposals: readonly (ColumnProposal | null)[],
  source: SampleSource,
  notes: NoteBook,
): void {
  const field = proposals.findIndex((proposal) => proposal?.channel === "speed");
  const proposal = proposals[field];
  const drivenMps = proposal ? drivenSpeeds(proposals, source) : null;
  if (!proposal || !drivenMps) return;
  const logged = sampledNumbers(field, proposal.missing ?? [], source);
  const ratios = [...drivenMps].flatMap((driven, i) => {
    const value = logged[i] ?? NaN;
    return driven > SLOWEST_MPS && value > 0 ? [driven / value] : [];
  });
  if (ratios.length < FEWEST) return;
  const ratio = medianOf(ratios);
  const fitting = SPEED_UNITS.find((unit) => Math.abs(ratio / unitFactor(unit) - 1) <= SAME_WITHIN);
  if (proposal.unit === null && fitting !== undefined) {
    proposal.unit = fitting;
    proposal.confidence = 0.75;
    proposal.reason += `, but the distance between positions fits ${fitting}`;
    return;
  }
  if (proposal.unit === null || proposal.unit === fitting) return;
  notes.add("speed-disagrees", undefined, fitting === undefined ? "" : `They would fit if it were in ${fitting}.`);
  proposal.confidence = Math.min(proposal.confidence, 0.5);
  proposal.reason += "; it does not agree with the distance between positions";
}

/** Speed of each sampled record from the one before, m/s; null without positions in degrees and a time in numbers or ISO texts. */
function drivenSpeeds(proposals: readonly (ColumnProposal | null)[], source: SampleSource): Float64Array | null {
  const timeS = sampledTimes(proposals, source);
  const place = (channel: string) => {
    const field = proposals.findIndex((proposal) => proposal?.channel === channel && proposal.format === undefined);
    return field < 0 ? null : sampledNumbers(field, proposals[field]?.missing ?? [], source);
  };
  const [longitude, latitude] = [place("longitude"), place("latitude")];
  if (!timeS || !longitude || !latitude) return null;
  const acrossM = METRES_A_DEGREE * Math.cos((medianOf(latitude) * Math.PI) / 180);
  return Float64Array.from(timeS, (time, i) => {
    const stepS = time - (timeS[i - 1] ?? NaN);
    if (!(stepS > 0 && stepS <= LONGEST_STEP_S)) return NaN;
    const eastM = ((longitude[i] ?? NaN) - (longitude[i - 1] ?? NaN)) * acrossM;
    const northM = ((latitude[i] ?? NaN) - (latitude[i - 1] ?? NaN)) * METRES_A_DEGREE;
    return Math.hypot(eastM, northM) / stepS;
  });
}

function sampledTimes(proposals: readonly (ColumnProposal | null)[], source: SampleSource): Float64Array | null {
  const fields = proposals.flatMap((proposal, field) => (proposal?.channel === "time" ? [field] : []));
  const [field] = fields;
  const unit = field === undefined ? null : proposals[field]?.unit;
  if (field === undefined || fields.length > 1 || !unit) return null;
  if (unit === "iso8601") {
    return Float64Array.from(source.cells(field), (cell) => (parseIsoTime(cell)?.ms ?? NaN) / 1000);
  }
  const factor = TIME_UNITS_S[unit];
  return factor === undefined ? null : sampledNumbers(field, [], source).map((value) => value * factor);
}
