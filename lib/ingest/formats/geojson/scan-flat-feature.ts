// Reads the common feature straight from its bytes: JSON.parse spends two thirds of its time on objects that are thrown away.
import type { PropertyPath } from "@/lib/ingest/formats/geojson/flatten-properties";
import { TEN_TO } from "@/lib/ingest/records/parse-number";
import { CELL } from "@/lib/ingest/records/read-plan";
import type { RecordCollector } from "@/lib/ingest/records/record-collector";

const QUOTE = 34;
const COMMA = 44;
const MINUS = 45;
const POINT = 46;
const ZERO = 48;
const NINE = 57;
const COLON = 58;
const BACKSLASH = 92;
const OPEN_BRACKET = 91;
const CLOSE_BRACKET = 93;
const OPEN_BRACE = 123;
const CLOSE_BRACE = 125;

interface FlatColumn {
  key: Uint8Array;
  /** Place in the line; -1 where the mapping does not use it. */
  field: number;
  kind: number;
}

/** Thrown away and caught at once: the feature is not of the common kind. */
const UNCOMMON = Symbol("uncommon");

/**
 * Reader of point features whose properties are numbers, short texts, true, false and null, in any order (fastest in the order
 * of the first feature). `read` fills the collector's line and returns true, or returns false where JSON.parse must look at
 * the feature: nested values, escapes, other geometries, anything that is not plain JSON.
 */
export class FlatFeatureReader {
  private readonly columns: FlatColumn[];
  private readonly placeOfKey: Map<string, number>;
  private readonly collector: RecordCollector;
  private readonly decoder = new TextDecoder("utf-8");
  private bytes = new Uint8Array(0);
  private at = 0;
  /** Cells to be read as texts, kept until the whole feature is known to be common, so that notes are made once. */
  private readonly textFields: number[] = [];
  private readonly textCells: string[] = [];

  constructor(collector: RecordCollector, paths: readonly PropertyPath[]) {
    const encoder = new TextEncoder();
    this.collector = collector;
    this.columns = paths.map((path, index) => {
      const kind = collector.plan.kinds[index + 2] ?? CELL.skip;
      return { key: encoder.encode(path.key), field: kind === CELL.skip ? -1 : index + 2, kind };
    });
    this.placeOfKey = new Map(paths.map((path, index) => [path.key, index]));
  }

  read(bytes: Uint8Array, featureNumber: number): boolean {
    this.bytes = bytes as Uint8Array<ArrayBuffer>;
    this.at = 0;
    this.textFields.length = 0;
    this.textCells.length = 0;
    this.collector.line.fill(NaN);
    this.collector.texts.fill("");
    try {
      let hasGeometry = false;
      this.readObject((key) => {
        if (key === "geometry") hasGeometry = this.readGeometry();
        else if (key === "properties") this.readProperties();
        else this.skipScalar();
      });
      if (hasGeometry) this.takeTexts(featureNumber);
      return hasGeometry;
    } catch (error) {
      if (error === UNCOMMON) return false;
      throw error;
    }
  }

  private takeTexts(featureNumber: number): void {
    this.textFields.forEach((field, i) => this.collector.takeText(field, this.textCells[i] ?? "", featureNumber));
  }

  private keepText(field: number, text: string): void {
    if (field < 0) return;
    this.textFields.push(field);
    this.textCells.push(text);
  }

  private readObject(member: (key: string) => void): void {
    this.expect(OPEN_BRACE);
    if (this.peek() === CLOSE_BRACE) throw UNCOMMON;
    for (;;) {
      const key = this.readString();
      this.expect(COLON);
      member(key);
      const next = this.peek();
      this.at++;
      if (next === CLOSE_BRACE) return;
      if (next !== COMMA) throw UNCOMMON;
    }
  }

  private readGeometry(): boolean {
    let isPoint = false;
    let hasPosition = false;
    this.readObject((key) => {
      if (key === "type") isPoint = this.readString() === "Point";
      else if (key === "coordinates") hasPosition = this.readPosition();
      else throw UNCOMMON;
    });
    return isPoint && hasPosition;
  }

  private readPosition(): boolean {
    const { line } = this.collector;
    this.expect(OPEN_BRACKET);
    for (let i = 0; ; i++) {
      this.peek();
      const value = this.readNumber();
      if (i < 2) line[i] = value;
      const next = this.peek();
      this.at++;
      if (next === CLOSE_BRACKET) return i >= 1;
      if (next !== COMMA) throw UNCOMMON;
    }
  }

  private readProperties(): void {
    this.expect(OPEN_BRACE);
    if (this.peek() === CLOSE_BRACE) {
      this.at++;
      return;
    }
    let expected = 0;
    for (;;) {
      const place = this.readKey(expected);
      this.expect(COLON);
      this.readValue(this.columns[place]);
      expected = place + 1;
      const next = this.peek();
      this.at++;
      if (next === CLOSE_BRACE) return;
      if (next !== COMMA) throw UNCOMMON;
    }
  }

  /** kernel: the place of the column that a key names, trying the expected one first; -1 for a key not seen before. */
  private readKey(expected: number): number {
    if (this.peek() !== QUOTE) throw UNCOMMON;
    const key = this.columns[expected]?.key;
    if (key !== undefined) {
      const { bytes } = this;
      const start = this.at + 1;
      let i = 0;
      while (i < key.length && bytes[start + i] === key[i]) i++;
      if (i === key.length && bytes[start + i] === QUOTE) {
        this.at = start + i + 1;
        return expected;
      }
    }
    return this.placeOfKey.get(this.readString()) ?? -1;
  }

  private readValue(column: FlatColumn | undefined): void {
    const byte = this.peek();
    const field = column?.field ?? -1;
    if (byte === MINUS || (byte >= ZERO && byte <= NINE)) {
      const value = this.readNumber();
      if (column?.kind === CELL.number) this.collector.line[field] = value;
      else this.keepText(field, String(value));
      return;
    }
    this.keepText(field, byte === QUOTE ? this.readString() : this.readWord());
  }

  private skipScalar(): void {
    const byte = this.peek();
    if (byte === QUOTE) this.readString();
    else if (byte === MINUS || (byte >= ZERO && byte <= NINE)) this.readNumber();
    else this.readWord();
  }

  /** `true` and `false` as texts, `null` as a blank. */
  private readWord(): string {
    for (const word of ["null", "true", "false"]) {
      let i = 0;
      while (i < word.length && this.bytes[this.at + i] === word.charCodeAt(i)) i++;
      if (i < word.length) continue;
      this.at += i;
      return word === "null" ? "" : word;
    }
    throw UNCOMMON;
  }

  private readString(): string {
    const { bytes } = this;
    if (this.peek() !== QUOTE) throw UNCOMMON;
    const start = ++this.at;
    let byte = bytes[this.at] ?? 0;
    while (byte !== QUOTE) {
      // Escapes, and control characters that JSON forbids, are for JSON.parse.
      if (byte === BACKSLASH || byte < 32) throw UNCOMMON;
      byte = bytes[++this.at] ?? 0;
    }
    return this.decoder.decode(bytes.subarray(start, this.at++));
  }

  /** kernel: a JSON number of up to 15 digits, exactly; longer ones and exponents by Number(). */
  private readNumber(): number {
    const { bytes } = this;
    const start = this.at;
    let at = start;
    let byte = bytes[at] ?? 0;
    if (byte === MINUS) byte = bytes[++at] ?? 0;
    const first = at;
    let mantissa = 0;
    while (byte >= ZERO && byte <= NINE) {
      mantissa = mantissa * 10 + (byte - ZERO);
      byte = bytes[++at] ?? 0;
    }
    const whole = at - first;
    if (whole === 0 || (whole > 1 && bytes[first] === ZERO)) throw UNCOMMON;
    let decimals = 0;
    if (byte === POINT) {
      const mark = ++at;
      byte = bytes[at] ?? 0;
      while (byte >= ZERO && byte <= NINE) {
        mantissa = mantissa * 10 + (byte - ZERO);
        byte = bytes[++at] ?? 0;
      }
      decimals = at - mark;
      if (decimals === 0) throw UNCOMMON;
    }
    // Exponents and long numbers are rare; the whole feature goes to JSON.parse.
    if (byte === 101 || byte === 69 || whole + decimals > 15) throw UNCOMMON;
    this.at = at;
    const value = mantissa / TEN_TO[decimals]!;
    return first > start ? -value : value;
  }

  /** Passes over white space and gives the byte there; 0 at the end. */
  private peek(): number {
    const { bytes } = this;
    let byte = bytes[this.at] ?? 0;
    while (byte === 32 || byte === 10 || byte === 13 || byte === 9) byte = bytes[++this.at] ?? 0;
    return byte;
  }

  private expect(mark: number): void {
    if (this.peek() !== mark) throw UNCOMMON;
    this.at++;
  }
}
