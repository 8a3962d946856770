import type { Operation } from "@/lib/openapi/operation";
import { DelaysAsked, DelaysBody, DelaysChange } from "@/lib/schemas/alignment";

const tag = "Cleaning";
const path = "/api/v1/logs/{logId}/delays";

/** How late channels were logged, and taking that out without touching the log. */
export const alignmentOperations: Operation[] = [
  {
    method: "GET",
    path,
    tag,
    permission: "logs.read",
    summary: "How late each channel was logged",
    description:
      "Told from neighbouring passes driven in opposite directions, with 95 % intervals, or refused with a reason. Every " +
      "log is looked at for its main channels once it is ready. Estimates are of the log as it was read; `applied` is the " +
      "delay that its adjustments take out.",
    replies: [{ status: 200, description: "Delays by channel", schema: DelaysBody }],
    errors: ["conflict"],
  },
  {
    method: "POST",
    path,
    tag,
    permission: "logs.clean",
    summary: "Ask for the delay of a channel, or of the main ones",
    description: "What is known is not worked out again; GET tells how far it is.",
    body: DelaysAsked,
    replies: [{ status: 202, description: "What is known, work goes on", schema: DelaysBody }],
    errors: ["conflict"],
  },
  {
    method: "PUT",
    path,
    tag,
    permission: "logs.clean",
    summary: "Take delays out of channels",
    description:
      "Makes a new revision of the log's adjustments: a reading of a channel is then the one logged so many seconds later. " +
      "Channels left out keep their delay, 0 takes none out. `cleaning/undo` goes back.",
    body: DelaysChange,
    replies: [{ status: 200, description: "Delays by channel", schema: DelaysBody }],
    errors: ["conflict"],
  },
];
