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

/**
 * Cuts a GeoJSON FeatureCollection into the bytes of its features as chunks arrive, whatever the order of its members.
 * Only the current feature is held.
 */
export class FeatureSplitter {
  /** Depth outside the features; features begin at `featureDepth`. */
  private depth = 0;
  private featureDepth = -1;
  private inString = false;
  private isEscaped = false;
  /** Text of the last string at depth 1, to find the member "features". */
  private key: number[] = [];
  private isFeaturesNext = false;
  private held: Uint8Array[] = [];
  private heldBytes = 0;
  private isInFeature = false;
  /** A member "features" was seen. */
  sawCollection = false;

  /** kernel: takes a chunk and gives the bytes of each feature that ends in it. */
  *push(chunk: Uint8Array): Generator<Uint8Array> {
    let start = 0;
    for (let i = 0; i < chunk.length; i++) {
      const byte = chunk[i]!;
      if (this.inString) {
        if (this.isEscaped) this.isEscaped = false;
        else if (byte === BACKSLASH) this.isEscaped = true;
        else if (byte === QUOTE) this.inString = false;
        else if (this.depth === 1 && !this.isInFeature && this.key.length < 16) this.key.push(byte);
        continue;
      }
      if (byte === QUOTE) {
        this.inString = true;
        if (this.depth === 1 && !this.isInFeature) this.key = [];
      } else if (byte === OPEN_BRACE || byte === OPEN_BRACKET) {
        if (byte === OPEN_BRACKET && this.depth === 1 && this.isFeaturesNext) this.openFeatures();
        else if (byte === OPEN_BRACE && this.depth === this.featureDepth && !this.isInFeature) {
          this.isInFeature = true;
          start = i;
        }
        this.depth++;
        this.isFeaturesNext = false;
      } else if (byte === CLOSE_BRACE || byte === CLOSE_BRACKET) {
        this.depth--;
        if (this.isInFeature && this.depth === this.featureDepth) {
          this.isInFeature = false;
          yield this.release(chunk.subarray(start, i + 1));
        } else if (this.featureDepth > this.depth) this.featureDepth = -1;
      } else if (byte === COLON && this.depth === 1 && !this.isInFeature) {
        this.isFeaturesNext = String.fromCharCode(...this.key) === "features";
      }
    }
    if (this.isInFeature) this.hold(chunk.subarray(start));
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
