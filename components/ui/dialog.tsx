"use client";

import { AlertDialog, Dialog as RadixDialog } from "radix-ui";
import type { ReactNode } from "react";
import { buttonClass, type ButtonKind } from "@/components/ui/button";

const VEIL = "fixed inset-0 z-40 bg-[#1E2430]/30";
const SHEET =
  "fixed z-50 max-h-[92dvh] overflow-y-auto border border-rule bg-sheet p-5 inset-x-0 bottom-0 rounded-t md:inset-x-auto md:bottom-auto md:left-1/2 md:top-1/2 md:w-[34rem] md:-translate-x-1/2 md:-translate-y-1/2 md:rounded";

export interface DialogProps {
  title: string;
  description?: string;
  open: boolean;
  onOpenChange: (open: boolean) => void;
  children: ReactNode;
}

/** A sheet over the page: from the bottom on a phone, in the middle on a wide screen. */
export function Dialog({ title, description, open, onOpenChange, children }: DialogProps) {
  return (
    <RadixDialog.Root open={open} onOpenChange={onOpenChange}>
      <RadixDialog.Portal>
        <RadixDialog.Overlay className={VEIL} />
        <RadixDialog.Content className={SHEET} {...(description ? {} : { "aria-describedby": undefined })}>
          <div className="mb-4 flex items-start justify-between gap-4">
            <div>
              <RadixDialog.Title className="text-section">{title}</RadixDialog.Title>
              {description ? (
                <RadixDialog.Description className="text-ink-soft">{description}</RadixDialog.Description>
              ) : null}
            </div>
            <RadixDialog.Close className={buttonClass("quiet", "-mr-2 -mt-2")}>Close</RadixDialog.Close>
          </div>
          {children}
        </RadixDialog.Content>
      </RadixDialog.Portal>
    </RadixDialog.Root>
  );
}

export interface ConfirmDialogProps {
  /** Left out where something else opens it (then `open` and `onOpenChange` are given). */
  trigger?: ReactNode;
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  title: string;
  /** What will happen, what stays, whether it can be undone. */
  children: ReactNode;
  confirmWords: string;
  confirmKind?: ButtonKind;
  onConfirm: () => void;
}

/** Asks before something that cannot be taken back. The safe answer has the focus. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { trigger, title, children, confirmWords, confirmKind, onConfirm } = props;
  return (
    <AlertDialog.Root open={props.open} onOpenChange={props.onOpenChange}>
      {trigger ? <AlertDialog.Trigger asChild>{trigger}</AlertDialog.Trigger> : null}
      <AlertDialog.Portal>
        <AlertDialog.Overlay className={VEIL} />
        <AlertDialog.Content className={SHEET}>
          <AlertDialog.Title className="text-section">{title}</AlertDialog.Title>
          <AlertDialog.Description asChild>
            <div className="mt-2 space-y-2 text-ink-soft">{children}</div>
          </AlertDialog.Description>
          <div className="mt-5 flex flex-wrap justify-end gap-2">
            <AlertDialog.Cancel className={buttonClass("plain")}>Keep it</AlertDialog.Cancel>
            <AlertDialog.Action className={buttonClass(confirmKind ?? "careful")} onClick={onConfirm}>
              {confirmWords}
            </AlertDialog.Action>
          </div>
        </AlertDialog.Content>
      </AlertDialog.Portal>
    </AlertDialog.Root>
  );
}
