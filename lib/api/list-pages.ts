import type { z } from "zod";
import { requestJson } from "@/lib/api/request-json";
import { FieldList } from "@/lib/schemas/fields";
import { LogList } from "@/lib/schemas/logs";
import { MachineList } from "@/lib/schemas/machines";
import { AuditList, MemberList } from "@/lib/schemas/people";
import { ShareList } from "@/lib/schemas/shares";

const ROOT = "/api/v1";
/** What a screen shows before somebody asks for more. */
export const PAGE_SIZE = 100;
const LARGEST_PAGE = 500;

export interface Page<Item> {
  items: Item[];
  nextCursor: string | null;
}

/** Asks for the page after `cursor`; null for the first. */
export type LoadPage<Item> = (cursor: string | null, limit?: number) => Promise<Page<Item>>;

function pagesOf<Schema extends z.ZodType>(schema: Schema, path: string) {
  return (cursor: string | null, limit = PAGE_SIZE): Promise<z.output<Schema>> => {
    const after = cursor === null ? "" : `&cursor=${encodeURIComponent(cursor)}`;
    return requestJson(schema, `${ROOT}${path}?limit=${limit}${after}`);
  };
}

export const fieldPage = pagesOf(FieldList, "/fields");
export const machinePage = pagesOf(MachineList, "/machines");
export const memberPage = pagesOf(MemberList, "/members");
export const auditPage = pagesOf(AuditList, "/audit");
export const logPage = (fieldId: string) => pagesOf(LogList, `/fields/${fieldId}/logs`);
export const sharePage = (fieldId: string) => pagesOf(ShareList, `/fields/${fieldId}/shares`);

/** Every item, page after page: for lists to choose from, where one that is left out could not be chosen. */
export async function listAll<Item>(load: LoadPage<Item>): Promise<Page<Item>> {
  const items: Item[] = [];
  let cursor: string | null = null;
  do {
    const page: Page<Item> = await load(cursor, LARGEST_PAGE);
    items.push(...page.items);
    cursor = page.nextCursor;
  } while (cursor !== null);
  return { items, nextCursor: null };
}
