import "server-only";
import { AppError } from "@/lib/errors";
import { isChannelShared } from "@/lib/sharing/shared-channels";
import type { OpenedShare } from "@/lib/server/shares/open-share";

/**
 * The log whose tiles of this channel the link may draw. Under a blurred location there are none: a tile's address is
 * a position. @throws AppError `not_found` for anything not shared
 */
export function sharedLogOfChannel({ share }: OpenedShare, channel: string): string {
  const isShown = isChannelShared(share.layers, channel) && !share.blurLocation;
  if (!share.logId || !isShown) throw new AppError("not_found", "This is not among what the link shows.");
  return share.logId;
}
