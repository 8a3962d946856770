import {
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from "react";
import { StateMark } from "@/components/ui/state-mark";
import { classNames } from "@/components/ui/class-names";

const BOX =
  "w-full min-h-11 rounded border border-edge bg-sheet px-3 py-2 text-text text-ink hover:border-ink-soft md:min-h-9 md:py-1.5 aria-[invalid=true]:border-clay disabled:bg-paper disabled:text-ink-faint";

interface Surround {
  label: string;
  /** What to enter and where to find it; stays visible while typing. */
  hint?: ReactNode;
  error?: string;
  /** Written inside the box at its end, such as "mm". */
  unit?: string;
  className?: string;
}

interface FrameProps extends Surround {
  id: string;
  children: ReactNode;
}

function FieldFrame({ id, label, hint, error, unit, className, children }: FrameProps) {
  return (
    <div className={classNames("space-y-1", className)}>
      <label htmlFor={id} className="block font-semibold">
        {label}
      </label>
      <div className="relative">
        {children}
        {unit ? (
          <span
            aria-hidden="true"
            className="pointer-events-none absolute inset-y-0 right-3 flex items-center text-table text-ink-soft"
          >
            {unit}
          </span>
        ) : null}
      </div>
      {error ? (
        <p id={`${id}-error`} className="flex items-start gap-2 text-clay">
          <StateMark state="act" className="mt-1" />
          <span>{error}</span>
        </p>
      ) : null}
      {hint ? (
        <p id={`${id}-hint`} className="text-table text-ink-soft">
          {hint}
        </p>
      ) : null}
    </div>
  );
}

function describedBy(id: string, { hint, error }: Surround): string | undefined {
  return classNames(error && `${id}-error`, hint ? `${id}-hint` : false) || undefined;
}

export type TextFieldProps = Surround & InputHTMLAttributes<HTMLInputElement>;

/** A labelled line of text or a number. */
export function TextField({ label, hint, error, unit, className, id, ...rest }: TextFieldProps) {
  const made = useId();
  const fieldId = id ?? made;
  const frame = { label, hint, error, unit, className };
  return (
    <FieldFrame id={fieldId} {...frame}>
      <input
        id={fieldId}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(fieldId, frame)}
        className={classNames(BOX, unit && "pr-12", rest.inputMode === "decimal" && "tabular")}
        {...rest}
      />
    </FieldFrame>
  );
}

export type TextAreaProps = Surround & TextareaHTMLAttributes<HTMLTextAreaElement>;

export function TextArea({ label, hint, error, className, id, ...rest }: TextAreaProps) {
  const made = useId();
  const fieldId = id ?? made;
  const frame = { label, hint, error, className };
  return (
    <FieldFrame id={fieldId} {...frame}>
      <textarea
        id={fieldId}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(fieldId, frame)}
        className={BOX}
        {...rest}
      />
    </FieldFrame>
  );
}

export type SelectFieldProps = Surround & SelectHTMLAttributes<HTMLSelectElement>;

/** A choice from a list. The platform's own control: on a phone it opens the large native picker. */
export function SelectField({ label, hint, error, className, id, children, ...rest }: SelectFieldProps) {
  const made = useId();
  const fieldId = id ?? made;
  const frame = { label, hint, error, className };
  return (
    <FieldFrame id={fieldId} {...frame}>
      <select
        id={fieldId}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(fieldId, frame)}
        className={BOX}
        {...rest}
      >
        {children}
      </select>
    </FieldFrame>
  );
}
