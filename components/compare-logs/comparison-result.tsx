"use client";

import { useState } from "react";
import { ComparedLineUps } from "@/components/compare-logs/compared-line-ups";
import { comparedRowColumns, measureColumns } from "@/components/compare-logs/comparison-columns";
import { DifferenceChart } from "@/components/compare-logs/difference-chart";
import { DistributionChart } from "@/components/compare-logs/distribution-chart";
import { sayComparison } from "@/components/compare-logs/say-comparison";
import { Button } from "@/components/ui/button";
import { DataTable } from "@/components/ui/data-table";
import { Notice } from "@/components/ui/notice";
import { StateMark } from "@/components/ui/state-mark";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import type { ComparedLog, ComparisonBody } from "@/lib/schemas/comparison";

/** What two logs come to: sentences, figures of all rows together, and every row. */
export function ComparisonResult({ body }: { body: ComparisonBody }) {
  const { system } = useUnits();
  const [row, setRow] = useState<number | null>(null);
  const name = channelWords(body.channel).name;
  const file = `compare-${body.channel.replaceAll(/[^a-zA-Z]+/g, "-")}`;
  return (
    <div className="space-y-8">
      <section aria-labelledby="comparison-says" className="space-y-3">
        <h2 id="comparison-says" className="text-section">
          What changed
        </h2>
        <ul className="max-w-prose space-y-2">
          {sayComparison(body, system).map(({ state, text }) => (
            <li key={text} className="flex gap-3">
              <StateMark state={state} className="mt-1" />
              <span>{text}</span>
            </li>
          ))}
        </ul>
        <Doubts body={body} />
      </section>
      <section aria-labelledby="comparison-whole" className="space-y-3">
        <h2 id="comparison-whole" className="text-section">
          {name}, all rows together
        </h2>
        <DistributionChart body={body} />
        <DataTable
          caption={`${name} of all rows together, before and after`}
          rows={body.overall}
          columns={measureColumns(body.channel, system)}
          rowId={({ measure }) => measure}
          fileName={`${file}-all-rows`}
        />
      </section>
      {body.rows.length > 0 ? (
        <section aria-labelledby="comparison-rows" className="space-y-3">
          <h2 id="comparison-rows" className="text-section">
            {name}, row by row
          </h2>
          <ComparedLineUps body={body} row={row} />
          <DifferenceChart body={body} row={row} onRow={setRow} />
          <DataTable
            stickyFirst
            caption={`${name} of each row, before and after`}
            rows={body.rows}
            columns={comparedRowColumns(body, system)}
            rowId={(item) => String(item.row)}
            fileName={`${file}-rows`}
            actions={(item) => (
              <Button
                kind="quiet"
                aria-pressed={item.row === row}
                aria-label={`Light row ${item.row} in the charts`}
                onClick={() => setRow(item.row === row ? null : item.row)}
              >
                {item.row === row ? "Lit" : "Light"}
              </Button>
            )}
          />
        </section>
      ) : null}
    </div>
  );
}

/** What cannot be told and why, what else may have changed, and what the intervals rest on. */
function Doubts({ body }: { body: ComparisonBody }) {
  return (
    <div className="max-w-prose space-y-3">
      {body.reasons.length > 0 ? (
        <Notice state="look" title="What these logs cannot tell">
          <ul className="space-y-1">
            {body.reasons.map((reason) => (
              <li key={reason}>{reason}</li>
            ))}
          </ul>
        </Notice>
      ) : null}
      {body.cautions.map((caution) => (
        <p key={caution} className="text-table text-ink-soft">
          {caution}
        </p>
      ))}
      <p className="text-table text-ink-soft">
        {sayPasses(body.before)}; {sayPasses(body.after)}. Every figure is weighted by distance; intervals draw whole
        passes anew.
      </p>
    </div>
  );
}

function sayPasses({ name, passes, headlandPassesLeftOut, whole, rows }: ComparedLog): string {
  const without = headlandPassesLeftOut > 0 ? `, without ${headlandPassesLeftOut} on the headland` : "";
  return `${name}: ${passes} passes${without}, which count as ${whole.blocks} for all rows together and ${rows.blocks} for rows against each other`;
}
