/** Work the worker knows, and what each needs to be told. */
export interface JobPayloads {
  "read-log": { organisationId: string; logId: string };
  /** The second look at a log that is ready. */
  "look-closer": { organisationId: string; logId: string };
}
export type JobName = keyof JobPayloads;

export interface JobQueue {
  /** Hands work to the worker. `key` names what it is about: work waiting under the same key is not queued twice. */
  send<Name extends JobName>(name: Name, payload: JobPayloads[Name], options?: { key?: string }): Promise<void>;
  /** @throws when the queue does not answer; used by the readiness check. */
  ping(): Promise<void>;
  close(): Promise<void>;
}
