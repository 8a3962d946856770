"use client";

import { FileInput } from "lucide-react";
import { useEffect, useRef, useState } from "react";
import { classNames } from "@/components/ui/class-names";

export interface DropZoneProps {
  /** Words on the zone, such as "Choose a log file". */
  words: string;
  /** Words after them where a mouse can drop something. */
  dropWords?: string;
  hint: string;
  /** File endings for the picker. */
  accept: string;
  onFile: (file: File) => void;
  /** A file let go anywhere on the page counts, not only on the zone. */
  wholePage?: boolean;
  disabled?: boolean;
}

function fileOf(transfer: DataTransfer | null): File | null {
  return transfer?.files[0] ?? null;
}

/** Follows a file dragged over the page. The counter is needed because every child reports its own enter and leave. */
function usePageDrop(enabled: boolean, onFile: (file: File) => void): boolean {
  const [over, setOver] = useState(false);
  const latest = useRef(onFile);
  useEffect(() => {
    latest.current = onFile;
  }, [onFile]);
  useEffect(() => {
    if (!enabled) return;
    let depth = 0;
    const carriesFile = (event: DragEvent) => event.dataTransfer?.types.includes("Files") ?? false;
    const move = (change: number) => (event: DragEvent) => {
      if (!carriesFile(event)) return;
      event.preventDefault();
      depth = Math.max(0, depth + change);
      setOver(depth > 0);
    };
    const drop = (event: DragEvent) => {
      if (!carriesFile(event)) return;
      event.preventDefault();
      depth = 0;
      setOver(false);
      const file = fileOf(event.dataTransfer);
      if (file) latest.current(file);
    };
    const listeners = { dragenter: move(1), dragleave: move(-1), dragover: move(0), drop };
    for (const [name, listener] of Object.entries(listeners)) window.addEventListener(name as "drop", listener);
    return () => {
      for (const [name, listener] of Object.entries(listeners)) window.removeEventListener(name as "drop", listener);
    };
  }, [enabled]);
  return over;
}

/** Drop a file, or press to choose one: on a phone the whole box is the button. */
export function DropZone({
  words,
  dropWords,
  hint,
  accept,
  onFile,
  wholePage = false,
  disabled = false,
}: DropZoneProps) {
  const input = useRef<HTMLInputElement>(null);
  const over = usePageDrop(wholePage && !disabled, onFile);
  return (
    <div
      onDragOver={(event) => event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        const file = fileOf(event.dataTransfer);
        // With `wholePage` the window hears the same drop.
        if (file && !wholePage && !disabled) onFile(file);
      }}
    >
      <button
        type="button"
        disabled={disabled}
        onClick={() => input.current?.click()}
        className={classNames(
          "flex min-h-28 w-full flex-col items-center justify-center gap-1 rounded border border-dashed px-4 py-5 text-center transition-colors disabled:opacity-50",
          over ? "border-slate bg-slate/5" : "border-edge bg-sheet hover:border-ink",
        )}
      >
        <FileInput size={22} strokeWidth={1.5} aria-hidden />
        <span className="font-semibold">
          {over ? "Let go to take it in" : words}
          {dropWords && !over ? <span className="max-md:hidden">{dropWords}</span> : null}
        </span>
        <span className="text-table text-ink-soft">{hint}</span>
      </button>
      <input
        ref={input}
        type="file"
        accept={accept}
        aria-label={words}
        className="sr-only"
        tabIndex={-1}
        onChange={(event) => {
          const file = event.target.files?.[0];
          // Cleared, so that choosing the same file twice asks twice.
          event.target.value = "";
          if (file) onFile(file);
        }}
      />
    </div>
  );
}
