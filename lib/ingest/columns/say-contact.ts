import type { ContactDefinition } from "@/lib/ingest/mapping";

/** How ground contact is defined, to follow "Ground contact is": "the share of 1 s in which the wheel carried 50 N or more". */
export function sayContact({ kind, thresholdN, windowS, words }: ContactDefinition): string {
  const load = thresholdN === undefined ? "load" : `${thresholdN} N or more`;
  const said = {
    "share-of-time": `the share of ${windowS === undefined ? "time" : `${windowS} s`} in which the wheel carried ${load}`,
    "at-the-moment": `a yes or no at the moment of the record: whether the wheel carried ${load}`,
    other: "defined in another way",
  }[kind];
  return words === undefined ? said : `${said} (${words})`;
}
