import { alignmentOperations } from "@/lib/openapi/operations/alignment";
import { cleaningOperations } from "@/lib/openapi/operations/cleaning";
import { comparisonOperations } from "@/lib/openapi/operations/comparison";
import { documentOperations } from "@/lib/openapi/operations/document";
import { fieldOperations } from "@/lib/openapi/operations/fields";
import { logOperations } from "@/lib/openapi/operations/logs";
import { machineOperations } from "@/lib/openapi/operations/machines";
import { noteOperations } from "@/lib/openapi/operations/notes";
import { passFigureOperations } from "@/lib/openapi/operations/pass-figures";
import { peopleOperations } from "@/lib/openapi/operations/people";
import { readingOperations } from "@/lib/openapi/operations/readings";
import { recipeOperations } from "@/lib/openapi/operations/recipes";
import { shareOperations } from "@/lib/openapi/operations/shares";
import type { Operation } from "@/lib/openapi/operation";

/** Every operation of the API, in the order of the reference page. Routes without an entry fail a test. */
export const OPERATIONS: readonly Operation[] = [
  ...fieldOperations,
  ...noteOperations,
  ...machineOperations,
  ...logOperations,
  ...recipeOperations,
  ...readingOperations,
  ...passFigureOperations,
  ...comparisonOperations,
  ...cleaningOperations,
  ...alignmentOperations,
  ...shareOperations,
  ...peopleOperations,
  ...documentOperations,
];
