import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Seeder } from "@/lib/machines/machine";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { rowDistances } from "@/lib/rows/row-distances";
import { makeLog, makeSeeder, straightTrack, type MadeLog, type MadeRecord } from "@/tests/support/make-log";

export function onGround(made: MadeLog, channelId: string, machine: Partial<Seeder> = {}): ChannelOnGround {
  return placeOnGround(makeLog(made), makeSeeder({ rowCount: made.rows ?? 4, ...machine }), channelId);
}

export function placeOnGround(log: MachineLog, machine: Seeder, channelId: string): ChannelOnGround {
  const built = buildLog(log, machine);
  if (!built.ok) throw new Error(built.error.message);
  const { placed } = built.value;
  const channel = resolveChannel(placed, channelId);
  if (!channel) throw new Error(`no ${channelId}`);
  return { placed, channel, distances: rowDistances(placed) };
}

/** Straight passes side by side, driven there and back by turns; pass numbers as logged. */
export function backAndForth(passes: number, records: number, stepM = 0.5): MadeRecord[] {
  return Array.from({ length: passes }, (_, p) => {
    const isOut = p % 2 === 0;
    const lengthM = (records - 1) * stepM;
    const track = straightTrack({
      from: [p * 6, isOut ? 0 : lengthM],
      headingDeg: isOut ? 0 : 180,
      records,
      stepM,
      startS: p * 1000,
    });
    return track.map((record) => ({ ...record, pass: p + 1, working: true }));
  }).flat();
}
