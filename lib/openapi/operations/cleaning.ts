import type { Operation } from "@/lib/openapi/operation";
import { Cleaning, CleaningChange, CleaningPreview, CleaningPreviewBody, CleaningUndo } from "@/lib/schemas/cleaning";

const tag = "Cleaning";

/** Rules that leave readings out of what is worked out, without touching the log. */
export const cleaningOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/cleaning",
    tag,
    permission: "logs.read",
    summary: "Cleaning rules with what each takes out, or would",
    description:
      "In the order in which they take readings out. A rule judges the log as it was read, whatever the others take out. " +
      "Answers of the log (`rows`, `verdict`, `zones`, tiles, readings, `export`) are given with these rules and the " +
      "channels' delays; `cleaned=false` gives them as logged. The channel `flags` carries the number of the first rule that " +
      "takes out a reading of a row.",
    replies: [{ status: 200, description: "Rules, counts, effect and history", schema: Cleaning }],
    errors: ["conflict"],
  },
  {
    method: "POST",
    path: "/api/v1/logs/{logId}/cleaning",
    tag,
    permission: "logs.clean",
    summary: "Change cleaning rules",
    description:
      "Rules not named, and numbers not given, stay. A change makes a new revision; nothing of the log is deleted. Rules " +
      "that give readings their place (`fixed`) cannot be switched off.",
    body: CleaningChange,
    replies: [{ status: 200, description: "The rules in force now", schema: Cleaning }],
    errors: ["conflict"],
  },
  {
    method: "POST",
    path: "/api/v1/logs/{logId}/cleaning/preview",
    tag,
    permission: "logs.read",
    summary: "What changed rules would do, without keeping them",
    body: CleaningPreviewBody,
    replies: [{ status: 200, description: "Counts and effect", schema: CleaningPreview }],
    errors: ["conflict"],
  },
  {
    method: "POST",
    path: "/api/v1/logs/{logId}/cleaning/undo",
    tag,
    permission: "logs.clean",
    summary: "Go back to an earlier revision of rules and delays",
    description:
      "`revert` names it (0: as read); without, the one before the revision in force. Makes a new revision equal to it.",
    body: CleaningUndo,
    replies: [{ status: 200, description: "The rules in force now", schema: Cleaning }],
    errors: ["conflict"],
  },
];
