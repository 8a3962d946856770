import type { ChoiceExtras } from "@/components/columns/check-choices";
import { readMissing, type Choices } from "@/components/columns/column-choice";
import type { ContactDefinition, LogMapping, LogShape, MappedColumn } from "@/lib/ingest/mapping";

function mappedColumns(choices: Choices): MappedColumn[] {
  return Object.entries(choices).flatMap(([name, choice]) => {
    if (choice.use !== "channel" || choice.channel === null || choice.unit === null) return [];
    const format = choice.format.trim();
    const missing = readMissing(choice.missing) ?? [];
    return [
      {
        name,
        channel: choice.channel,
        unit: choice.unit,
        ...(choice.row === null ? {} : { row: choice.row }),
        ...(format === "" ? {} : { format }),
        ...(missing.length === 0 ? {} : { missing }),
      },
    ];
  });
}

/** The mapping to send: columns left out are simply not named. */
export function buildMapping(
  choices: Choices,
  shape: LogShape,
  extras: ChoiceExtras & {
    save: string;
    layer?: string | null;
    contact?: ContactDefinition | null;
    rowsFromRight?: boolean;
  },
): LogMapping {
  const [crs, timeZone, save] = [extras.crs.trim(), extras.timeZone.trim(), extras.save.trim()];
  const columns = mappedColumns(choices);
  const hasContact = columns.some(({ channel }) => channel === "contact");
  return {
    columns,
    shape,
    ...(crs ? { crs } : {}),
    ...(timeZone ? { timeZone } : {}),
    ...(extras.layer ? { layer: extras.layer } : {}),
    ...(extras.contact && hasContact ? { contact: extras.contact } : {}),
    ...(extras.rowsFromRight && shape !== "single" ? { rowsFromRight: true } : {}),
    ...(save ? { save } : {}),
  };
}
