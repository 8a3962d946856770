"use client";

import { ChevronRight } from "lucide-react";
import Link from "next/link";
import { shareWords } from "@/components/cleaning/count-words";
import { useBook } from "@/components/field-book/field-book-context";
import { useSeeFinding } from "@/components/field-book/use-see-finding";
import { verdictKnown } from "@/components/field-book/verdict-known";
import { rankFindings, sentenceOf } from "@/components/sharing/shared-finding";
import { QuietLink } from "@/components/ui/quiet-link";
import { StateMark, type MarkState } from "@/components/ui/state-mark";
import { useUnits } from "@/components/units/use-units";
import { boundsOfGeometry } from "@/lib/map-state/geometry-bounds";
import type { Finding, VerdictBody } from "@/lib/schemas/logs";

export const SEVERITY: Record<Finding["severity"], { mark: MarkState; word: string }> = {
  act: { mark: "act", word: "Act" },
  look: { mark: "look", word: "Look" },
  ok: { mark: "fine", word: "Fine" },
};

export interface VerdictPanelProps {
  verdict: VerdictBody | undefined;
  rows: number;
  trouble: boolean;
  /** Where the machine that made a log is chosen. */
  logsHref: string;
  /** There is room to show what to check of the first finding. */
  openFirst: boolean;
}

/** What the log says, in plain words: one large number, then the findings, the pressing ones first. */
export function VerdictPanel({ verdict, rows, trouble, logsHref, openFirst }: VerdictPanelProps) {
  const { log } = useBook();
  if (log.kind === "harvest") return <HarvestWords />;
  if (!verdict) return <VerdictWaiting trouble={trouble} />;
  const findings = rankFindings(verdict);
  const worst = findings[0]?.severity ?? "ok";
  return (
    <section aria-labelledby="verdict-title" className="px-4 pb-3 pt-3" data-testid="verdict">
      <h2 id="verdict-title" className="flex items-center gap-2 text-section">
        Verdict
        <span className="inline-flex items-center gap-1.5 text-text font-normal text-ink-soft">
          <StateMark state={SEVERITY[worst].mark} />
          {SEVERITY[worst].word}
        </span>
      </h2>
      <LeftOutWords share={verdict.leftOutShare ?? 0} logsHref={logsHref} />
      <Headline verdict={verdict} rows={rows} logsHref={logsHref} />
      {findings.length === 0 ? <p className="text-ink-soft">Nothing in this log needs your attention.</p> : null}
      <ul className="mt-2 divide-y divide-rule">
        {findings.map((finding, index) => (
          <FindingItem key={finding.id} finding={finding} open={openFirst && index === 0} />
        ))}
      </ul>
    </section>
  );
}

/** How much the verdict does not know of: what rules leave out may be the very thing it looks for. */
function LeftOutWords({ share, logsHref }: { share: number; logsHref: string }) {
  const { log } = useBook();
  if (share === 0) return null;
  return (
    <p className="text-table text-ink-soft" data-testid="left-out">
      After cleaning:{" "}
      <QuietLink
        href={`${logsHref}/${log.id}/cleaning`}
        className="inline-flex min-h-11 items-center text-slate underline md:min-h-6"
      >
        {shareWords(share)} of readings left out
      </QuietLink>
    </p>
  );
}

/** A combine presses no rows into the ground: nothing of the verdict would mean anything. */
function HarvestWords() {
  return (
    <section aria-labelledby="verdict-title" className="space-y-2 px-4 py-3" data-testid="harvest">
      <h2 id="verdict-title" className="text-section">
        Harvest log
      </h2>
      <p className="text-ink-soft">
        This log was made by a combine, so there is no verdict on seeding in it. Map, legend and passes show what it
        measured.
      </p>
    </section>
  );
}

function VerdictWaiting({ trouble }: { trouble: boolean }) {
  return (
    <section aria-labelledby="verdict-title" className="px-4 py-3">
      <h2 id="verdict-title" className="text-section">
        Verdict
      </h2>
      {trouble ? (
        <p className="mt-2 text-ink-soft" role="alert">
          The verdict could not be fetched. Reload the page; if it stays away, read the log again from the list of logs.
        </p>
      ) : (
        // As tall as the number and three findings, so that what stands beneath stays where it is.
        <div className="hatch mt-2 h-[29rem] opacity-60" role="status" aria-label="Fetching the verdict" />
      )}
    </section>
  );
}

interface HeadlineProps {
  verdict: VerdictBody;
  rows: number;
  logsHref: string;
}

/** The one number that matters, in words. */
function Headline({ verdict, rows, logsHref }: HeadlineProps) {
  const { log } = useBook();
  const known = verdictKnown(verdict, log);
  const under = verdict.rowsUnderTarget.length;
  const rest = `${limitWords(verdict, known.atLimit)}${WEIGHT_WORDS[verdict.weight.state]}`;
  if (!known.underTarget) return <NotKnown rest={rest} machineHref={log.machineId === null ? logsHref : null} />;
  return (
    <div className="mt-1">
      <p className="flex items-baseline gap-2">
        <span className="tabular text-number font-semibold">
          {under}
          <span className="text-section font-normal text-ink-soft"> of {rows}</span>
        </span>
        <span>{under === 1 ? "row ran" : "rows ran"} under target</span>
      </p>
      <p className="text-table text-ink-soft">
        {under > 0 ? `${rowWords(verdict.rowsUnderTarget)} under target. ` : ""}
        {rest}
      </p>
    </div>
  );
}

/** In place of a number that nobody can know, and the way to knowing it. */
function NotKnown({ rest, machineHref }: { rest: string; machineHref: string | null }) {
  return (
    <div className="mt-1">
      <p className="flex flex-wrap items-baseline gap-x-2">
        <span className="text-section font-semibold">Not known</span> which rows ran under target
      </p>
      {machineHref === null ? null : (
        <p>
          Nobody has said which machine made this log.{" "}
          <Link href={machineHref} className="inline-flex min-h-11 items-center text-slate underline md:min-h-6">
            Choose the machine
          </Link>
        </p>
      )}
      <p className="text-table text-ink-soft">{rest}</p>
    </div>
  );
}

function limitWords({ rowsAtLimit }: VerdictBody, known: boolean): string {
  if (!known) return "Rows at their force limit: not known. ";
  return rowsAtLimit.length > 0 ? `${rowWords(rowsAtLimit)} at the force limit. ` : "No row at its force limit. ";
}

const WEIGHT_WORDS: Record<VerdictBody["weight"]["state"], string> = {
  enough: "Enough weight on the frame.",
  short: "Too little weight on the frame in places.",
  unknown: "Weight on the frame: not known without the machine's masses.",
};

/** "Row 17", "Rows 3, 4 and 17", "Rows 3 to 9". */
export function rowWords(rows: readonly number[]): string {
  const runs: [number, number][] = [];
  for (const row of [...rows].sort((a, b) => a - b)) {
    const last = runs.at(-1);
    if (last && row === last[1] + 1) last[1] = row;
    else runs.push([row, row]);
  }
  const words = runs.flatMap(([from, to]) =>
    to - from >= 2 ? [`${from} to ${to}`] : from === to ? [`${from}`] : [`${from}`, `${to}`],
  );
  const list = words.length > 1 ? `${words.slice(0, -1).join(", ")} and ${words.at(-1)}` : (words[0] ?? "");
  return `${rows.length === 1 ? "Row" : "Rows"} ${list}`;
}

/** What to check, and what to mind while doing it: folded but for the first, so that all findings can be seen at once. */
function CheckWords({ finding, open }: { finding: Finding; open: boolean }) {
  return (
    <details open={open} className="text-table text-ink-soft open:basis-full">
      <summary className="flex min-h-11 items-center gap-1 text-slate md:min-h-6">
        <ChevronRight size={14} aria-hidden className="[details[open]_&]:rotate-90" />
        What to check{finding.caution ? ", and a caution" : ""}
      </summary>
      <p>{finding.check}</p>
      {finding.caution ? (
        <p className="mt-1 border-l-2 border-straw pl-2">
          <b className="font-semibold text-straw-deep">Caution.</b> {finding.caution}
        </p>
      ) : null}
    </details>
  );
}

function FindingItem({ finding, open }: { finding: Finding; open: boolean }) {
  const seeFinding = useSeeFinding();
  const { system } = useUnits();
  const { mark, word } = SEVERITY[finding.severity];
  const row = finding.row ?? null;
  const bounds = finding.place ? boundsOfGeometry(finding.place) : null;
  return (
    <li className="flex gap-2 py-2" data-severity={finding.severity}>
      <StateMark state={mark} className="mt-1" />
      <div className="min-w-0 flex-1 space-y-0.5">
        <p>
          <span className="sr-only">{word}: </span>
          {sentenceOf(finding, system)}
        </p>
        <div className="flex flex-wrap items-start justify-between gap-x-4">
          {finding.check || finding.caution ? <CheckWords finding={finding} open={open} /> : <span />}
          {bounds || row !== null ? (
            <button
              type="button"
              onClick={() => seeFinding(finding)}
              className="min-h-11 text-table text-slate underline md:min-h-6"
            >
              See it{row !== null ? `: row ${row}` : " on the map"}
            </button>
          ) : null}
        </div>
      </div>
    </li>
  );
}
