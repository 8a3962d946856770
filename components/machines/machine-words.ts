import { z } from "zod";

/**
 * What a person reads when a machine's number breaks a rule. Limits are kept in SI while people type in their own units,
 * so a limit is said in words and never as a number of the wrong unit.
 */
export function machineIssueWords(issue: {
  code?: string;
  message?: string;
  minimum?: unknown;
  inclusive?: boolean;
  input?: unknown;
}): string | undefined {
  switch (issue.code) {
    case "invalid_type":
      return issue.input === undefined ? "Needed." : "Enter a number, such as 7.5.";
    case "too_small":
      return issue.minimum === 1
        ? "At least 1."
        : issue.inclusive === false
          ? "Must be more than 0."
          : "Must not be less than 0.";
    case "too_big":
      return "Larger than any machine of this kind. Check the unit.";
    default:
      return undefined;
  }
}

/** Error words for the whole form; texts keep their own. */
export const machineParseOptions = {
  error: (issue: z.core.$ZodRawIssue): string | undefined => {
    if (issue.code === "too_small" && issue.origin === "string") return "Give the machine a name.";
    if (issue.code === "too_big" && issue.origin === "string") return "At most 120 characters.";
    return machineIssueWords(issue);
  },
};
