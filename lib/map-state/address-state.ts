import { areClassEdges } from "@/lib/legend/class-edges";
import { isChannelId } from "@/lib/logs/channel";
import type { FieldBookState, MapView } from "@/lib/map-state/field-book-store";
import { isGroundLayer } from "@/lib/map-state/ground-layers";

/** The part of the state that an address carries, so that a link shows the same thing. */
export type AddressState = Pick<FieldBookState, "channel" | "pass" | "row" | "view" | "cleaned" | "ground"> & {
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

/** Reads `log, channel, pass, row, view, edges, cleaned, ground`; whatever does not make sense is left out. */
export function readAddress(search: URLSearchParams): Partial<AddressState> {
  const channel = search.get("channel");
  const state: Partial<AddressState> = {
    log: search.get("log"),
    pass: readPositiveInteger(search.get("pass")),
    row: readPositiveInteger(search.get("row")),
    view: readView(search.get("view")),
    edges: readEdges(search.get("edges")),
    cleaned: search.get("cleaned") !== "0",
    ground: (search.get("ground") ?? "").split(",").filter(isGroundLayer),
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
  return search;
}
