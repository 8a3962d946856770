import { classNames } from "@/components/ui/class-names";

export type MarkState = "fine" | "look" | "act" | "none";

/**
 * The shape of a state: a tick, a ring, a filled square, a dash. Shape first, colour second, so it reads in grey.
 * Hidden from screen readers: the word beside it carries the meaning.
 */
export function StateMark({ state, className }: { state: MarkState; className?: string }) {
  return (
    <svg viewBox="0 0 14 14" width="14" height="14" aria-hidden="true" className={classNames("shrink-0", className)}>
      {state === "fine" ? <path d="M2 7.5 5.5 11 12 3.5" fill="none" stroke="#1E2430" strokeWidth="2" /> : null}
      {state === "look" ? <circle cx="7" cy="7" r="5" fill="none" stroke="#C29A45" strokeWidth="2.5" /> : null}
      {state === "act" ? <rect x="2" y="2" width="10" height="10" fill="#9A4A2C" /> : null}
      {state === "none" ? <path d="M3 7h8" stroke="#6B7280" strokeWidth="2" /> : null}
    </svg>
  );
}

/** A state in a word with its shape. */
export function StateWord({ state, children }: { state: MarkState; children: string }) {
  return (
    <span
      className={classNames(
        "inline-flex items-center gap-2",
        state === "act" && "text-clay",
        state === "look" && "text-straw-deep",
      )}
    >
      <StateMark state={state} />
      {children}
    </span>
  );
}
