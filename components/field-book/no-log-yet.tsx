import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import type { Log } from "@/lib/schemas/logs";

/** A field without a log that can be read: what belongs here, and the next step. */
export function NoLogYet({ logs, logsHref }: { logs: readonly Log[]; logsHref: string }) {
  const waiting = logs.filter((log) => log.status === "needs-mapping").length;
  const working = logs.filter((log) => ["queued", "reading", "building"].includes(log.status)).length;
  return (
    <div className="px-4 md:px-5">
      <EmptyState
        title={working > 0 ? "A log is being read" : "No log to read yet"}
        action={
          <Link href={logsHref} className={buttonClass("primary")}>
            {logs.length === 0 ? "Add a log" : "Open the list of logs"}
          </Link>
        }
      >
        <p>
          Here every row of a seeding log stands on the ground it ran over, with the verdict on the pass.{" "}
          {waiting > 0
            ? `${waiting === 1 ? "One log waits" : `${waiting} logs wait`} for you to confirm what its columns mean.`
            : working > 0
              ? "This page opens by itself when the log is ready."
              : "Add the file the machine wrote: CSV, GeoJSON, a zipped shapefile or task data."}
        </p>
      </EmptyState>
    </div>
  );
}
