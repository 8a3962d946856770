"use client";

import { CleaningBody } from "@/components/cleaning/cleaning-body";
import { useCleaning } from "@/components/cleaning/use-cleaning";
import { useField } from "@/components/hooks/use-fields";
import { useLog } from "@/components/hooks/use-logs";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import type { Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";

export interface CleaningScreenProps {
  fieldId: string;
  logId: string;
  role: Role;
  basemap: BasemapConfig;
}

/** Fetches the log, its field and the rules; says so where one of them does not come. */
export function CleaningScreen({ fieldId, logId, role, basemap }: CleaningScreenProps) {
  const field = useField(fieldId);
  const log = useLog(logId);
  const cleaning = useCleaning(logId);
  const failed = [field, log, cleaning].find((query) => query.isError && query.data === undefined);
  if (failed) {
    return (
      <Notice state="act" urgent title="The rules of this log could not be shown">
        {describeFailure(failed.error)}
      </Notice>
    );
  }
  if (!log.data || !field.data) return <Loading what="the log" />;
  if (!cleaning.data) {
    return (
      <p role="status" className="py-6 text-ink-soft">
        Counting what each rule takes out…
      </p>
    );
  }
  return <CleaningBody field={field.data} log={log.data} cleaning={cleaning.data} role={role} basemap={basemap} />;
}
