"use client";

import dynamic from "next/dynamic";
import { useRouter, useSearchParams } from "next/navigation";
import { useMemo, useState } from "react";
import { ChooseLog } from "@/components/compare-logs/choose-log";
import {
  readCompareAddress,
  writeCompareAddress,
  type CompareAddress,
} from "@/components/compare-logs/compare-address";
import { ComparisonResult } from "@/components/compare-logs/comparison-result";
import { useComparison } from "@/components/compare-logs/use-comparison";
import { channelsOf } from "@/components/field-book/channel-switch";
import { FieldBookProvider } from "@/components/field-book/field-book-context";
import { useField } from "@/components/hooks/use-fields";
import { useLogs } from "@/components/hooks/use-logs";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { Button } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import { channelWords } from "@/lib/legend/channel-words";
import { createFieldBookStore } from "@/lib/map-state/field-book-store";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

const ComparedMaps = dynamic(
  () => import("@/components/compare-logs/compared-maps").then((loaded) => loaded.ComparedMaps),
  { ssr: false, loading: () => <div className="hatch h-96 opacity-60" role="status" aria-label="Opening the maps" /> },
);

export interface ComparisonScreenProps {
  /** Fields to choose from on either side: of the logs in the address, else the one the page is of. */
  start: { beforeFieldId: string; afterFieldId: string };
  basemap: BasemapConfig;
}

/** Two logs chosen by hand or by the address, and what came of the change between them. */
export function ComparisonScreen({ start, basemap }: ComparisonScreenProps) {
  const router = useRouter();
  const search = useSearchParams();
  const address = readCompareAddress(new URLSearchParams(search.toString()));
  const [fields, setFields] = useState(start);
  const before = useSide(fields.beforeFieldId, address.before);
  const after = useSide(fields.afterFieldId, address.after);
  const go = (change: Partial<CompareAddress>) =>
    router.replace(`?${writeCompareAddress({ ...address, ...change })}`, { scroll: false });
  const swap = () => {
    setFields({ beforeFieldId: fields.afterFieldId, afterFieldId: fields.beforeFieldId });
    go({ before: address.after, after: address.before });
  };
  const toField = (side: "before" | "after") => (fieldId: string) => {
    setFields({ ...fields, [`${side}FieldId`]: fieldId });
    go({ [side]: null });
  };
  return (
    <div className="space-y-8 pt-5">
      <div className="grid items-end gap-4 md:grid-cols-[minmax(0,1fr)_auto_minmax(0,1fr)]">
        <ChooseLog
          title="Before the change"
          fieldId={fields.beforeFieldId}
          log={before.log}
          onField={toField("before")}
          onLog={(logId) => go({ before: logId })}
          taken={address.after}
        />
        <Button onClick={swap} disabled={!address.before && !address.after}>
          Swap
        </Button>
        <ChooseLog
          title="After the change"
          fieldId={fields.afterFieldId}
          log={after.log}
          onField={toField("after")}
          onLog={(logId) => go({ after: logId })}
          taken={address.before}
        />
      </div>
      {before.log && after.log && before.field && after.field ? (
        <ComparedLogs
          key={`${before.log.id} ${after.log.id}`}
          before={{ field: before.field, log: before.log }}
          after={{ field: after.field, log: after.log }}
          channel={address.channel}
          onChannel={(channel) => go({ channel })}
          basemap={basemap}
        />
      ) : (
        <EmptyState title="Choose two logs">
          One from before a change of set-up and one from after it, from the same field or two. Passes are held against
          passes, so each log should have at least eight.
        </EmptyState>
      )}
    </div>
  );
}

function useSide(fieldId: string, logId: string | null): { field: Field | undefined; log: Log | undefined } {
  const field = useField(fieldId);
  const logs = useLogs(fieldId);
  const log = logs.data?.items.find((one) => one.id === logId && one.status === "ready");
  return { field: field.data, log };
}

interface ComparedLogsProps {
  before: { field: Field; log: Log };
  after: { field: Field; log: Log };
  channel: string | null;
  onChannel: (channel: string) => void;
  basemap: BasemapConfig;
}

function ComparedLogs({ before, after, channel, onChannel, basemap }: ComparedLogsProps) {
  const channels = useMemo(() => {
    const others = channelsOf(after.log);
    return channelsOf(before.log).filter((id) => others.includes(id));
  }, [before.log, after.log]);
  const chosen = channel && channels.includes(channel) ? channel : channels[0];
  if (!chosen) return <Notice state="look" title="These logs have no reading in common" />;
  return (
    <>
      <label className="flex flex-wrap items-center gap-2">
        <span className="text-table text-ink-soft">Reading compared</span>
        <select
          value={chosen}
          onChange={(event) => onChannel(event.target.value)}
          className="min-h-11 rounded border border-edge bg-sheet px-2 md:min-h-9"
        >
          {channels.map((id) => (
            <option key={id} value={id}>
              {channelWords(id).name}
            </option>
          ))}
        </select>
      </label>
      <Answer before={before.log} after={after.log} channel={chosen} />
      <InBook key={chosen} log={before.log} channel={chosen}>
        <ComparedMaps before={before} after={after} basemap={basemap} />
      </InBook>
    </>
  );
}

function Answer({ before, after, channel }: { before: Log; after: Log; channel: string }) {
  const comparison = useComparison(before, after, channel);
  if (comparison.data) return <ComparisonResult body={comparison.data} />;
  if (!comparison.isError) return <Loading what="the comparison" />;
  return (
    <Notice state="act" urgent title="These logs could not be compared">
      {describeFailure(comparison.error)}
    </Notice>
  );
}

/** The parts of the field book that the maps are made of look into a book. */
function InBook({ log, channel, children }: { log: Log; channel: string; children: React.ReactNode }) {
  const [store] = useState(() => createFieldBookStore({ channel }));
  const logVersion = { logId: log.id, version: log.version, revision: log.revision };
  return <FieldBookProvider book={{ store, log, logVersion }}>{children}</FieldBookProvider>;
}
