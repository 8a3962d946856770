import { readMissing, type Choices, type ColumnChoice } from "@/components/columns/column-choice";
import { channelWords, isRowable } from "@/lib/ingest/channel-quantities";
import { ContactDefinition, type LogShape } from "@/lib/ingest/mapping";

export interface ChoiceCheck {
  /** Columns nobody has decided or looked at yet. */
  waiting: string[];
  /** Questions they make: columns shown as one card are one. */
  questions: number;
  /** What is wrong with a column, by its name. */
  problems: Record<string, string>;
  /** What is wrong with the whole. */
  general: string[];
  needsCrs: boolean;
  needsTimeZone: boolean;
  /** Some column is ground contact: how it is defined must be asked, since files do not say. */
  asksContact: boolean;
  /** Readings row by row: from which side they are counted can be said. */
  asksRowOrder: boolean;
}

export interface ChoiceExtras {
  /** Names of the columns of each card; a card each where left out. */
  cards?: readonly (readonly string[])[];
  /** Columns whose times name no offset from UTC. */
  zoneless?: readonly string[];
  contact?: ContactDefinition | null;
  crs: string;
  timeZone: string;
}

function isRowReading({ use, channel }: ColumnChoice): boolean {
  return use === "channel" && channel !== null && isRowable(channel);
}

function readsAs(choices: Choices, channel: string): boolean {
  return Object.values(choices).some((choice) => choice.use === "channel" && choice.channel === channel);
}

function problemOf(choice: ColumnChoice, shape: LogShape): string | null {
  if (choice.use !== "channel" || choice.channel === null) return null;
  if (choice.unit === null) return "Choose the unit.";
  if (choice.unit === "local" && choice.format.trim() === "")
    return "Write how the time is written, such as dd/MM/yyyy HH:mm:ss.";
  if (choice.unit === "bu/ac" && !(Number.parseFloat(choice.format) > 0))
    return "Write what a bushel weighs, such as 56 lb.";
  if (readMissing(choice.missing) === null) return "Write what counts as missing as numbers, such as -999, 65535.";
  if (choice.row !== null && !isRowable(choice.channel)) return `The ${channelWords(choice.channel)} has no rows.`;
  return choice.row !== null && shape !== "wide"
    ? "Only a file with one column a row has row numbers here: change the layout of the file, or leave the row empty."
    : null;
}

/** Two columns may not both be the same thing of the same row. */
function findDoubles(choices: Choices): Record<string, string> {
  const seen = new Map<string, string>();
  const rowed = new Set(Object.values(choices).flatMap(({ row, channel }) => (row === null ? [] : [channel])));
  const problems: Record<string, string> = {};
  for (const [name, choice] of Object.entries(choices)) {
    if (choice.use !== "channel" || choice.channel === null) continue;
    // A local date and a local time are read together, and so are a GPS week and its seconds.
    if (choice.channel === "time" && (choice.unit === "local" || choice.unit === "gps-week")) continue;
    if (choice.row === null && rowed.has(choice.channel)) {
      problems[name] = `Other columns of the ${channelWords(choice.channel)} have a row. Give this one a row too.`;
    }
    const key = `${choice.channel}|${choice.row ?? ""}`;
    const other = seen.get(key);
    const what = `the ${channelWords(choice.channel)}${choice.row === null ? "" : ` of row ${choice.row}`}`;
    if (other !== undefined) problems[name] = `Column ${other} is ${what} already. Change one of them.`;
    else seen.set(key, name);
  }
  return problems;
}

function findGeneral(choices: Choices, shape: LogShape, extras: ChoiceExtras): string[] {
  const general: string[] = [];
  const degrees = readsAs(choices, "longitude") && readsAs(choices, "latitude");
  const metres = readsAs(choices, "easting") && readsAs(choices, "northing");
  if (!degrees && !metres) {
    general.push("No columns say where the machine was. Choose longitude and latitude, or easting and northing.");
  }
  if (metres && !degrees && extras.crs.trim() === "") {
    general.push("Easting and northing need their coordinate system, such as EPSG:32614.");
  }
  if (shape === "long" && !readsAs(choices, "row")) {
    general.push("This file has one line a row: say which column is the row number.");
  }
  return general;
}

/** Cards with a column that waits, and columns on no card. */
function countQuestions(waiting: readonly string[], cards: readonly (readonly string[])[]): number {
  const cardOf = new Map(cards.flatMap((names, card) => names.map((name) => [name, card] as const)));
  return new Set(waiting.map((name) => cardOf.get(name) ?? name)).size;
}

/** Everything between the choices and a mapping that can be read. */
export function checkChoices(choices: Choices, shape: LogShape, extras: ChoiceExtras): ChoiceCheck {
  const entries = Object.entries(choices);
  const problems = findDoubles(choices);
  for (const [name, choice] of entries) {
    const problem = choice.seen ? problemOf(choice, shape) : null;
    if (problem) problems[name] = problem;
  }
  const times = entries.filter(([, choice]) => choice.use === "channel" && choice.channel === "time");
  const isLocal = times.some(([, choice]) => choice.unit === "local");
  const needsTimeZone =
    isLocal || times.some(([name, choice]) => choice.unit === "iso8601" && extras.zoneless?.includes(name));
  const general = findGeneral(choices, shape, extras);
  if (isLocal && extras.timeZone.trim() === "")
    general.push("Local times need their time zone, such as America/Chicago.");
  const asksContact = readsAs(choices, "contact");
  if (asksContact && extras.contact && !ContactDefinition.safeParse(extras.contact).success) {
    general.push("Ground contact: write the load and the time as numbers, or leave them empty.");
  }
  const waiting = entries.filter(([, choice]) => !choice.seen || choice.use === "undecided").map(([name]) => name);
  return {
    waiting,
    questions: countQuestions(waiting, extras.cards ?? []),
    problems,
    general,
    needsCrs: readsAs(choices, "easting") || readsAs(choices, "northing"),
    needsTimeZone,
    asksContact,
    asksRowOrder: shape !== "single" && entries.some(([, choice]) => isRowReading(choice)),
  };
}
