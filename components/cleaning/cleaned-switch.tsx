"use client";

import { ToggleGroup } from "radix-ui";
import { useBook, useBookState } from "@/components/field-book/field-book-context";

const ITEM =
  "min-h-11 px-2 text-table text-ink-soft hover:text-ink data-[state=on]:font-semibold data-[state=on]:text-ink data-[state=on]:underline md:min-h-7";

/** One quiet line where a log's rules change what is shown: everything with them, or everything as it was read. */
export function CleanedSwitch() {
  const { store, log } = useBook();
  const cleaned = useBookState((state) => state.cleaned);
  if ((log.revision ?? 0) === 0) return null;
  return (
    <div className="flex flex-wrap items-center gap-x-1 text-table text-ink-soft">
      <span>Shown:</span>
      <ToggleGroup.Root
        type="single"
        aria-label="Readings shown"
        value={cleaned ? "cleaned" : "as-logged"}
        onValueChange={(value) => value && store.getState().setCleaned(value === "cleaned")}
      >
        <ToggleGroup.Item value="cleaned" className={ITEM}>
          with cleaning rules
        </ToggleGroup.Item>
        <span aria-hidden="true">·</span>
        <ToggleGroup.Item value="as-logged" className={ITEM}>
          as logged
        </ToggleGroup.Item>
      </ToggleGroup.Root>
    </div>
  );
}
