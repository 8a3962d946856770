"use client";

import { useId, useState, type ReactNode } from "react";
import { Button } from "@/components/ui/button";

export interface TableSheetProps {
  title: string;
  /** Tab-separated text, for pasting into a sheet. */
  text: () => string;
  onClose: () => void;
  children: ReactNode;
}

/** Tables that lie over the map until they are closed, with a way to copy them. */
export function TableSheet({ title, text, onClose, children }: TableSheetProps) {
  const id = useId();
  const [copied, setCopied] = useState(false);
  const copy = () => {
    navigator.clipboard.writeText(text()).then(
      () => setCopied(true),
      () => setCopied(false),
    );
  };
  return (
    <section aria-labelledby={id} className="relative h-full overflow-auto bg-paper px-4 py-3">
      <div className="mb-2 flex flex-wrap items-center justify-between gap-2">
        <h2 id={id} className="text-section">
          {title}
        </h2>
        <div className="flex items-center gap-2">
          <span role="status" className="text-table text-ink-soft">
            {copied ? "Copied." : ""}
          </span>
          <Button onClick={copy}>Copy</Button>
          <Button onClick={onClose}>Close the table</Button>
        </div>
      </div>
      {children}
    </section>
  );
}
