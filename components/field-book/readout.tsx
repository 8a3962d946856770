"use client";

import { saySide } from "@/components/field-book/compare/say-side";
import { useLogsCompared } from "@/components/field-book/compare/second-book";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { trackQuery } from "@/components/field-book/use-log-data";
import { useQuery } from "@tanstack/react-query";
import { flagCodes, type FlagCode } from "@/lib/cleaning/flags";
import { channelWords } from "@/lib/legend/channel-words";
import type { Cursor } from "@/lib/map-state/field-book-store";
import type { PassTrack } from "@/lib/map-state/pass-track";

const FLAG_WORDS: Record<FlagCode, string> = {
  "no-position": "no position",
  "duplicate-time": "time repeated",
  "impossible-step": "impossible jump",
  "not-working": "not working",
  "short-pass": "short pass",
  turning: "turning",
  "standing-still": "standing still",
  "hitch-unsettled": "hitch not yet settled",
  "time-backwards": "time runs backwards",
  "jack-knife": "hitch bent too far",
  reversing: "running backwards",
};

/** One line that always stands in the same place and names the reading pointed at. */
export function Readout({ spoken }: { spoken: boolean }) {
  const cursor = useBookState((state) => state.cursor);
  const side = useSideName();
  return (
    <p
      data-testid="readout"
      aria-live={spoken ? "polite" : "off"}
      className="flex min-h-9 flex-wrap items-center gap-x-4 overflow-hidden text-table text-ink-soft md:h-7 md:min-h-0 md:flex-nowrap md:whitespace-nowrap"
    >
      {cursor ? (
        <ReadingWords cursor={cursor} />
      ) : side !== null ? (
        <span className="font-semibold text-ink">{side}</span>
      ) : (
        <>
          <span className="lg:hidden">Touch the map or the pass to read a value.</span>
          <span className="max-lg:hidden">
            Point at the map or the pass to read a value. Keys: ← → along, ↑ ↓ rows, [ ] passes, Enter keeps a row.
          </span>
        </>
      )}
    </p>
  );
}

/** What this side of a comparison is called; null where nothing is compared. */
function useSideName(): string | null {
  const { log } = useBook();
  const channel = useBookState((state) => state.channel);
  const others = useLogsCompared();
  return others ? saySide(channel, log, others.find(({ id }) => id !== log.id) ?? log) : null;
}

/** Row, value, speed, time and place of a reading, as parts of a line. */
export function ReadingWords({ cursor }: { cursor: Cursor }) {
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const { data: track } = useQuery(trackQuery(logVersion, channel, cursor.pass));
  if (!track || track.channel !== channel) return <span>Reading…</span>;
  return <TrackWords cursor={cursor} track={track} />;
}

function TrackWords({ cursor, track }: { cursor: Cursor; track: PassTrack }) {
  const { log } = useBook();
  const value = useChannelUnits(track.unit, track.channel);
  const speed = useChannelUnits("m/s", "speed");
  const distance = useChannelUnits("m", "distance");
  const flags = flagCodes(track.flags[cursor.record] ?? 0);
  const row = Math.min(cursor.row, track.rows);
  const reading = track.values[cursor.record * track.rows + row - 1] ?? NaN;
  return (
    <>
      <span className="font-semibold text-ink">Row {cursor.row}</span>
      <span>
        {channelWords(track.channel).name}{" "}
        <b className="tabular font-semibold text-ink">{Number.isNaN(reading) ? "not logged" : value.format(reading)}</b>
      </span>
      <span className="tabular">{speed.format(track.speedMps[cursor.record])}</span>
      <span className="tabular">{clockOf(track.timesS[cursor.record] ?? NaN, log.startedAt)}</span>
      <span className="tabular">
        pass {cursor.pass}, {distance.format(track.endsM[cursor.record])} along
      </span>
      {flags.length > 0 ? (
        <span className="text-straw-deep">{flags.map((flag) => FLAG_WORDS[flag]).join(", ")}</span>
      ) : null}
    </>
  );
}

/** Clock time of the reader's own zone, which it names; where the log has no date, seconds since it began. */
export function clockOf(secondsIntoLog: number, startedAt: string | null): string {
  if (Number.isNaN(secondsIntoLog)) return "no time";
  if (startedAt === null) return `${secondsIntoLog.toFixed(1)}\u202fs`;
  return new Date(Date.parse(startedAt) + secondsIntoLog * 1000).toLocaleTimeString("en-GB", { timeZoneName: "short" });
}
