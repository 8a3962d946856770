import "server-only";
import { withOrganisation } from "@/db/client";
import { findLog, type LogRow } from "@/db/queries/logs";
import { findOrganisationName } from "@/db/queries/organisations";
import { findingsForReader } from "@/lib/findings/findings-for-reader";
import { CoverageBody, VerdictBody } from "@/lib/schemas/logs";
import type { SharedView } from "@/lib/schemas/shared";
import { ShareLayer } from "@/lib/schemas/shares";
import { moveToOrigin, type MoveGeometry } from "@/lib/sharing/move-to-origin";
import { isChannelShared } from "@/lib/sharing/shared-channels";
import { findAnswer, readAdjustedAnswer } from "@/lib/server/adjustments/read-adjusted-answer";
import type { Container } from "@/lib/server/create-container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import type { OpenedShare } from "@/lib/server/shares/open-share";

interface Shown {
  layers: string[];
  isBlurred: boolean;
}

function describeSharedLog(log: LogRow, { layers, isBlurred }: Shown): SharedView["log"] {
  return {
    name: log.name,
    kind: log.kind,
    status: log.status,
    startedAt: log.startedAt?.toISOString() ?? null,
    endedAt: log.endedAt?.toISOString() ?? null,
    rows: log.counts.rows,
    passes: log.counts.passes,
    version: log.version,
    bbox: isBlurred ? null : (log.bbox ?? null),
    channels: log.channels.filter((channel) => isChannelShared(layers, channel.id)),
  };
}

function verdictForReader(body: unknown, audience: string, move: MoveGeometry): VerdictBody | null {
  const verdict = VerdictBody.nullable().parse(body);
  if (!verdict) return null;
  return {
    rowsUnderTarget: verdict.rowsUnderTarget,
    rowsAtLimit: verdict.rowsAtLimit,
    known: verdict.known,
    weight: verdict.weight,
    findings: findingsForReader(verdict.findings, audience).map((finding) => ({
      ...finding,
      place: move(finding.place),
    })),
  };
}

/** Everything the link shows, cut down to its layers. */
export async function readSharedView(container: Container, { share, scope }: OpenedShare): Promise<SharedView> {
  const { layers, blurLocation: isBlurred } = share;
  const has = (layer: string) => layers.includes(layer);
  const { field, log, organisationName } = await withOrganisation(scope, async (tx) => ({
    field: await getFieldOrThrow(tx, scope, share.fieldId),
    log: share.logId ? await findLog(tx, scope, share.logId) : null,
    organisationName: await findOrganisationName(tx, scope),
  }));
  const read = log && log.version > 0 ? log : null;
  const verdict = read && has("verdict") ? await readAdjustedAnswer(container, read, "verdict") : null;
  const coverage = read && has("coverage") ? await findAnswer({ ...read, adjustmentRevision: 0 }, "coverage") : null;
  const move: MoveGeometry = isBlurred ? moveToOrigin(field.boundary) : (geometry) => geometry;
  return {
    audience: share.audience,
    layers: ShareLayer.array().parse(layers),
    expiresAt: share.expiresAt.toISOString(),
    organisationName,
    fieldName: field.name,
    blurLocation: isBlurred,
    boundary: has("boundary") ? move(field.boundary) : null,
    areaM2: has("boundary") ? field.areaM2 : null,
    log: log ? describeSharedLog(log, { layers, isBlurred }) : null,
    verdict: verdictForReader(verdict, share.audience, move),
    coverage: CoverageBody.nullable().parse(coverage),
  };
}
