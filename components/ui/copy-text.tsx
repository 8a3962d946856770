"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";

/** A text shown once, to be copied. Where the clipboard is barred the text is selected instead. */
export function CopyText({ text, label }: { text: string; label: string }) {
  const [state, setState] = useState<"idle" | "copied" | "select">("idle");
  const copy = () => {
    navigator.clipboard.writeText(text).then(
      () => setState("copied"),
      () => setState("select"),
    );
  };
  return (
    <div className="flex flex-wrap items-stretch gap-2">
      <textarea
        readOnly
        rows={1}
        aria-label={label}
        value={text}
        onFocus={(event) => event.target.select()}
        className="tabular min-h-11 min-w-0 flex-1 basis-96 resize-none break-all rounded border border-edge bg-paper px-3 py-2 [field-sizing:content] md:min-h-9 md:py-1.5"
      />
      <Button onClick={copy}>Copy</Button>
      <span role="status" className="self-center text-table text-ink-soft">
        {state === "copied" ? "Copied." : state === "select" ? "Press and hold the text to copy it." : ""}
      </span>
    </div>
  );
}
