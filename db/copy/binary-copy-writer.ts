import { once } from "node:events";
import type { Writable } from "node:stream";

const BLOCK_BYTES = 256 * 1024;
const SIGNATURE = Buffer.from("PGCOPY\n\xff\r\n\0", "latin1");
/** Microseconds from 1970-01-01 to PostgreSQL's own zero, 2000-01-01. */
const POSTGRES_EPOCH_US = 946_684_800_000_000;

/** Writes rows in PostgreSQL's binary COPY format (PostgreSQL manual, COPY, "Binary Format") in blocks, with back-pressure. */
export class BinaryCopyWriter {
  private block = Buffer.allocUnsafe(BLOCK_BYTES);
  private used = 0;
  private waiting: Buffer[] = [];

  constructor(private readonly target: Writable) {
    this.bytes(SIGNATURE);
    this.int32Raw(0);
    this.int32Raw(0);
  }

  /** Begins a row; await it now and then so that the socket keeps up. */
  row(fields: number): void {
    this.room(2);
    this.used = this.block.writeInt16BE(fields, this.used);
  }

  text(value: Buffer): void {
    this.int32Raw(value.length);
    this.bytes(value);
  }

  int32(value: number): void {
    this.int32Raw(4);
    this.int32Raw(value);
  }

  float32(value: number): void {
    if (Number.isNaN(value)) return this.nothing();
    this.int32Raw(4);
    this.room(4);
    this.used = this.block.writeFloatBE(value, this.used);
  }

  float64(value: number): void {
    if (Number.isNaN(value)) return this.nothing();
    this.int32Raw(8);
    this.room(8);
    this.used = this.block.writeDoubleBE(value, this.used);
  }

  /** A timestamptz from milliseconds since 1970. */
  instant(timeMs: number): void {
    if (!Number.isFinite(timeMs)) return this.nothing();
    this.int32Raw(8);
    this.room(8);
    this.used = this.block.writeBigInt64BE(BigInt(Math.round(timeMs * 1000) - POSTGRES_EPOCH_US), this.used);
  }

  binary(value: Uint8Array): void {
    this.int32Raw(value.byteLength);
    this.bytes(value);
  }

  nothing(): void {
    this.int32Raw(-1);
  }

  /** Hands full blocks to the socket and waits while it is busy. */
  async flush(): Promise<void> {
    for (const block of this.waiting.splice(0)) {
      if (!this.target.write(block)) await once(this.target, "drain");
    }
  }

  /** Ends the stream; resolves when the server has taken every row. */
  async finish(): Promise<void> {
    this.room(2);
    this.used = this.block.writeInt16BE(-1, this.used);
    this.seal();
    await this.flush();
    const ended = once(this.target, "finish");
    this.target.end();
    await ended;
  }

  private int32Raw(value: number): void {
    this.room(4);
    this.used = this.block.writeInt32BE(value, this.used);
  }

  private bytes(value: Uint8Array): void {
    if (value.byteLength > BLOCK_BYTES / 4) {
      this.seal();
      this.waiting.push(Buffer.from(value.buffer, value.byteOffset, value.byteLength));
      return;
    }
    this.room(value.byteLength);
    this.block.set(value, this.used);
    this.used += value.byteLength;
  }

  private room(bytes: number): void {
    if (this.used + bytes > this.block.length) this.seal();
  }

  private seal(): void {
    if (this.used === 0) return;
    this.waiting.push(this.block.subarray(0, this.used));
    this.block = Buffer.allocUnsafe(BLOCK_BYTES);
    this.used = 0;
  }
}
