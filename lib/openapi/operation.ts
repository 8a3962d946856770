import type { z } from "zod";
import type { Permission } from "@/lib/access/permissions";
import type { ErrorCode } from "@/lib/errors";

export type Method = "GET" | "POST" | "PUT" | "PATCH" | "DELETE";

export interface OperationReply {
  status: number;
  description: string;
  /** JSON unless another type is named. */
  schema?: z.ZodType;
  contentType?: string;
}

/** A part of a multipart body. */
export interface FormPart {
  description: string;
  kind: "file" | "text" | "json";
  required?: boolean;
}

/** One method of one address: the single list that the description, the reference page and the tests read. */
export interface Operation {
  method: Method;
  /** With `{names}` of parameters, as OpenAPI writes it. */
  path: `/api/v1/${string}`;
  tag: string;
  /** `public` needs no account. */
  permission: Permission | "public";
  summary: string;
  description?: string;
  query?: z.ZodObject;
  body?: z.ZodType;
  form?: Record<string, FormPart>;
  replies: OperationReply[];
  /** Beyond those any operation of its kind may give. */
  errors?: ErrorCode[];
}
