/** Words of the trade, and what somebody says who has never driven a drill. Longer phrases first: each is replaced whole. */
const PLAIN_WORDS: readonly (readonly [RegExp, string])[] = [
  [/ran under the target margin/g, "ran with less weight on the ground than wanted"],
  [/held the target margin/g, "kept the wanted weight on the ground"],
  [/carried more than the target margin/g, "carried more weight on the ground than wanted"],
  [/were under target and at their force limit/g, "had too little weight on the ground and no more force to give"],
  [/in margin\b/g, "in the weight they kept on the ground"],
  [/\bmargin says the wheel was down\b/g, "the readings say that the wheel was down"],
  [/\bcheck margin and depth there\b/g, "check weight and depth there"],
  [/\bits margin sensor\b/g, "its weight sensor"],
  [/\bopener resistance\b/g, "the force that the ground asked for"],
  [/\bapplied force\b/g, "pressing force"],
  [/\btarget margin\b/g, "wanted weight on the ground"],
  [/\bmargin\b/g, "weight on the ground"],
  [/\bgauge wheels\b/g, "depth wheels"],
  [/\bgauge wheel\b/g, "depth wheel"],
  [/\bThe frame\b/g, "The machine"],
  [/\bthe frame's height\b/g, "the height of the machine's frame"],
  [/\bthe frame weighs\b/g, "the machine weighs"],
  [/\bthe frame's wheels\b/g, "the machine's wheels"],
  [/\bthe frame was lifted\b/g, "the machine was lifted"],
  [/\bthe frame is\b/g, "the machine is"],
];

/** A sentence of the verdict for somebody outside the trade. Names in braces and numbers stay as they are. */
export function sayPlainly(text: string): string {
  return PLAIN_WORDS.reduce((said, [word, plain]) => said.replace(word, plain), text);
}
