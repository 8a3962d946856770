import { confidenceWord } from "@/components/columns/column-choice";
import type { Saying } from "@/components/columns/say-meaning";
import { StateMark } from "@/components/ui/state-mark";

/** "Column DF_07_lbf is the downforce of row 7 in pounds-force; 212 lbf here is 943 N." Said anew when it changes. */
export function Sentence({ saying }: { saying: Saying }) {
  return (
    <p aria-live="polite" className="break-words">
      <span className="font-semibold">{saying.subject}</span> {saying.meaning}
      {saying.example ? <span className="text-ink-soft">; {saying.example}</span> : null}.
    </p>
  );
}

/** How sure the reading of a column is, in a word and a shape. */
export function ConfidenceMark({ confidence, seen }: { confidence: number; seen: boolean }) {
  const word = confidenceWord(confidence);
  const text = word === "please check" && seen ? "looked at" : word;
  const state = text === "please check" ? "look" : text === "likely" ? "none" : "fine";
  return (
    <span className="inline-flex items-center gap-1.5">
      <StateMark state={state} />
      <span className={state === "look" ? "font-semibold text-straw-deep" : undefined}>{text}</span>
    </span>
  );
}
