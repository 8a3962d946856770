"use client";

import { Link2 } from "lucide-react";
import { useState } from "react";
import { useBook } from "@/components/field-book/field-book-context";
import { addressOf } from "@/components/field-book/use-address";

/** Long enough to be read. */
const SHOWN_MS = 4000;

/** Copies an address that shows the same thing to whoever may see the field. */
export function CopyLink() {
  const { store, log } = useBook();
  const [words, setWords] = useState("");
  const say = (text: string) => {
    setWords(text);
    setTimeout(() => setWords(""), SHOWN_MS);
  };
  const copy = () => {
    const address = addressOf(store, log.id);
    window.history.replaceState(window.history.state, "", address);
    // The clipboard is missing on a page that came without encryption.
    Promise.resolve()
      .then(() => navigator.clipboard.writeText(window.location.origin + address))
      .then(
        () => say("Link copied."),
        () => say("Copy it from the address bar."),
      );
  };
  return (
    <span className="relative">
      <button
        type="button"
        aria-label="Copy link"
        title="Copy a link to this view"
        onClick={copy}
        className="grid size-11 shrink-0 place-items-center rounded border border-edge bg-sheet hover:border-ink md:size-8"
      >
        <Link2 size={16} aria-hidden />
      </button>
      <span
        role="status"
        className={
          words
            ? "absolute right-0 top-full z-20 mt-1 whitespace-nowrap border border-edge bg-sheet px-2 text-table"
            : "sr-only"
        }
      >
        {words}
      </span>
    </span>
  );
}
