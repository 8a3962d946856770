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
  /** At least one; never more than one without `multiple`. */
  onFiles: (files: File[]) => void;
  multiple?: boolean;
  /** A file let go anywhere on the page counts, not only on the zone. */
  wholePage?: boolean;
  disabled?: boolean;
}

/** Calls `onFiles` with what was given, if anything was: all of it, or the first. */
function handOver(given: FileList | null | undefined, multiple: boolean, onFiles: (files: File[]) => void): void {
  const files = [...(given ?? [])].slice(0, multiple ? undefined : 1);
  if (files.length > 0) onFiles(files);
}

/** Follows a file dragged over the page. The counter is needed because every child reports its own enter and leave. */
function usePageDrop(enabled: boolean, onDrop: (files: FileList | undefined) => void): boolean {
  const [over, setOver] = useState(false);
  const latest = useRef(onDrop);
  useEffect(() => {
    latest.current = onDrop;
  }, [onDrop]);
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
      latest.current(event.dataTransfer?.files);
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
  onFiles,
  multiple = false,
  wholePage = false,
  disabled = false,
}: DropZoneProps) {
  const input = useRef<HTMLInputElement>(null);
  const over = usePageDrop(wholePage && !disabled, (files) => handOver(files, multiple, onFiles));
  return (
    <div
      onDragOver={(event) => event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        // With `wholePage` the window hears the same drop.
        if (!wholePage && !disabled) handOver(event.dataTransfer.files, multiple, onFiles);
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
        multiple={multiple}
        aria-label={words}
        hidden
        onChange={(event) => {
          const input = event.target;
          handOver(input.files, multiple, onFiles);
          // Cleared, so that choosing the same file twice asks twice.
          input.value = "";
        }}
      />
    </div>
  );
}
