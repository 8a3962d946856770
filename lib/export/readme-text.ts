import { CLEANING_CODES, ruleFacts } from "@/lib/cleaning/rule-catalogue";
import type { ExportAbout, ExportSource } from "@/lib/export/about";
import { sayContact } from "@/lib/ingest/columns/say-contact";

const WIDTH = 100;

/** The same for reading by eye: what the file is, where it came from, its columns and how it was made. */
export function readmeText(
  about: ExportAbout,
  { names, metadataName }: { names: "long" | "short"; metadataName: string },
): string {
  const { log, source, machine } = about;
  const sections = [
    `${oneLine(about.title)}\n\nMade by Coulterbook on ${about.madeAt}. ${metadataName} holds the same as JSON.`,
    section("Where it came from", [
      `Log ${log.id}, version ${log.version}, ${log.kind}, ${log.startedAt ?? "start unknown"} to ${log.endedAt ?? "end unknown"}.`,
      ...sourceLines(source),
      machine
        ? `Machine: ${oneLine(machine.name)}, ${machine.rowCount} rows ${machine.rowSpacingM} m apart.`
        : "Machine: nobody said which; the rows are spread evenly by a guess.",
    ]),
    section(
      "Columns",
      about.columns.map(({ name, shortName, unit, meaning }) => {
        const label = names === "short" ? `${shortName} (${name})` : name;
        return `${label}${unit ? ` [${unit}]` : ""}: ${oneLine(meaning)}`;
      }),
    ),
    section(
      "Flags",
      Object.entries(about.flags).map(([code, words]) => `${code}: ${words}`),
    ),
    section("Method", [about.coordinates, ...about.method, ...choiceLines(about)]),
    section("Adjustments", adjustmentLines(about)),
    section(
      "Notes on the original",
      about.notes.map((note) => `${oneLine(note.message)} (${note.count})`),
    ),
    section("Meaning given to the original's columns", recipeLines(about)),
  ];
  return sections.filter((text) => text !== "").join("\n\n") + "\n";
}

/** One file, or every file of a set with a hash of its own. */
function sourceLines({ fileName, bytes, sha256, files }: ExportSource): string[] {
  if (files.length < 2) return [`Original file: ${oneLine(fileName)}, ${bytes} bytes.`, `SHA-256 ${sha256}`];
  return [
    `Original files: ${files.length}, ${bytes} bytes together, in the order they were sent.`,
    ...files.flatMap((file, index) => {
      const records = file.records === null ? "" : `, ${file.records} records`;
      return [`File ${index + 1}: ${oneLine(file.name)}, ${file.bytes} bytes${records}.`, `SHA-256 ${file.sha256}`];
    }),
    `SHA-256 of the set (over the sorted hashes of its files, one a line): ${sha256}`,
  ];
}

function recipeLines({ recipe }: ExportAbout): string[] {
  if (!recipe) return [];
  const { name, version, timeZone, crs, contact } = recipe;
  const lines = recipe.columns.map(
    (column) =>
      `${oneLine(column.name)}: ${column.channel}${column.row === undefined ? "" : `, row ${column.row}`}, ${column.unit}`,
  );
  if (name !== null) lines.unshift(`Recipe “${oneLine(name)}”${version === null ? "" : `, version ${version}`}.`);
  if (timeZone) lines.push(`Local times are those of ${oneLine(timeZone)}.`);
  if (crs) lines.push(`Easting and northing are in ${oneLine(crs)}.`);
  if (contact) lines.push(`Ground contact is ${oneLine(sayContact(contact))}.`);
  return lines;
}

/** Delays and the rules that are on, with their numbers. */
function adjustmentLines({ adjustments }: ExportAbout): string[] {
  if (!adjustments) return [];
  const { revision, delaysS, cleaning } = adjustments;
  const delays = Object.entries(delaysS).map(([id, delay]) => `Delay of ${oneLine(id)}: ${shortNumber(delay)} s.`);
  const rules = CLEANING_CODES.filter((code) => cleaning[code].on).map((code) => {
    const numbers = Object.entries(cleaning[code]).filter(([name]) => name !== "on");
    const said = numbers.map(([name, value]) => `${name} ${shortNumber(value)}`).join(", ");
    const { label, words, fixed } = ruleFacts(code);
    if (fixed !== null) {
      return `${code}: ${label}. Always on: keeps records that ${words} out of every pass (pass = 0). Their readings count in no statistic.`;
    }
    return `${code}${said ? ` (${said})` : ""}: ${label}. Leaves out readings that ${words}.`;
  });
  return [`Revision ${revision}.`, ...delays, ...rules];
}

/** What a person typed in another unit has a tail of digits in SI: six that count are said. */
function shortNumber(value: unknown): string {
  return typeof value === "number" ? String(Number(value.toPrecision(6))) : String(value);
}

function choiceLines({ choice }: ExportAbout): string[] {
  return choice ? [`Chosen: ${JSON.stringify(choice)}.`] : [];
}

function section(title: string, lines: readonly string[]): string {
  if (lines.length === 0) return "";
  return `${title}\n${"-".repeat(title.length)}\n${lines.map(foldLine).join("\n")}`;
}

/** Names from outside must not make lines of their own. */
function oneLine(text: string): string {
  return text.replaceAll(/\s+/g, " ");
}

function foldLine(line: string): string {
  const folded: string[] = [""];
  for (const word of line.split(" ")) {
    const last = folded.length - 1;
    const indent = folded.length > 1 ? 2 : 0;
    if (folded[last] === "") folded[last] = word;
    else if (indent + folded[last]!.length + 1 + word.length <= WIDTH) folded[last] += ` ${word}`;
    else folded.push(word);
  }
  return folded.map((text, index) => (index === 0 ? text : `  ${text}`)).join("\n");
}
