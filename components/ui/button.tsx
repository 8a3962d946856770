import type { ButtonHTMLAttributes, Ref } from "react";
import { classNames } from "@/components/ui/class-names";

export type ButtonKind = "primary" | "plain" | "quiet" | "careful";

const LOOK: Record<ButtonKind, string> = {
  primary: "border border-ink bg-ink text-paper hover:bg-ink-soft hover:border-ink-soft",
  plain: "border border-edge bg-sheet text-ink hover:border-ink",
  quiet: "border border-transparent text-slate hover:border-rule hover:bg-sheet",
  careful: "border border-clay bg-sheet text-clay hover:bg-clay hover:text-paper",
};

/** The classes of a button, for links that should look like one. At least 44 px tall on a phone, 36 on a wide screen. */
export function buttonClass(kind: ButtonKind = "plain", extra?: string): string {
  return classNames(
    "inline-flex min-h-11 items-center justify-center gap-2 rounded px-4 text-text font-semibold no-underline transition-colors",
    "disabled:cursor-not-allowed disabled:opacity-50 aria-disabled:cursor-not-allowed aria-disabled:opacity-50 md:min-h-9 md:px-3",
    LOOK[kind],
    extra,
  );
}

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind;
  ref?: Ref<HTMLButtonElement>;
}

export function Button({ kind = "plain", className, type = "button", ...rest }: ButtonProps) {
  return <button type={type} className={buttonClass(kind, className)} {...rest} />;
}
