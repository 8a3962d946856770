import { useId, type InputHTMLAttributes, type ReactNode } from "react";

export interface CheckFieldProps extends Omit<InputHTMLAttributes<HTMLInputElement>, "type"> {
  label: string;
  hint?: ReactNode;
}

/** A box to tick; the whole line is the target. */
export function CheckField({ label, hint, ...rest }: CheckFieldProps) {
  const id = useId();
  return (
    <div className="flex items-start gap-3">
      <input
        id={id}
        type="checkbox"
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="mt-3 h-5 w-5 shrink-0 accent-ink md:mt-2"
        {...rest}
      />
      <div className="flex-1">
        <label htmlFor={id} className="flex min-h-11 items-center md:min-h-9">
          {label}
        </label>
        {hint ? (
          <p id={`${id}-hint`} className="-mt-2 pb-2 text-table text-ink-soft">
            {hint}
          </p>
        ) : null}
      </div>
    </div>
  );
}
