import { confidenceWord } from "@/components/columns/column-choice";
import { StateMark } from "@/components/ui/state-mark";

/** "Column 'DF_07_lbf' is the downforce of row 7 in pounds-force; 212 lbf here is 943 N." Read out when it changes. */
export function Sentence({ children }: { children: string }) {
  // The file's own names stand out from our words.
  const parts = children.split(/('[^']*')/);
  return (
    <p aria-live="polite" className="break-words">
      {parts.map((part, index) =>
        part.startsWith("'") ? (
          <span key={index} className="font-semibold">
            {part}
          </span>
        ) : (
          part
        ),
      )}
    </p>
  );
}

/** How sure the reading of a column is, in a word and a shape. */
export function ConfidenceMark({ confidence, seen }: { confidence: number; seen: boolean }) {
  const word = confidenceWord(confidence);
  const text = word === "please check" && seen ? "looked at" : word;
  const state = text === "please check" ? "look" : text === "likely" ? "none" : "fine";
  return (
    <span className="inline-flex items-center gap-1.5 align-top">
      <StateMark state={state} />
      <span className={state === "look" ? "font-semibold text-straw-deep" : undefined}>{text}</span>
    </span>
  );
}
