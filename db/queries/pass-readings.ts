import { escapeLiteral } from "pg";
import { to as copyTo } from "pg-copy-streams";
import { appDb } from "@/db/client";
import { readBinaryCopy } from "@/db/copy/read-binary-copy";
import type { Scope } from "@/lib/scope";

/** A stored run of one array. */
export interface StoredRun {
  channel: string;
  pass: number;
  firstSeq: number;
  records: number;
  rows: number;
  element: string;
  /** Little-endian; not aligned. */
  values: Buffer;
}

/**
 * Stored runs of these channels of one version of a log, in the file's order, read by binary COPY (the ordinary protocol
 * is twice as slow for packed numbers). Runs as the application, under row-level security. `records`: only runs that begin
 * among these.
 */
export async function readStoredRuns(
  scope: Pick<Scope, "organisationId">,
  input: { logId: string; version: number; channels: readonly string[]; records?: { from: number; before: number } },
): Promise<StoredRun[]> {
  if (input.channels.length === 0) return [];
  const client = await appDb().$client.connect();
  let isBroken = true;
  try {
    await client.query("begin read only");
    await client.query("select set_config('app.organisation_id', $1, true)", [scope.organisationId]);
    const channels = input.channels.map((channel) => escapeLiteral(channel)).join(", ");
    const { records } = input;
    const within = records
      ? ` and first_seq >= ${Math.trunc(records.from)} and first_seq < ${Math.trunc(records.before)}`
      : "";
    const query = `select channel, pass, first_seq, records, rows, element, values from pass_readings
      where organisation_id = ${escapeLiteral(scope.organisationId)} and log_id = ${escapeLiteral(input.logId)}
      and version = ${Math.trunc(input.version)} and channel in (${channels})${within} order by first_seq`;
    const rows = await readBinaryCopy(client.query(copyTo(`copy (${query}) to stdout binary`)));
    await client.query("commit");
    isBroken = false;
    return rows.map(([channel, pass, firstSeq, records, width, element, values]) => ({
      channel: channel?.toString("utf8") ?? "",
      pass: pass?.readInt32BE() ?? 0,
      firstSeq: firstSeq?.readInt32BE() ?? 0,
      records: records?.readInt32BE() ?? 0,
      rows: width?.readInt32BE() ?? 0,
      element: element?.toString("utf8") ?? "",
      values: values ?? Buffer.alloc(0),
    }));
  } finally {
    client.release(isBroken);
  }
}
