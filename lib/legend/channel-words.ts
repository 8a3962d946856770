/** What a channel is called on screens, and what it says about the ground. */
export interface ChannelWords {
  name: string;
  meaning: string;
}

const KNOWN: Record<string, ChannelWords | undefined> = {
  downforce: { name: "Applied force", meaning: "Force the machine put on each row unit." },
  margin: { name: "Margin", meaning: "Weight left on the gauge wheels: what was to spare before a row came up." },
  contact: { name: "Contact", meaning: "Share of the time the gauge wheels touched the ground." },
  depth: { name: "Depth", meaning: "How deep each row ran." },
  resistance: {
    name: "Opener resistance",
    meaning: "Applied force and row unit weight less margin: what the ground asked for.",
  },
  underTarget: { name: "Under target", meaning: "Where the margin was under target, less what still counts as on it." },
  atLimit: { name: "At the limit", meaning: "Where the force stood at the highest that the machine gives." },
  marginByForce: {
    name: "Margin by force",
    meaning:
      "What margin and applied force say together: where a reading is off target, and on which side the cause lies.",
  },
  rowSpeed: { name: "Row speed", meaning: "Speed of each row over the ground; in a turn the outer rows run faster." },
  speed: { name: "Speed", meaning: "Speed of the machine over the ground, as logged." },
  population: { name: "Population", meaning: "Seeds put in the ground, by area." },
  swathWidth: { name: "Swath width", meaning: "Width of ground worked." },
  yieldFlow: { name: "Grain flow", meaning: "Grain through the machine, by time." },
  yieldMass: { name: "Yield", meaning: "Grain taken off, by area." },
  moisture: { name: "Moisture", meaning: "Water in the grain." },
};

const DEVIATION = "deviation:";

/** Words for any channel, logged or derived. */
export function channelWords(channel: string): ChannelWords {
  if (channel.startsWith(DEVIATION)) {
    const name = channelWords(channel.slice(DEVIATION.length)).name;
    return {
      name: `${name} against the other rows`,
      meaning: "Each reading less the median of the other rows at that moment.",
    };
  }
  return KNOWN[channel] ?? { name: channel.replace(/^other:/, ""), meaning: "As named in the file." };
}

/** What a channel's differences are measured in: a fault of one row shows as its own, whatever the ground did. */
export function deviationOf(channel: string): string {
  return channel.startsWith(DEVIATION) ? channel : `${DEVIATION}${channel}`;
}
