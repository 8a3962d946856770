import { z } from "zod";
import type { LogMapping } from "@/lib/ingest/mapping";
import { requestJson, requestNothing } from "@/lib/api/request-json";
import { Field, FieldList, type FieldInput, type FieldPatch } from "@/lib/schemas/fields";
import { CoverageBody, Log, LogColumns, LogList, LogPatch, PassList, VerdictBody } from "@/lib/schemas/logs";
import { MachineList, MachineReply } from "@/lib/schemas/machines";
import type { MePatch } from "@/lib/schemas/me";
import type { Machine } from "@/lib/machines/machine";
import {
  AuditList,
  Member,
  MemberInput,
  MemberList,
  MemberPatch,
  TokenCreated,
  TokenInput,
  TokenList,
} from "@/lib/schemas/people";
import { ShareCreated, ShareInput, ShareList } from "@/lib/schemas/shares";

const ROOT = "/api/v1";

/** Longest list one request may ask for; screens page through the rest. */
const PAGE = "limit=500";

function newKey(): string {
  return crypto.randomUUID();
}

/** Fields. */
export const listFields = () => requestJson(FieldList, `${ROOT}/fields?${PAGE}`);
export const getField = (fieldId: string) => requestJson(Field, `${ROOT}/fields/${fieldId}`);
export const createField = (body: FieldInput) =>
  requestJson(Field, `${ROOT}/fields`, { method: "POST", body, idempotencyKey: newKey() });
export const changeField = (fieldId: string, body: FieldPatch) =>
  requestJson(Field, `${ROOT}/fields/${fieldId}`, { method: "PATCH", body });
/** `withLogs`: also what hangs on it; without, a field that holds logs is refused. */
export const deleteField = (fieldId: string, withLogs = false) =>
  requestNothing(`${ROOT}/fields/${fieldId}${withLogs ? "?force=1" : ""}`, { method: "DELETE" });

/** Takes a boundary file (GeoJSON, KML, zipped shapefile) as it is; the server reads it. */
export function putBoundaryFile(fieldId: string, file: File) {
  const form = new FormData();
  form.set("file", file, file.name);
  return requestJson(Field, `${ROOT}/fields/${fieldId}/boundary`, { method: "PUT", body: form });
}
export const putBoundary = (fieldId: string, geometry: unknown) =>
  requestJson(Field, `${ROOT}/fields/${fieldId}/boundary`, { method: "PUT", body: geometry });

/** Machines. */
export const listMachines = () => requestJson(MachineList, `${ROOT}/machines?${PAGE}`);
export const createMachine = (body: Machine) =>
  requestJson(MachineReply, `${ROOT}/machines`, { method: "POST", body, idempotencyKey: newKey() });
export const changeMachine = (machineId: string, body: Record<string, unknown>) =>
  requestJson(MachineReply, `${ROOT}/machines/${machineId}`, { method: "PATCH", body });
/** Logs placed with it keep their own copy of the machine. */
export const deleteMachine = (machineId: string) =>
  requestNothing(`${ROOT}/machines/${machineId}?force=1`, { method: "DELETE" });

/** Logs. */
export const listLogs = (fieldId: string, limit = 500) =>
  requestJson(LogList, `${ROOT}/fields/${fieldId}/logs?limit=${limit}`);
export const getLog = (logId: string) => requestJson(Log, `${ROOT}/logs/${logId}`);
export const changeLog = (logId: string, body: z.input<typeof LogPatch>) =>
  requestJson(Log, `${ROOT}/logs/${logId}`, { method: "PATCH", body });
export const deleteLog = (logId: string) => requestNothing(`${ROOT}/logs/${logId}`, { method: "DELETE" });
export const cancelLog = (logId: string) => requestNothing(`${ROOT}/logs/${logId}/cancel`, { method: "POST" });
export const retryLog = (logId: string) => requestNothing(`${ROOT}/logs/${logId}/retry`, { method: "POST" });
export const getColumns = (logId: string) => requestJson(LogColumns, `${ROOT}/logs/${logId}/columns`);
export const putMapping = (logId: string, body: LogMapping & { machineId?: string | null }) =>
  requestNothing(`${ROOT}/logs/${logId}/mapping`, { method: "PUT", body });
export const getVerdict = (logId: string) => requestJson(VerdictBody, `${ROOT}/logs/${logId}/verdict`);
export const getCoverage = (logId: string) => requestJson(CoverageBody, `${ROOT}/logs/${logId}/coverage`);
export const listPasses = (logId: string) => requestJson(PassList, `${ROOT}/logs/${logId}/passes?${PAGE}`);
/** Addresses the browser opens itself. */
export const logEventsPath = (logId: string) => `${ROOT}/logs/${logId}/events`;
export const logOriginalPath = (logId: string) => `${ROOT}/logs/${logId}/original`;
export function logUploadPath(fieldId: string, { again, together }: { again: boolean; together: boolean }): string {
  const query = [...(again ? ["again=1"] : []), ...(together ? ["together=1"] : [])].join("&");
  return `${ROOT}/fields/${fieldId}/logs${query ? `?${query}` : ""}`;
}

/** Shares. */
export const listShares = (fieldId: string) => requestJson(ShareList, `${ROOT}/fields/${fieldId}/shares?${PAGE}`);
export const createShare = (fieldId: string, body: z.input<typeof ShareInput>) =>
  requestJson(ShareCreated, `${ROOT}/fields/${fieldId}/shares`, { method: "POST", body, idempotencyKey: newKey() });
export const revokeShare = (shareId: string) => requestNothing(`${ROOT}/shares/${shareId}`, { method: "DELETE" });

/** People. */
export const listMembers = () => requestJson(MemberList, `${ROOT}/members?${PAGE}`);
export const addMember = (body: z.input<typeof MemberInput>) =>
  requestJson(Member, `${ROOT}/members`, { method: "POST", body, idempotencyKey: newKey() });
export const changeMember = (memberId: string, body: z.input<typeof MemberPatch>) =>
  requestJson(Member, `${ROOT}/members/${memberId}`, { method: "PATCH", body });
export const removeMember = (memberId: string) => requestNothing(`${ROOT}/members/${memberId}`, { method: "DELETE" });
export const listAudit = () => requestJson(AuditList, `${ROOT}/audit?${PAGE}`);

/** The person's own things. */
export const changeMe = (body: z.input<typeof MePatch>) => requestNothing(`${ROOT}/me`, { method: "PATCH", body });
export const changePassword = (body: { currentPassword: string; newPassword: string }) =>
  requestNothing(`${ROOT}/me`, { method: "PATCH", body });
export const signOutEverywhere = () => requestNothing(`${ROOT}/me/sessions`, { method: "DELETE" });
export const listTokens = () => requestJson(TokenList, `${ROOT}/tokens?${PAGE}`);
export const createToken = (body: z.input<typeof TokenInput>) =>
  requestJson(TokenCreated, `${ROOT}/tokens`, { method: "POST", body });
export const revokeToken = (tokenId: string) => requestNothing(`${ROOT}/tokens/${tokenId}`, { method: "DELETE" });
