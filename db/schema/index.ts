export * from "@/db/schema/fields";
export * from "@/db/schema/jobs";
export * from "@/db/schema/log-files";
export * from "@/db/schema/logs";
export * from "@/db/schema/organisations";
export * from "@/db/schema/rate-limits";
export * from "@/db/schema/recipes";
export * from "@/db/schema/shares";
