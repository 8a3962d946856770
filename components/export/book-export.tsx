"use client";

import { ExportMenu } from "@/components/export/export-menu";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useClasses } from "@/components/field-book/use-classes";
import { useOverview } from "@/components/field-book/use-log-data";

/** The export menu of the open log, with the zones as the map colours them. */
export function BookExport() {
  const { log } = useBook();
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const { data: overview } = useOverview(logVersion, channel);
  const classes = useClasses(channel, overview);
  const logged = log.channels.find(({ id }) => id === channel);
  const hasRows = logged ? logged.perRow : log.counts.rows > 1;
  return (
    <ExportMenu
      log={log}
      cleaned={logVersion.cleaned}
      zones={classes && hasRows ? { channel, edges: classes.edges } : null}
    />
  );
}
