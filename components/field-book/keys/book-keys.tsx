"use client";

import { Keyboard } from "lucide-react";
import dynamic from "next/dynamic";
import { useState } from "react";
import { useBookKeys } from "@/components/field-book/keys/use-book-keys";

const KeyMap = dynamic(() => import("@/components/field-book/keys/key-map").then((found) => found.KeyMap));

/** Listens for the page's keys, and shows all of them on request. The button is for those who do not know the key. */
export function BookKeys() {
  const [isShown, setShown] = useState(false);
  useBookKeys(() => setShown(true));
  return (
    <>
      <button
        type="button"
        aria-label="Keys"
        title="Keys (?)"
        onClick={() => setShown(true)}
        className="hidden size-8 shrink-0 place-items-center rounded border border-edge bg-sheet hover:border-ink lg:grid"
      >
        <Keyboard size={16} aria-hidden />
      </button>
      {isShown ? <KeyMap onClose={() => setShown(false)} /> : null}
    </>
  );
}
