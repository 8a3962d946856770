import type { Operation } from "@/lib/openapi/operation";
import { CompareQuery, ComparisonBody } from "@/lib/schemas/comparison";

/** Two logs held against each other: before and after a change of set-up. */
export const comparisonOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/compare",
    tag: "Readings",
    permission: "logs.read",
    summary: "A channel in two logs: all rows together, row by row, and how its values are spread",
    description:
      "The log of the address is the one before, `with` the one after, from the same field or another. Headland passes are left out. Intervals are 95 %, from 1999 draws of whole passes; passes whose neighbours are alike are drawn in runs, and without eight such runs in either log there is no interval and `reasons` says so. `beyondInterval` of a row holds for all rows together. No row is named where a log was driven one way only, or along its field's harvest passes.",
    query: CompareQuery,
    replies: [
      { status: 200, description: "Differences are the log after less the log before", schema: ComparisonBody },
    ],
    errors: ["conflict"],
  },
];
