/** Names of what the server owns, so that a change knows what to ask for again. */
export const queryKeys = {
  fields: ["fields"] as const,
  field: (fieldId: string) => ["fields", fieldId] as const,
  machines: ["machines"] as const,
  logs: (fieldId: string) => ["fields", fieldId, "logs"] as const,
  log: (logId: string) => ["logs", logId] as const,
  columns: (logId: string) => ["logs", logId, "columns"] as const,
  verdict: (logId: string, version: number) => ["logs", logId, "verdict", version] as const,
  shares: (fieldId: string) => ["fields", fieldId, "shares"] as const,
  members: ["members"] as const,
  tokens: ["tokens"] as const,
  audit: ["audit"] as const,
};
