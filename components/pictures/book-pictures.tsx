"use client";

import { useMemo, type ReactNode } from "react";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useLogVerdict } from "@/components/field-book/use-log-data";
import { PicturesProvider } from "@/components/pictures/picture-context";
import { usePrintSheet } from "@/components/pictures/use-print-sheet";
import { rankFindings, sentenceOf } from "@/components/sharing/shared-finding";
import { formatDay } from "@/components/ui/format-date";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { PictureSource } from "@/lib/pictures/picture-words";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

/** More findings than these are for the screen: paper has room for two sheets. */
const MOST_SENTENCES = 6;

/** What is shown of a log's adjustments, as a picture says it. */
export function cleaningWords({ revision = 0 }: Pick<Log, "revision">, cleaned: boolean): string {
  if (revision === 0) return "as logged";
  return cleaned ? `with cleaning rules, revision ${revision}` : "as logged, without its cleaning rules";
}

/** Pictures and print of one field's book. */
export function BookPictures({ field, children }: { field: Field; children: ReactNode }) {
  const { log } = useBook();
  const cleaned = useBookState((state) => state.cleaned);
  const source = useMemo<PictureSource>(
    () => ({
      field: field.name,
      farm: field.farm,
      log: log.name,
      loggedOn: formatDay(log.startedAt),
      cleaning: cleaningWords(log, cleaned),
    }),
    [field.name, field.farm, log, cleaned],
  );
  return (
    <PicturesProvider source={source} hasGrey>
      <BookPrint fieldName={field.name} />
      {children}
    </PicturesProvider>
  );
}

/** Puts the verdict's sentences above the figures on paper. */
function BookPrint({ fieldName }: { fieldName: string }) {
  const { log } = useBook();
  const { system } = useUnits();
  const channel = useBookState((state) => state.channel);
  const { data: verdict } = useLogVerdict(useLogVersion(), log.kind !== "harvest");
  const findings = verdict ? rankFindings(verdict).slice(0, MOST_SENTENCES) : [];
  usePrintSheet({
    title: `${fieldName}: ${channelWords(channel).name}`,
    sentences: findings.map((finding) => sentenceOf(finding, system)),
  });
  return null;
}
