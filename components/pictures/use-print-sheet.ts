"use client";

import { useEffect, useEffectEvent } from "react";
import { flushSync } from "react-dom";
import { isGreyInk, setGreyInk } from "@/components/pictures/grey-ink";
import { usePictures } from "@/components/pictures/picture-context";
import { formatMoment } from "@/components/ui/format-date";

type Builder = typeof import("@/components/pictures/build-print-sheet");

/** Marks the page whose sheet is printed in its place; see globals.css. */
const PRINTING = "has-print-sheet";

export interface PrintWords {
  title: string;
  sentences: readonly string[];
}

/** Prints this page's figures and sentences in grey on a sheet of their own, instead of the screen. */
export function usePrintSheet({ title, sentences }: PrintWords): void {
  const pictures = usePictures();
  const build = useEffectEvent((builder: Builder) => {
    const { source, figures } = pictures ?? {};
    if (!source || !figures) return null;
    const madeAt = formatMoment(new Date().toISOString());
    // The figures are drawn anew in grey before they are traced.
    flushSync(() => setGreyInk(true));
    return builder.buildPrintSheet({ title, sentences, figures: figures.inOrder(), source, madeAt });
  });
  useEffect(() => {
    let builder: Builder | null = null;
    let sheet: HTMLElement | null = null;
    let wasGrey = false;
    // A printer waits for nothing: what builds the sheet is fetched as soon as the page has time.
    const timer = setTimeout(
      () => void import("@/components/pictures/build-print-sheet").then((it) => (builder = it)),
      1500,
    );
    const onBefore = () => {
      wasGrey = isGreyInk();
      sheet ??= builder && build(builder);
      if (!sheet) return;
      document.body.append(sheet);
      document.body.classList.add(PRINTING);
    };
    const onAfter = () => {
      sheet?.remove();
      sheet = null;
      document.body.classList.remove(PRINTING);
      setGreyInk(wasGrey);
    };
    window.addEventListener("beforeprint", onBefore);
    window.addEventListener("afterprint", onAfter);
    return () => {
      clearTimeout(timer);
      onAfter();
      window.removeEventListener("beforeprint", onBefore);
      window.removeEventListener("afterprint", onAfter);
    };
  }, []);
}
