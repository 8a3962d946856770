/** What is known of a logged channel without its readings. */
interface KnownChannel {
  id: string;
  unit: string;
  perRow: boolean;
}

/** What the machine was set to; null or absent where nobody said. */
type Settings = {
  [Key in "targetMarginN" | "marginDeadbandN" | "maxDownforceN"]?: number | null;
};

/** Which of the masks and cross classes a log gives, by its channels and its machine's settings. */
export function givenClasses(
  channels: readonly KnownChannel[],
  { targetMarginN, marginDeadbandN, maxDownforceN }: Settings,
): ("underTarget" | "atLimit" | "marginByForce")[] {
  const has = (id: string) => channels.some((one) => one.id === id && one.unit === "N" && one.perRow);
  const hasTarget = typeof targetMarginN === "number" && has("margin");
  const hasLimit = typeof maxDownforceN === "number" && has("downforce");
  return [
    ...(hasTarget ? (["underTarget"] as const) : []),
    ...(hasLimit ? (["atLimit"] as const) : []),
    ...(hasTarget && hasLimit && typeof marginDeadbandN === "number" ? (["marginByForce"] as const) : []),
  ];
}
