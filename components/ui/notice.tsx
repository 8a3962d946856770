import type { ReactNode } from "react";
import { StateMark, type MarkState } from "@/components/ui/state-mark";
import { classNames } from "@/components/ui/class-names";

export interface NoticeProps {
  state: MarkState;
  title?: string;
  children?: ReactNode;
  /** Read out at once when it appears (a failure the person must know about). */
  urgent?: boolean;
  className?: string;
}

/** Something the person should read, in place: shape, words, what to do next. */
export function Notice({ state, title, children, urgent = false, className }: NoticeProps) {
  return (
    <div
      role={urgent ? "alert" : undefined}
      className={classNames("flex gap-3 border-l-2 bg-sheet px-4 py-3", EDGE[state], className)}
    >
      <StateMark state={state} className="mt-1" />
      <div className="min-w-0 space-y-1 break-words">
        {title ? <p className="font-semibold">{title}</p> : null}
        {children ? <div className="text-ink-soft">{children}</div> : null}
      </div>
    </div>
  );
}

const EDGE: Record<MarkState, string> = {
  fine: "border-ink",
  look: "border-straw",
  act: "border-clay",
  none: "border-rule",
};
