"use client";

import dynamic from "next/dynamic";
import type { ReactNode } from "react";
import { InSecondBook, useSecondBook } from "@/components/field-book/compare/second-book";
import type { SecondPassProps } from "@/components/field-book/compare/second-parts";
import { useBookState } from "@/components/field-book/field-book-context";
import type { Classes } from "@/components/field-book/use-classes";

// Few look at two things at once: these come when somebody does.
const CompareBar = dynamic(() =>
  import("@/components/field-book/compare/compare-bar").then((found) => found.CompareBar),
);
const SecondLegend = dynamic(() =>
  import("@/components/field-book/compare/second-parts").then((found) => found.SecondLegend),
);
const SecondPass = dynamic(() =>
  import("@/components/field-book/compare/second-parts").then((found) => found.SecondPass),
);

/** With what is compared; nothing where nothing is. */
export function ComparisonLine() {
  const comparison = useBookState((state) => state.comparison);
  return comparison ? <CompareBar comparison={comparison} /> : null;
}

/** The legend, and next to it that of the other side. */
export function ComparedLegends({ classes, children }: { classes: Classes | null; children: ReactNode }) {
  if (useSecondBook() === null) return children;
  return (
    <div className="grid gap-x-6 gap-y-4 md:grid-cols-2">
      {children}
      <InSecondBook>
        <SecondLegend firstClasses={classes} />
      </InSecondBook>
    </div>
  );
}

/** The unrolled pass, and that of the other side under it, or beside it where passes stand upright. */
export function ComparedPasses({ children, ...props }: SecondPassProps & { children: ReactNode }) {
  if (useSecondBook() === null) return children;
  const isAcross = props.orientation === "across";
  return (
    <div className={isAcross ? "grid h-full min-h-0 grid-rows-2 gap-1" : "grid grid-cols-2 gap-2"}>
      <div className="min-h-0 min-w-0">{children}</div>
      <div className="min-h-0 min-w-0">
        <InSecondBook>
          <SecondPass {...props} />
        </InSecondBook>
      </div>
    </div>
  );
}
