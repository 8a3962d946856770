import { estimateDelay } from "@/lib/alignment/estimate-delay";
import { sayMethod, sayRefusal } from "@/lib/alignment/say-delay";
import { resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { unpackPlacedLog } from "@/lib/logs/packed-placed-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { findMirroredRows } from "@/lib/rows/find-mirrored-rows";
import type { LookResults, LookTask } from "@/lib/server/alignment/look-task";
import { StoredDelay } from "@/lib/server/alignment/stored-look";

/** Works out what was asked; runs in a looking thread. */
export function doLookTask(task: LookTask): LookResults[LookTask["kind"]] {
  const placed = unpackPlacedLog(task.packed);
  return task.kind === "delay" ? describeDelay(placed, task.channel) : findMirroredRows(placed, task.boundary);
}

function describeDelay(placed: PlacedLog, id: string): StoredDelay {
  const channel = resolveChannelOrReason(placed, id);
  if (!channel.ok) throw new Error(channel.error);
  const estimate = estimateDelay(placed, channel.value);
  const { refusal, ...told } = estimate;
  const refused = refusal === null ? {} : { reasonCode: refusal, reason: sayRefusal(estimate) };
  // The schema keeps what the API tells and lets go of what only the method's words are made from.
  return StoredDelay.parse({
    channel: id,
    unit: channel.value.unit,
    ...told,
    ...refused,
    method: sayMethod(estimate),
  });
}
