/** Layers that are channels of a log, and so have tiles. */
const CHANNEL_LAYERS = ["downforce", "margin", "depth", "resistance"];

/** Whether this channel is one of the shared layers. */
export function isChannelShared(layers: readonly string[], channelId: string): boolean {
  return CHANNEL_LAYERS.includes(channelId) && layers.includes(channelId);
}
