import { compareDirections, comparePlaces, compareSpeeds } from "@/lib/pass-figures/compare-passes";
import { compareTurns } from "@/lib/pass-figures/compare-turns";
import { describePass } from "@/lib/pass-figures/describe-pass";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import type { PassStatisticsBody } from "@/lib/schemas/pass-figures";

/** One channel pass by pass, and by the way, the place, the speed and the side of the turn it was driven. */
export function passStatistics(from: ChannelOnGround): PassStatisticsBody {
  return {
    channel: from.channel.id,
    unit: from.channel.unit,
    items: from.placed.passes.map((pass) => describePass(from, pass)),
    comparisons: [compareDirections(from), comparePlaces(from), compareSpeeds(from), compareTurns(from)],
  };
}
