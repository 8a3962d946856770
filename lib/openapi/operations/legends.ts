import type { Operation } from "@/lib/openapi/operation";
import { LegendInput, LegendList } from "@/lib/schemas/legends";

const tag = "Legends";

/** Class edges that everyone of an organisation sees a channel in. */
export const legendOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/legends",
    tag,
    permission: "legends.read",
    summary: "Class edges of the organisation's own, by channel",
    replies: [{ status: 200, description: "One a channel at most, in SI units", schema: LegendList }],
  },
  {
    method: "PUT",
    path: "/api/v1/legends",
    tag,
    permission: "legends.write",
    summary: "Keep the class edges of a channel for everyone",
    description:
      "In place of those before; with `edges: null` the channel goes back to the edges proposed for each log.",
    body: LegendInput,
    replies: [{ status: 200, description: "All of them as they are now", schema: LegendList }],
  },
];
