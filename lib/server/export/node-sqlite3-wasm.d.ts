// The package brings no types; only what is used here.
declare module "node-sqlite3-wasm" {
  type SqlValue = number | bigint | string | null | Uint8Array;
  class Statement {
    run(values: readonly SqlValue[]): unknown;
    finalize(): void;
  }
  class Database {
    constructor(path: string);
    exec(sql: string): void;
    prepare(sql: string): Statement;
    run(sql: string, values?: readonly SqlValue[]): unknown;
    close(): void;
  }
  const sqlite: { Database: typeof Database };
  export default sqlite;
}
