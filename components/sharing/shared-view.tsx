"use client";

import { rankFindings, sentenceOf } from "@/components/sharing/shared-finding";
import { SharedMap } from "@/components/sharing/shared-map";
import { Button } from "@/components/ui/button";
import { LocalDay } from "@/components/ui/local-day";
import { StateMark, type MarkState } from "@/components/ui/state-mark";
import { Quantity } from "@/components/units/quantity";
import { UnitSwitch } from "@/components/units/unit-switch";
import { useUnits } from "@/components/units/use-units";
import { VERDICT_THRESHOLDS } from "@/lib/findings/verdict-input";
import type { Finding } from "@/lib/schemas/logs";
import type { SharedView as SharedViewBody } from "@/lib/schemas/shared";

const MARKS: Record<Finding["severity"], MarkState> = { ok: "fine", look: "look", act: "act" };

/** A field's pass on one page, for somebody who was not there: what happened, where, what is being done, who to ask. */
export function SharedView({ view, token }: { view: SharedViewBody; token: string }) {
  const { system } = useUnits();
  const findings = view.verdict ? rankFindings(view.verdict) : [];
  const [first, ...others] = findings;
  const day = view.log?.startedAt ?? null;
  return (
    <main className="mx-auto max-w-3xl px-5 py-6 print:max-w-none print:p-0">
      <div className="no-print mb-4 flex items-center justify-between gap-3">
        <UnitSwitch />
        <Button onClick={() => window.print()}>Print</Button>
      </div>
      <header className="space-y-1 border-b border-ink pb-3">
        <h1 className="text-page">{view.fieldName}</h1>
        <p className="text-ink-soft">
          {view.log ? view.log.name : "No log was shared"}
          {day ? (
            <>
              {" · "}
              <LocalDay instant={day} />
            </>
          ) : null}
        </p>
      </header>
      {first ? (
        <p className="mt-5 flex gap-3 text-section print:mt-3">
          <StateMark state={MARKS[first.severity]} className="mt-1.5" />
          <span>{sentenceOf(first, system)}</span>
        </p>
      ) : null}
      <div className="mt-5 grid gap-5 md:grid-cols-[1fr_13rem] print:mt-3 print:grid-cols-[1fr_13rem]">
        <SharedMap view={view} token={token} />
        <TwoNumbers view={view} />
      </div>
      {others.length > 0 ? (
        <section className="mt-6 print:mt-3">
          <h2 className="mb-2 text-section">What else the pass showed</h2>
          <ul className="space-y-2">
            {others.slice(0, 4).map((finding) => (
              <li key={finding.id} className="flex gap-3">
                <StateMark state={MARKS[finding.severity]} className="mt-1" />
                <span>{sentenceOf(finding, system)}</span>
              </li>
            ))}
          </ul>
        </section>
      ) : null}
      <WhatNext findings={findings} />
      <footer className="mt-8 space-y-2 border-t border-rule pt-4 text-table text-ink-soft print:mt-3">
        <p>
          <span className="font-semibold text-ink">Who to ask:</span> {view.organisationName}, who sent you this link.
        </p>
        <p>
          These are readings of the machine’s own sensors, worked out by Coulterbook; they are no certified
          determination of anything. The page is meant for whoever it was sent to, and works until{" "}
          <LocalDay instant={view.expiresAt} />.
        </p>
      </footer>
    </main>
  );
}

/** What is being done about it: the checks that go with what was found. */
function WhatNext({ findings }: { findings: Finding[] }) {
  const asks = findings.filter((finding) => finding.severity !== "ok" && finding.check !== "").slice(0, 2);
  if (asks.length === 0) return null;
  return (
    <section className="mt-6 print:mt-3 print:text-table">
      <h2 className="mb-2 text-section print:mb-1">What is to be checked</h2>
      <ul className="list-disc space-y-1 pl-5">
        {asks.map((finding) => (
          <li key={finding.id}>
            {finding.row ? `Row ${finding.row}: ` : ""}
            {finding.check}
            {finding.caution ? <span className="block text-table text-ink-soft">{finding.caution}</span> : null}
          </li>
        ))}
      </ul>
    </section>
  );
}

const HELD_PERCENT = Math.round(100 * (1 - VERDICT_THRESHOLDS.underTargetShare));

/** How many rows fell under the target; null where no target was known, so that nothing is claimed. */
function rowsUnderTarget({ verdict }: SharedViewBody): number | null {
  if (!verdict) return null;
  const isSaid = verdict.findings.some(({ kind }) => kind === "rows-under-target" || kind === "target-held");
  return (verdict.known?.underTarget ?? isSaid) ? verdict.rowsUnderTarget.length : null;
}

function TwoNumbers({ view }: { view: SharedViewBody }) {
  const areaM2 = view.coverage?.coveredM2 ?? view.areaM2;
  const rows = view.log?.rows ?? 0;
  const under = rowsUnderTarget(view);
  return (
    <dl className="flex gap-6 md:flex-col md:gap-5 print:flex-col print:gap-3">
      <div>
        <dd className="text-number font-semibold">
          <Quantity value={areaM2} unit="m2" />
        </dd>
        <dt className="text-ink-soft">{view.coverage ? "seeded, counted once" : "inside the boundary"}</dt>
      </div>
      {rows > 0 ? (
        <div>
          <dd className="tabular text-number font-semibold">
            {under === null ? rows : rows - under}
            {under === null ? null : <span className="text-section text-ink-soft"> of {rows}</span>}
          </dd>
          <dt className="text-ink-soft">
            {under === null
              ? "rows logged"
              : `rows held the target on at least ${HELD_PERCENT}\u202f% of their distance`}
          </dt>
        </div>
      ) : null}
    </dl>
  );
}
