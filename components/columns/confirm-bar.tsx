"use client";

import type { ChoiceCheck } from "@/components/columns/check-choices";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { StateWord } from "@/components/ui/state-mark";
import { describeFailure } from "@/lib/api/api-problem";

function showFirstWaiting(): void {
  const waiting = document.querySelector<HTMLElement>("[data-waiting]");
  waiting?.scrollIntoView({ block: "center" });
  waiting?.querySelector<HTMLElement>("button, select, input")?.focus({ preventScroll: true });
}

export interface ConfirmBarProps {
  check: ChoiceCheck;
  pending: boolean;
  failure: unknown;
}

/** Says what stands in the way, or what pressing the button will do. Stays in sight. */
export function ConfirmBar({ check, pending, failure }: ConfirmBarProps) {
  const wrong = Object.keys(check.problems).length;
  const blocked = check.waiting.length > 0 || wrong > 0 || check.general.length > 0;
  return (
    <div className="sticky bottom-14 z-20 -mx-4 space-y-3 border-t border-rule bg-paper px-4 py-3 md:bottom-0 md:mx-0 md:px-0">
      {failure ? (
        <Notice state="act" urgent title="Not accepted">
          {describeFailure(failure)}
        </Notice>
      ) : null}
      <div className="flex flex-wrap items-center justify-between gap-3">
        <div aria-live="polite" className="min-w-0 flex-1 basis-64 space-y-1">
          {check.general.map((sentence) => (
            <p key={sentence}>
              <StateWord state="act">{sentence}</StateWord>
            </p>
          ))}
          {check.waiting.length > 0 ? (
            <p>
              <StateWord state="look">
                {check.questions === 1 ? "1 question still needs you." : `${check.questions} questions still need you.`}
              </StateWord>{" "}
              <button
                type="button"
                onClick={showFirstWaiting}
                className="min-h-8 text-slate underline underline-offset-3"
              >
                Show the first
              </button>
            </p>
          ) : null}
          {wrong > 0 ? (
            <StateWord state="act">
              {wrong === 1 ? "1 column lacks a right answer." : `${wrong} columns lack a right answer.`}
            </StateWord>
          ) : null}
          {blocked ? null : (
            <p className="text-ink-soft">
              The whole file is read with these meanings, then every row is put on the ground. You can change them
              later.
            </p>
          )}
        </div>
        <Button type="submit" kind="primary" disabled={blocked || pending} className="max-md:w-full">
          {pending ? "Sending…" : "Read the log"}
        </Button>
      </div>
    </div>
  );
}
