// The byte scan is one loop on purpose: a GeoJSON log is read a byte at a time, and a call a byte would show.
import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";

const QUOTE = 34;
const BACKSLASH = 92;
const OPEN_BRACE = 123;
const CLOSE_BRACE = 125;
const OPEN_BRACKET = 91;
const CLOSE_BRACKET = 93;
const COLON = 58;

/** Bytes that change where a reader of JSON stands. */
const IS_MARK = new Uint8Array(256);
for (const mark of [QUOTE, OPEN_BRACE, CLOSE_BRACE, OPEN_BRACKET, CLOSE_BRACKET]) IS_MARK[mark] = 1;

/**
 * Cuts a GeoJSON FeatureCollection into the bytes of its features as chunks arrive, whatever the order of its members.
 * Only the current feature is held.
 */
export class FeatureSplitter {
  private depth = 0;
  /** Depth at which features begin; -1 outside the list of features. */
  private featureDepth = -1;
  private inString = false;
  private isEscaped = false;
  /** Bytes of the last string at depth 1, to find the member "features". */
  private key: number[] = [];
  private isFeaturesNext = false;
  private held: Uint8Array[] = [];
  private heldBytes = 0;
  private isInFeature = false;
  /** A member "features" was seen. */
  sawCollection = false;

  /** `sequence`: texts one after another, each given whole, instead of the features of one collection. */
  constructor(kind: "collection" | "sequence" = "collection") {
    if (kind === "sequence") this.featureDepth = 0;
  }

  /** Takes a chunk and gives the bytes of each feature that ends in it. */
  *push(chunk: Uint8Array): Generator<Uint8Array> {
    let at = 0;
    while (at < chunk.length) {
      if (!this.isInFeature) {
        at = this.scanOutside(chunk, at);
        continue;
      }
      const end = this.scanFeature(chunk, at);
      const part = chunk.subarray(at, end);
      at = end;
      if (this.isInFeature) this.hold(part);
      else yield this.release(part);
    }
  }

  /** kernel: from inside a feature to the byte after its end, or to the end of the chunk. */
  private scanFeature(chunk: Uint8Array, start: number): number {
    const { length } = chunk;
    let { depth, inString, isEscaped } = this;
    let at = start;
    while (at < length) {
      let byte = chunk[at]!;
      if (inString) {
        if (isEscaped) {
          isEscaped = false;
          at++;
          continue;
        }
        while (byte !== QUOTE && byte !== BACKSLASH && ++at < length) byte = chunk[at]!;
        if (at === length) break;
        if (byte === BACKSLASH) isEscaped = true;
        else inString = false;
        at++;
        continue;
      }
      while (IS_MARK[byte] === 0 && ++at < length) byte = chunk[at]!;
      if (at === length) break;
      at++;
      if (byte === QUOTE) inString = true;
      else if (byte === OPEN_BRACE || byte === OPEN_BRACKET) depth++;
      else if (--depth === this.featureDepth) {
        this.isInFeature = false;
        break;
      }
    }
    this.depth = depth;
    this.inString = inString;
    this.isEscaped = isEscaped;
    return at;
  }

  /** kernel: from outside any feature to the brace that opens the next, or to the end of the chunk. */
  private scanOutside(chunk: Uint8Array, start: number): number {
    for (let at = start; at < chunk.length; at++) {
      const byte = chunk[at]!;
      if (this.inString) {
        if (this.isEscaped) this.isEscaped = false;
        else if (byte === BACKSLASH) this.isEscaped = true;
        else if (byte === QUOTE) this.inString = false;
        else if (this.depth === 1 && this.key.length < 16) this.key.push(byte);
      } else if (byte === QUOTE) {
        this.inString = true;
        if (this.depth === 1) this.key = [];
      } else if (byte === OPEN_BRACE && this.depth === this.featureDepth) {
        this.isInFeature = true;
        return at;
      } else if (byte === OPEN_BRACE || byte === OPEN_BRACKET) {
        if (byte === OPEN_BRACKET && this.depth === 1 && this.isFeaturesNext) this.openFeatures();
        this.depth++;
        this.isFeaturesNext = false;
      } else if (byte === CLOSE_BRACE || byte === CLOSE_BRACKET) {
        if (--this.depth < this.featureDepth) this.featureDepth = -1;
      } else if (byte === COLON && this.depth === 1) {
        this.isFeaturesNext = String.fromCharCode(...this.key) === "features";
      }
    }
    return chunk.length;
  }

  private openFeatures(): void {
    this.featureDepth = 2;
    this.sawCollection = true;
  }

  /** The rest of a feature begun in an earlier chunk. Chunks may be reused by their source, so they are copied. */
  private hold(part: Uint8Array): void {
    this.held.push(part.slice());
    this.heldBytes += part.length;
    if (this.heldBytes <= READ_LIMITS.lineBytes) return;
    stopReading(
      "line-too-long",
      "One feature is longer than 16 MB. A log has one point a feature: check that the file is a log.",
    );
  }

  private release(last: Uint8Array): Uint8Array {
    if (this.held.length === 0) return last;
    const whole = new Uint8Array(this.heldBytes + last.length);
    let at = 0;
    for (const part of [...this.held, last]) {
      whole.set(part, at);
      at += part.length;
    }
    this.held = [];
    this.heldBytes = 0;
    return whole;
  }

  /** Whether the text ended where JSON may end. */
  get isComplete(): boolean {
    return this.depth === 0 && !this.inString;
  }
}
