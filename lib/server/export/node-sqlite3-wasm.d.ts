// The package brings no types; only what is used here.
declare module "node-sqlite3-wasm" {
  type SqlValue = number | bigint | string | null | Uint8Array;
  interface Statement {
    run(values: readonly SqlValue[]): unknown;
    finalize(): void;
  }
  export interface SqliteDatabase {
    exec(sql: string): void;
    prepare(sql: string): Statement;
    run(sql: string, values?: readonly SqlValue[]): unknown;
    close(): void;
  }
  const sqlite: { Database: new (path: string) => SqliteDatabase };
  export default sqlite;
}
