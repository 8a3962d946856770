import { LOOK_BELOW } from "@/components/columns/column-choice";
import type { ColumnGroup } from "@/components/columns/group-columns";
import { PLACING_CHANNELS } from "@/lib/logs/channel";

export interface ColumnSection {
  id: "asks" | "places" | "measures";
  title: string;
  groups: ColumnGroup[];
}

function sectionOf(group: ColumnGroup, isConfirmed: boolean): ColumnSection["id"] {
  const unsure = group.columns.some(
    ({ proposal }) => !proposal || proposal.unit === null || proposal.confidence < LOOK_BELOW,
  );
  if (unsure && !isConfirmed) return "asks";
  const channel = group.columns[0]?.proposal?.channel ?? "";
  return (PLACING_CHANNELS as readonly string[]).includes(channel) ? "places" : "measures";
}

/**
 * The groups under three headings, those that need a person first. Fixed by the proposals, so that nothing jumps away
 * while it is being decided. `isConfirmed`: a mapping is in force already.
 */
export function columnSections(groups: ColumnGroup[], isConfirmed: boolean): ColumnSection[] {
  const sections: ColumnSection[] = [
    { id: "asks", title: "These need you", groups: [] },
    { id: "places", title: "Where and when", groups: [] },
    { id: "measures", title: "What was measured", groups: [] },
  ];
  for (const group of groups) {
    const id = sectionOf(group, isConfirmed);
    sections.find((section) => section.id === id)?.groups.push(group);
  }
  return sections.filter((section) => section.groups.length > 0);
}
