import { COMPARISON_WORDS, groupWords } from "@/components/field-book/passes/group-words";
import { quantityColumn, type QuantityColumn } from "@/components/field-book/quantity-column";
import type { DataColumn } from "@/components/ui/data-table";
import type { PassComparison, PassGroup, PassStatisticsItem, RampMetre } from "@/lib/schemas/pass-figures";
import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

interface TableUnits {
  unit: string;
  channel: string;
  system: UnitSystem;
}

const SHARES = [
  ["shareUnderTarget", "Under target, of distance"],
  ["shareAtLimit", "At the limit, of distance"],
  ["shareContactLost", "Contact lost, of distance"],
] as const;

const VALUES = [
  ["mean", "Mean"],
  ["sd", "Standard deviation"],
  ["p05", "5th percentile"],
  ["p25", "25th percentile"],
  ["p50", "Median"],
  ["p75", "75th percentile"],
  ["p95", "95th percentile"],
] as const;
const VALUES_ON_PHONE = ["mean", "p50"];

/** Columns of single passes; shares only where a pass has one. */
export function passColumns(items: readonly PassStatisticsItem[], of: TableUnits): DataColumn<PassStatisticsItem>[] {
  const { system } = of;
  const shares = SHARES.filter(([field]) => items.some((item) => item[field] !== null));
  return [
    ...driveColumns(system),
    ...VALUES.map(([field, header]) =>
      quantityColumn<PassStatisticsItem>({
        ...of,
        id: field,
        header,
        value: (item) => item[field],
        onPhone: VALUES_ON_PHONE.includes(field),
      }),
    ),
    ...shares.map(([field, header]) =>
      quantityColumn<PassStatisticsItem>({
        id: field,
        header,
        value: (item) => item[field],
        unit: "fraction",
        channel: field,
        system,
        onPhone: true,
      }),
    ),
  ];
}

/** Which pass, where, how it was driven, and how much of it has readings. */
function driveColumns(system: UnitSystem): DataColumn<PassStatisticsItem>[] {
  const column = (given: Omit<QuantityColumn<PassStatisticsItem>, "system">) => quantityColumn({ ...given, system });
  const metres = { unit: "m", channel: "distance" };
  return [
    { id: "pass", header: "Pass", value: (item) => item.pass, numeric: true },
    { id: "place", header: "Place", value: (item) => (item.headland ? "headland" : "inside") },
    column({ id: "heading", header: "Heading", value: (item) => item.headingDeg, unit: "deg", channel: "heading" }),
    column({ ...metres, id: "length", header: "Length", value: (item) => item.lengthM, onPhone: true }),
    column({
      id: "speed",
      header: "Speed",
      value: (item) => item.speedMps,
      unit: "m/s",
      channel: "speed",
      onPhone: true,
    }),
    { id: "startedAt", header: "Started", value: (item) => item.startedAt ?? undefined, fileOnly: true },
    column({ id: "n", header: "Readings", value: (item) => item.n, unit: "1", channel: "n", decimals: 0 }),
    column({ ...metres, id: "distance", header: "Distance with readings", value: (item) => item.distanceM }),
  ];
}

/** A group with the comparison it stands in. */
export interface GroupLine {
  by: PassComparison["by"];
  group: PassGroup;
}

export function groupLineColumns(of: TableUnits): DataColumn<GroupLine>[] {
  const { system } = of;
  const speed = (mps: number) => formatQuantity(mps, "m/s", system).text;
  const own = (id: string, header: string, value: QuantityColumn<GroupLine>["value"], onPhone = false) =>
    quantityColumn({ ...of, id, header, value, onPhone });
  return [
    { id: "by", header: "By", value: ({ by }) => COMPARISON_WORDS[by] },
    { id: "group", header: "Group", value: ({ group }) => groupWords(group, speed) },
    { id: "passes", header: "Passes", value: ({ group }) => group.passes, numeric: true },
    quantityColumn({
      id: "distance",
      header: "Distance",
      value: ({ group }) => group.distanceM,
      unit: "m",
      channel: "distance",
      system,
    }),
    quantityColumn({
      id: "speed",
      header: "Speed",
      value: ({ group }) => group.speedMps,
      unit: "m/s",
      channel: "speed",
      system,
    }),
    own("mean", "Mean", ({ group }) => group.mean, true),
    own("from", "95 % interval from", ({ group }) => group.interval?.[0], true),
    own("to", "95 % interval to", ({ group }) => group.interval?.[1], true),
    own("straight", "Less the same rows going straight", ({ group }) => group.fromStraight),
    own("straight-from", "of that, from", ({ group }) => group.fromStraightInterval?.[0]),
    own("straight-to", "of that, to", ({ group }) => group.fromStraightInterval?.[1]),
  ];
}

/** A metre with the end of the pass it belongs to. */
export interface RampLine {
  end: "start" | "end";
  metre: RampMetre;
}

export function rampColumns(of: TableUnits): DataColumn<RampLine>[] {
  const { system } = of;
  const own = (id: string, header: string, value: QuantityColumn<RampLine>["value"], onPhone = false) =>
    quantityColumn({ ...of, id, header, value, onPhone });
  const { symbol } = displayUnit("m", system, "distance");
  return [
    { id: "end", header: "Part", value: ({ end }) => (end === "start" ? "from the start" : "before the end") },
    quantityColumn({
      id: "from",
      header: "Metre begins at",
      value: ({ metre }) => metre.fromM,
      unit: "m",
      channel: "distance",
      system,
      decimals: symbol === "m" ? 0 : 1,
      onPhone: true,
    }),
    { id: "passes", header: "Passes", value: ({ metre }) => metre.passes, numeric: true },
    own("mean", "Mean", ({ metre }) => metre.mean),
    own("difference", "Less the middle of the pass", ({ metre }) => metre.difference, true),
    own("low", "95 % interval from", ({ metre }) => metre.interval?.[0], true),
    own("high", "95 % interval to", ({ metre }) => metre.interval?.[1], true),
    quantityColumn({
      id: "speed",
      header: "Speed",
      value: ({ metre }) => metre.speedMps,
      unit: "m/s",
      channel: "speed",
      system,
    }),
  ];
}
