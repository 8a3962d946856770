import type { Operation } from "@/lib/openapi/operation";
import { CleanedChannelQuery } from "@/lib/schemas/log-queries";
import { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";

const tag = "Readings";

/** A channel by passes. Every mean is weighted by distance; every interval takes passes as the units that repeat. */
export const passFigureOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/pass-statistics",
    tag,
    permission: "logs.read",
    summary: "A channel pass by pass, and by direction, headland, speed and side of a turn",
    description:
      "Speeds are thirds of the distance. A turn is where the outermost row runs at least 10 % of the machine's speed faster than the innermost. Intervals are 95 %, from 1999 draws of whole passes with replacement; without eight passes there is none, and `reason` says so.",
    query: CleanedChannelQuery,
    replies: [{ status: 200, description: "One item a pass, and four comparisons", schema: PassStatisticsBody }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/ramps",
    tag,
    permission: "logs.read",
    summary: "How a channel comes up after the start of passes and leaves before their end, metre by metre",
    description:
      "All passes are laid on each other at 0 m. `difference` is the mean over passes of the reading less the middle of the same pass, which lies further than `reachM` from both ends.",
    query: CleanedChannelQuery,
    replies: [{ status: 200, description: "Up to 30 metres at either end", schema: RampsBody }],
    errors: ["conflict"],
  },
];
