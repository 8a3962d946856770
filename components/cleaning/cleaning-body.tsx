"use client";

import { useState } from "react";
import { changedCodes, changeRule, checkDraft, nameRules, ruleOf } from "@/components/cleaning/cleaning-draft";
import { CleaningTotals } from "@/components/cleaning/cleaning-totals";
import { CompareMaps } from "@/components/cleaning/compare-maps";
import { leftOutShare, shareWords } from "@/components/cleaning/count-words";
import { DelaySection } from "@/components/cleaning/delay-section";
import { EffectTable } from "@/components/cleaning/effect-table";
import { RevisionList } from "@/components/cleaning/revision-list";
import { RuleLine } from "@/components/cleaning/rule-line";
import { ruleUnit, sayRuleNumber } from "@/components/cleaning/rule-unit";
import { RulesBar } from "@/components/cleaning/rules-bar";
import { useCleaningPreview, useReviseCleaning } from "@/components/cleaning/use-cleaning";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { useUnits } from "@/components/units/use-units";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";
import { ruleFacts, type CleaningRules } from "@/lib/cleaning/rule-catalogue";
import type { Cleaning } from "@/lib/schemas/cleaning";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

/** The newest change undid the one before it, so that undoing it does that one again; undoing such a redo is an undo. */
function isUndo(history: Cleaning["history"], revision: number): boolean {
  const entry = history.find((one) => one.revision === revision);
  return entry?.revertedTo === revision - 2 && !isUndo(history, revision - 1);
}

export interface CleaningBodyProps {
  field: Field;
  log: Log;
  cleaning: Cleaning;
  role: Role;
  basemap: BasemapConfig;
}

/** The rules of a log, what they do, and the way back from every change. */
export function CleaningBody({ field, log, cleaning, role, basemap }: CleaningBodyProps) {
  const { system } = useUnits();
  /** Null while nothing is changed. */
  const [changes, setChanges] = useState<CleaningRules | null>(null);
  const draft = changes ?? cleaning.rules;
  const revise = useReviseCleaning(log.id);
  const mayChange = can(role, "logs.clean");
  const changed = changedCodes(cleaning.rules, draft);
  const problems = checkDraft(draft, (value, code, name) => {
    const { unit = "", channel } = ruleFacts(code).numbers[name] ?? {};
    return sayRuleNumber(value, ruleUnit(unit, system, channel));
  });
  const hasProblems = Object.keys(problems).length > 0;
  const isDraft = changed.length > 0;
  const preview = useCleaningPreview(log.id, cleaning.revision, isDraft && !hasProblems ? draft : null);
  const shown = (isDraft ? preview.data : undefined) ?? cleaning;
  const isShownDraft = shown !== cleaning;
  const channels = log.channels.map(({ id }) => id);
  const pending = revise.put.isPending || revise.undo.isPending;
  return (
    <div className="space-y-8">
      {mayChange ? null : (
        <Notice state="look" title="To look at only">
          You are here as {role}. An owner or an agronomist may change the rules of a log.
        </Notice>
      )}
      <CleaningTotals total={shown.total} isDraft={isShownDraft} isCounting={preview.isCounting} />
      {preview.error ? (
        <Notice state="act" urgent title="Could not be counted">
          {describeFailure(preview.error)}
        </Notice>
      ) : null}
      <section aria-labelledby="rules-title" className="space-y-3">
        <div className="flex flex-wrap items-baseline justify-between gap-2">
          <h2 id="rules-title" className="text-section">
            Rules, in the order they work
          </h2>
          {mayChange && cleaning.revision > 0 && !isDraft ? (
            <Button disabled={pending} onClick={() => revise.undo.mutate({})}>
              {isUndo(cleaning.history, cleaning.revision) ? "Redo the last change" : "Undo the last change"}
            </Button>
          ) : null}
        </div>
        {revise.undo.error ? (
          <Notice state="act" urgent title="Not done">
            {describeFailure(revise.undo.error)}
          </Notice>
        ) : null}
        <ol className="border-t border-rule">
          {shown.items.map((item) => (
            <RuleLine
              key={item.code}
              item={item}
              channels={channels}
              rule={ruleOf(draft, item.code)}
              problems={problems[item.code]}
              locked={!mayChange || pending}
              isCounting={preview.isCounting}
              onChange={(change) => setChanges((before) => changeRule(before ?? cleaning.rules, item.code, change))}
            />
          ))}
        </ol>
      </section>
      {isDraft ? (
        <RulesBar
          changed={changed}
          hasProblems={hasProblems}
          isCounting={preview.isCounting}
          pending={pending}
          failure={revise.put.error}
          outcome={
            isShownDraft
              ? `Would leave out ${shareWords(leftOutShare(shown.total))} of the readings in passes; now it is ${shareWords(leftOutShare(cleaning.total))}.`
              : null
          }
          onUse={(note) =>
            revise.put.mutate(
              { rules: draft, note: note === "" ? `${nameRules(changed)} changed` : note },
              { onSuccess: () => setChanges(null) },
            )
          }
          onDrop={() => setChanges(null)}
        />
      ) : null}
      <EffectTable effects={shown.effect} logName={log.name} isDraft={isShownDraft} />
      {log.bbox === null ? null : (
        <CompareMaps field={field} log={log} cleaning={cleaning} basemap={basemap} isDraft={isDraft} />
      )}
      <DelaySection logId={log.id} mayChange={mayChange} />
      <RevisionList
        history={cleaning.history}
        revision={cleaning.revision}
        mayChange={mayChange}
        pending={pending}
        onRevert={(revert) => revise.undo.mutate({ revert })}
      />
    </div>
  );
}
