import { channelWords } from "@/lib/ingest/channel-quantities";
import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS, type ReadLog } from "@/lib/ingest/log-format";
import {
  nextCapacity,
  readingRoom,
  takeReadings,
  withReadingRoom,
  withRoom,
} from "@/lib/ingest/records/growing-columns";
import { normaliseHeading } from "@/lib/ingest/records/normalise-heading";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";
import { parseBoolean } from "@/lib/ingest/records/parse-boolean";
import { parseDegrees } from "@/lib/ingest/records/parse-degrees";
import { parseIsoTime } from "@/lib/ingest/records/parse-time";
import { CELL, type ChannelPlan, type ReadPlan } from "@/lib/ingest/records/read-plan";
import { stopAtRejected } from "@/lib/ingest/records/stop-at-rejected";
import { assembleLog } from "@/lib/ingest/records/assemble-log";
import { regroupScattered } from "@/lib/ingest/records/regroup-records";
import { isRowAveraged } from "@/lib/ingest/records/is-row-averaged";
import { neverChanges } from "@/lib/ingest/records/never-changes";

export interface CollectorOptions {
  /** About how many lines of data the file holds, to size the arrays; a wrong guess costs only time. */
  expectedLines: number;
  /** What the file counts in, for messages. */
  place: "line" | "feature" | "record";
}

const LONG_START_RECORDS = 512;

/** Values of one channel while the file is read; `values[record * stride + row - 1]`. */
export interface ChannelStore {
  plan: ChannelPlan;
  values: Float32Array;
}

/**
 * Takes the cells of one line after another and makes a MachineLog of them. A reader fills `line` (numbers in the file's own
 * units, ISO times as milliseconds, booleans as 0 or 1, NaN for nothing) and `texts`, then calls `commit`.
 */
export class RecordCollector {
  /** One value a column of the file, and a NaN at the end for rows that have no column. */
  readonly line: Float64Array;
  readonly texts: string[];
  readonly notes = new NoteBook();
  readonly plan: ReadPlan;
  readonly place: CollectorOptions["place"];
  readonly stores: ChannelStore[];
  records = 0;
  rows: number;
  timeMs: Float64Array;
  longitude: Float64Array;
  latitude: Float64Array;
  heading: Float32Array | null;
  speed: Float32Array | null;
  working: Uint8Array | null;
  pass: Int32Array | null;
  sourceLine: Uint32Array;
  private capacity: number;
  private readonly expectedLines: number;
  private linesTaken = 0;
  private lastLineTaken = 0;
  private linesRejected = 0;
  private lastTimeMs = NaN;
  private latestTimeMs = -Infinity;
  /** Long shape: rows of the record being gathered that already have a reading. */
  private rowsSeen = new Uint8Array(READ_LIMITS.rows + 1);
  private readonly recordKey = new Float64Array(4);
  private recordText = "";

  constructor(plan: ReadPlan, options: CollectorOptions) {
    this.plan = plan;
    this.place = options.place;
    this.line = new Float64Array(plan.columnCount + 1).fill(NaN);
    this.texts = new Array<string>(plan.columnCount).fill("");
    // A long file shows its row count only as it is read: start small, and take the room when the rows are known.
    const expected = plan.row ? LONG_START_RECORDS : options.expectedLines;
    this.expectedLines = options.expectedLines;
    this.capacity = Math.max(16, Math.min(expected, READ_LIMITS.records));
    this.rows = plan.rows;
    const size = this.capacity;
    this.timeMs = new Float64Array(size);
    this.longitude = new Float64Array(size);
    this.latitude = new Float64Array(size);
    this.sourceLine = new Uint32Array(size);
    this.heading = plan.heading && new Float32Array(size);
    this.speed = plan.speed && new Float32Array(size);
    this.pass = plan.pass && new Int32Array(size);
    this.working = plan.working.length > 0 ? new Uint8Array(size) : null;
    this.stores = plan.channels.map((channel) => ({
      plan: channel,
      values: readingRoom(size * this.widthOf(channel)),
    }));
    for (const name of plan.pressures) this.notes.add("pressure-not-force", undefined, name);
    if (plan.working.length > 1) this.notes.add("working-by-row");
  }

  /** Values a record that a channel takes in its store. */
  widthOf(channel: ChannelPlan): number {
    if (!channel.perRow) return 1;
    return this.plan.shape === "long" ? this.rows : channel.fields.length;
  }

  /** kernel: reads a cell given as text by its column's kind. For readers of text. */
  takeText(field: number, text: string, lineNumber: number, decimalComma = false): void {
    const kind = this.plan.kinds[field];
    if (kind === CELL.number) this.line[field] = this.orNote(parseNumber(text, decimalComma), text, field, lineNumber);
    else if (kind === CELL.isoTime) this.line[field] = this.isoTime(text, field, lineNumber);
    else if (kind === CELL.boolean) this.line[field] = this.orNote(parseBoolean(text), text, field, lineNumber);
    else if (kind === CELL.text) this.texts[field] = text;
    else if (kind === CELL.degrees) this.line[field] = this.degrees(text, { field, lineNumber, decimalComma });
  }

  private degrees(
    text: string,
    { field, lineNumber, decimalComma }: { field: number; lineNumber: number; decimalComma: boolean },
  ): number {
    const form = this.plan.degrees.get(field);
    return this.orNote(form ? parseDegrees(text, form, decimalComma) : NaN, text, field, lineNumber);
  }

  private isoTime(text: string, field: number, lineNumber: number): number {
    const time = parseIsoTime(text);
    if (!time) return this.orNote(NaN, text, field, lineNumber);
    if (time.zoned) return time.ms;
    const zone = this.plan.time?.zone;
    if (zone) return zone.toUtcMs(time.ms);
    this.notes.add("time-without-zone", lineNumber);
    return time.ms;
  }

  /** kernel: the value, with a note when a cell that is not blank gave none. */
  private orNote(value: number, text: string, field: number, lineNumber: number): number {
    if (value !== value && !isMissing(text)) this.notes.add("unreadable-value", lineNumber, this.plan.names[field]);
    return value;
  }

  /** Leaves a line out, with a note. */
  rejectLine(code: "ragged-rows" | "bad-row-number", lineNumber: number): void {
    this.linesRejected++;
    this.notes.add(code, lineNumber);
  }

  /** The line just left out as ragged is the last, has too few fields and no line end: the file was cut in it. */
  noteCutLine(lineNumber: number): void {
    if (this.linesTaken === 0) return;
    this.notes.takeBack("ragged-rows");
    this.notes.add("cut-short", lineNumber, String(this.lastLineTaken));
  }

  /** Takes the filled line. Stops with `latitude-out-of-range`, `too-many-records` and the like. */
  commit(lineNumber: number): void {
    this.linesTaken++;
    this.lastLineTaken = lineNumber;
    if (this.plan.missing.length > 0) this.dropMissing(lineNumber);
    if (this.plan.row) this.commitRow(lineNumber, this.plan.row);
    else this.commitRecord(lineNumber);
  }

  /** Numbers that the mapping says stand for "nothing here". */
  private dropMissing(lineNumber: number): void {
    for (const { field, values, channel } of this.plan.missing) {
      if (!values.includes(this.line[field]!)) continue;
      this.line[field] = NaN;
      this.notes.add("sentinel-values", lineNumber, channelWords(channel));
    }
  }

  private commitRecord(lineNumber: number): void {
    const record = this.beginRecord(lineNumber);
    const line = this.line;
    for (const { plan, values } of this.stores) {
      const { fields, factors } = plan;
      const width = fields.length;
      const base = record * width;
      for (let i = 0; i < width; i++) values[base + i] = line[fields[i] ?? 0]! * factors[i]!;
    }
  }

  private commitRow(lineNumber: number, rowPlan: { field: number; firstRow: number }): void {
    const row = this.line[rowPlan.field]! + 1 - rowPlan.firstRow;
    if (!Number.isInteger(row) || row < 1 || row > READ_LIMITS.rows) {
      this.linesTaken--;
      this.rejectLine("bad-row-number", lineNumber);
      return;
    }
    if (row > this.rows) this.widen(row);
    let record = this.records - 1;
    if (record < 0 || this.rowsSeen[row] === 1 || !this.continuesRecord()) {
      record = this.beginRecord(lineNumber);
      this.rowsSeen.fill(0, 0, this.rows + 1);
      this.keepKey();
    } else if (this.working) this.working[record] = Math.max(this.working[record]!, this.isWorking());
    this.rowsSeen[row] = 1;
    for (const { plan, values } of this.stores) {
      const value = this.line[plan.fields[0]!]! * plan.factors[0]!;
      if (plan.perRow) values[record * this.rows + row - 1] = value;
      else if (values[record] !== values[record]) values[record] = value;
    }
  }

  /** Lines of one record follow each other and share time, position and pass. */
  private continuesRecord(): boolean {
    const [time, x, y, pass] = this.recordKey;
    return (
      same(time!, this.keyTime()) &&
      same(x!, this.line[this.plan.position.x.field]!) &&
      same(y!, this.line[this.plan.position.y.field]!) &&
      same(pass!, this.keyPass()) &&
      this.recordText === this.keyText()
    );
  }

  private keepKey(): void {
    this.recordKey[0] = this.keyTime();
    this.recordKey[1] = this.line[this.plan.position.x.field]!;
    this.recordKey[2] = this.line[this.plan.position.y.field]!;
    this.recordKey[3] = this.keyPass();
    this.recordText = this.keyText();
  }

  private keyTime(): number {
    const time = this.plan.time;
    return time?.fromNumber ? this.line[time.fields[0]!]! : NaN;
  }

  private keyPass(): number {
    return this.plan.pass ? this.line[this.plan.pass.field]! : NaN;
  }

  private keyText(): string {
    const time = this.plan.time;
    return time?.fromText ? this.joinedTime(time.fields) : "";
  }

  private joinedTime(fields: readonly number[]): string {
    return fields.length === 1 ? this.texts[fields[0]!]! : fields.map((field) => this.texts[field]!.trim()).join(" ");
  }

  private beginRecord(lineNumber: number): number {
    const record = this.records;
    if (record === this.capacity) this.grow();
    this.sourceLine[record] = lineNumber;
    this.placeRecord(record, lineNumber);
    this.timeMs[record] = this.readTime(lineNumber);
    const line = this.line;
    const { heading, speed, pass } = this.plan;
    if (heading) this.heading![record] = normaliseHeading(line[heading.field]! * heading.factor);
    if (speed) this.speed![record] = line[speed.field]! * speed.factor;
    if (pass) {
      const number = line[pass.field]!;
      this.pass![record] = number === number ? Math.trunc(number) : 0;
    }
    if (this.working) this.working[record] = this.isWorking();
    this.records = record + 1;
    return record;
  }

  private isWorking(): number {
    for (const field of this.plan.working) if (this.line[field]! > 0) return 1;
    return 0;
  }

  private readTime(lineNumber: number): number {
    const time = this.plan.time;
    if (!time) return NaN;
    let ms = NaN;
    if (time.fromNumber) ms = time.fromNumber(this.line[time.fields[0]!]! + this.weekSeconds());
    else if (time.fromText) {
      const text = this.joinedTime(time.fields);
      ms = this.orNote(time.fromText(text), text, time.fields[0]!, lineNumber);
    }
    if (ms !== ms) return ms;
    if (ms === this.lastTimeMs) this.notes.add("duplicate-times", lineNumber);
    else if (ms < this.latestTimeMs) this.notes.add("out-of-order", lineNumber);
    this.lastTimeMs = ms;
    if (ms > this.latestTimeMs) this.latestTimeMs = ms;
    return ms;
  }

  private weekSeconds(): number {
    const week = this.plan.time?.week;
    return week ? (this.line[week.field]! + week.firstWeek) * week.unitsAWeek : 0;
  }

  private placeRecord(record: number, lineNumber: number): void {
    const { x, y, toDegrees } = this.plan.position;
    const rawX = this.line[x.field]!;
    const rawY = this.line[y.field]!;
    let longitude = rawX * x.factor;
    let latitude = rawY * y.factor;
    if (rawX === 0 && rawY === 0) {
      this.notes.add("zero-position", lineNumber);
      longitude = latitude = NaN;
    } else if (toDegrees) [longitude, latitude] = toDegrees(longitude, latitude);
    if (longitude !== longitude || latitude !== latitude) {
      if (rawX !== 0 || rawY !== 0) this.notes.add("no-position", lineNumber);
      longitude = latitude = NaN;
    } else this.checkDegrees(longitude, latitude, lineNumber);
    this.longitude[record] = longitude;
    this.latitude[record] = latitude;
  }

  private checkDegrees(longitude: number, latitude: number, lineNumber: number): void {
    if (latitude > 90 || latitude < -90) {
      const column = this.plan.names[this.plan.position.y.field];
      const message = `On ${this.place} ${lineNumber} the latitude in column '${column ?? ""}' is ${shorten(latitude)}, outside -90 to 90. Longitude and latitude may be swapped: check the two columns.`;
      stopReading("latitude-out-of-range", message, { line: lineNumber, column });
    }
    if (longitude > 180 || longitude < -180) {
      const column = this.plan.names[this.plan.position.x.field];
      const message = `On ${this.place} ${lineNumber} the longitude in column '${column ?? ""}' is ${shorten(longitude)}, outside -180 to 180. Check that the column holds degrees, not metres.`;
      stopReading("longitude-out-of-range", message, { line: lineNumber, column });
    }
  }

  private grow(): void {
    if (this.records >= READ_LIMITS.records) {
      stopReading(
        "too-many-records",
        `The file holds more than ${READ_LIMITS.records.toLocaleString("en-US")} records, the most one log may have. Split it, for example by field or by day.`,
      );
    }
    const expected = this.plan.row ? Math.ceil((this.expectedLines / this.rows) * 1.02) : 0;
    const size = Math.min(Math.max(nextCapacity(this.capacity), expected), READ_LIMITS.records);
    const readings = this.stores.reduce((sum, { plan }) => sum + size * this.widthOf(plan), 0);
    this.checkReadings(readings);
    this.timeMs = withRoom(this.timeMs, size);
    this.longitude = withRoom(this.longitude, size);
    this.latitude = withRoom(this.latitude, size);
    this.sourceLine = withRoom(this.sourceLine, size);
    this.heading &&= withRoom(this.heading, size);
    this.speed &&= withRoom(this.speed, size);
    this.pass &&= withRoom(this.pass, size);
    this.working &&= withRoom(this.working, size);
    for (const store of this.stores) store.values = withReadingRoom(store.values, size * this.widthOf(store.plan));
    this.capacity = size;
  }

  private checkReadings(readings: number): void {
    if (readings <= READ_LIMITS.readings * 1.5) return;
    stopReading(
      "too-many-readings",
      `The file holds more than ${READ_LIMITS.readings.toLocaleString("en-US")} readings, the most one log may have. Split it, or map fewer columns.`,
    );
  }

  /** Long shape: a higher row number than any before makes every record wider. */
  private widen(row: number): void {
    const before = this.rows;
    this.checkReadings(this.capacity * row * this.stores.length);
    for (const store of this.stores) {
      if (!store.plan.perRow) continue;
      const wider = readingRoom(this.capacity * row);
      for (let record = 0; record < this.records; record++) {
        wider.set(store.values.subarray(record * before, (record + 1) * before), record * row);
      }
      store.values = wider;
    }
    this.rows = row;
  }

  /** Ends the file: the log and its notes. Stops with `no-readings` or `ragged-rows`. */
  finish(): ReadLog {
    if (this.linesRejected > this.linesTaken) stopAtRejected(this, [this.linesRejected, this.linesTaken]);
    if (this.records === 0) {
      stopReading(
        "no-readings",
        `The file has a header but no ${this.place} of readings after it. Export the log again.`,
      );
    }
    const assembled = assembleLog(this);
    const log = this.plan.row ? regroupScattered(assembled, this.linesTaken, this.notes) : assembled;
    for (const channel of log.channels) {
      if (isRowAveraged(channel)) this.notes.add("row-averaged", undefined, channel.id);
      if (neverChanges(channel)) this.notes.add("never-changes", undefined, channelWords(channel.id));
    }
    return { log, notes: this.notes.list(this.place) };
  }

  /** Readings of the records there are. Lets go of each long buffer as it goes, to keep the peak low. */
  takeValues(store: ChannelStore): Float32Array {
    const values = takeReadings(store.values, this.records * this.widthOf(store.plan));
    store.values = new Float32Array(0);
    return values;
  }
}

function same(a: number, b: number): boolean {
  return a === b || (a !== a && b !== b);
}

function shorten(value: number): string {
  return String(Number(value.toPrecision(8)));
}
