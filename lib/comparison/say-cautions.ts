import type { LogToCompare } from "@/lib/comparison/log-to-compare";
import type { ComparedSide } from "@/lib/comparison/compared-side";

interface Sayable {
  log: LogToCompare;
  side: ComparedSide;
}

/** Fewer blocks than this are a sign rather than a proof. */
const FEW_BLOCKS = 20;

/** What else than the change of set-up may have made the difference, the weightiest first. */
export function sayCautions(before: Sayable, after: Sayable): string[] {
  return [sayGround(before, after), sayMachine(before, after), sayTarget(before, after), sayFew(before, after)].filter(
    (caution) => caution !== null,
  );
}

/** One log before and one after is one trial without a repeat: the ground and the day changed with the set-up. */
function sayGround({ log: before }: Sayable, { log: after }: Sayable): string {
  const where = before.fieldId === after.fieldId ? "the same field" : "another field";
  return `The second log is from ${where} at another time: ground, moisture and the weight of the seed changed with the set-up. A difference of all rows together can be theirs; only strips with and without the change, side by side, would tell. A row that changed beyond the others is harder to put down to them.`;
}

function sayMachine({ side: before }: Sayable, { side: after }: Sayable): string | null {
  const [first, second] = [before.from.placed.machine, after.from.placed.machine];
  if (!first || !second) return "Nobody has said which machine made one of the logs.";
  const isSame = first.rowCount === second.rowCount && first.rowSpacingM === second.rowSpacingM;
  return isSame ? null : "The two logs come from machines with other rows.";
}

function sayTarget({ side: before }: Sayable, { side: after }: Sayable): string | null {
  if (before.from.channel.id !== "margin") return null;
  const targets = [before, after].map(({ from }) => from.placed.machine?.targetMarginN ?? null);
  const bands = [before, after].map(({ from }) => from.placed.machine?.marginDeadbandN ?? 0);
  if (targets[0] === targets[1] && bands[0] === bands[1]) return null;
  return "The machines had other target margins: shares under target are each by their own.";
}

function sayFew(...both: Sayable[]): string | null {
  const few = both.filter(({ side }) => side.rows.drawn !== null && side.rows.blocks.blocks < FEW_BLOCKS);
  if (few.length === 0) return null;
  const counts = few.map(({ log, side }) => `${log.name} has ${side.rows.blocks.blocks}`).join(" and ");
  return `${counts} passes that count on their own; below ${FEW_BLOCKS}, take an interval as a sign, not as a proof.`;
}
