import { areClassEdges } from "@/lib/legend/class-edges";
import { isChannelId } from "@/lib/logs/channel";
import { isCompareMode, type Comparison } from "@/lib/map-state/comparison";
import type { FieldBookState, MapView, Stretch } from "@/lib/map-state/field-book-store";
import { isGroundLayer } from "@/lib/map-state/ground-layers";

/** The part of the state that an address carries, so that a link shows the same thing. */
export type AddressState = Pick<
  FieldBookState,
  "channel" | "pass" | "row" | "stretch" | "view" | "cleaned" | "ground" | "comparison" | "timeS"
> & {
  log: string | null;
  /** The person's own class edges of the channel, SI; null for the channel's default. */
  edges: number[] | null;
};

function readPositiveInteger(text: string | null): number | null {
  return text !== null && /^[1-9]\d{0,8}$/.test(text) ? Number(text) : null;
}

/** Reads `longitude,latitude,zoom`. */
function readView(text: string | null): MapView | null {
  const numbers = (text ?? "").split(",").map(Number);
  const [longitude, latitude, zoom] = numbers;
  if (numbers.length !== 3 || longitude === undefined || latitude === undefined || zoom === undefined) return null;
  if (!(Math.abs(longitude) <= 180 && Math.abs(latitude) <= 85.06 && zoom >= 0 && zoom <= 24)) return null;
  return { longitude, latitude, zoom };
}

/** More classes than this no legend has room for. */
const MOST_EDGES = 24;

/** Reads rising numbers apart by commas. */
function readEdges(text: string | null): number[] | null {
  const parts = (text ?? "").split(",");
  const edges = parts.map((part) => (part.trim() === "" ? NaN : Number(part)));
  return edges.length <= MOST_EDGES && areClassEdges(edges) ? edges : null;
}

/** A number written plainly, within limits; null otherwise. Neither "" nor "1e3" nor " 5" is one. */
function readNumber(text: string | null | undefined, most: number): number | null {
  if (typeof text !== "string" || !/^\d{1,9}(\.\d{1,6})?$/.test(text)) return null;
  const number = Number(text);
  return number <= most ? number : null;
}

/** Longer passes are not driven. */
const LONGEST_PASS_M = 1_000_000;
/** Three years of seconds. */
const LONGEST_LOG_S = 100_000_000;

/** Reads `from,to`, metres along the pass that the address names. */
function readStretch(text: string | null, pass: number | null): Stretch | null {
  const parts = (text ?? "").split(",");
  const [fromM, toM] = parts.map((part) => readNumber(part, LONGEST_PASS_M));
  if (parts.length !== 2 || pass === null || fromM == null || toM == null || !(fromM < toM)) return null;
  return { pass, fromM, toM };
}

/** Reads `compare` (how), `with` (channel) and `withLog`. */
function readComparison(search: URLSearchParams): Comparison | null {
  const mode = search.get("compare");
  const channel = search.get("with");
  const logId = search.get("withLog");
  if (!isCompareMode(mode) || channel === null || !isChannelId(channel)) return null;
  return { mode, channel, logId: logId !== null && /^[\w-]{1,64}$/.test(logId) ? logId : null };
}

/** Reads what `writeAddress` writes; whatever does not make sense is left out. */
export function readAddress(search: URLSearchParams): Partial<AddressState> {
  const channel = search.get("channel");
  const pass = readPositiveInteger(search.get("pass"));
  const state: Partial<AddressState> = {
    log: search.get("log"),
    pass,
    row: readPositiveInteger(search.get("row")),
    view: readView(search.get("view")),
    edges: readEdges(search.get("edges")),
    cleaned: search.get("cleaned") !== "0",
    ground: (search.get("ground") ?? "").split(",").filter(isGroundLayer),
    stretch: readStretch(search.get("brush"), pass),
    comparison: readComparison(search),
    timeS: readNumber(search.get("time"), LONGEST_LOG_S),
  };
  if (channel !== null && isChannelId(channel)) state.channel = channel;
  return state;
}

/** Writes the same, leaving out what is not set. */
export function writeAddress(state: AddressState): URLSearchParams {
  const search = new URLSearchParams();
  if (state.log) search.set("log", state.log);
  search.set("channel", state.channel);
  if (state.pass !== null) search.set("pass", String(state.pass));
  if (state.row !== null) search.set("row", String(state.row));
  if (state.view) {
    const { longitude, latitude, zoom } = state.view;
    search.set("view", `${longitude.toFixed(6)},${latitude.toFixed(6)},${zoom.toFixed(2)}`);
  }
  if (state.edges) search.set("edges", state.edges.map((edge) => String(Number(edge.toPrecision(9)))).join(","));
  if (!state.cleaned) search.set("cleaned", "0");
  if (state.ground.length > 0) search.set("ground", state.ground.join(","));
  // A stretch is one of the pass unrolled.
  if (state.stretch && state.stretch.pass === state.pass)
    search.set("brush", `${roundTo(state.stretch.fromM, 2)},${roundTo(state.stretch.toM, 2)}`);
  if (state.comparison) {
    search.set("compare", state.comparison.mode);
    search.set("with", state.comparison.channel);
    if (state.comparison.logId !== null) search.set("withLog", state.comparison.logId);
  }
  if (state.timeS !== null) search.set("time", roundTo(state.timeS, 1));
  return search;
}

function roundTo(value: number, decimals: number): string {
  return String(Number(value.toFixed(decimals)));
}
