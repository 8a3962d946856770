"use client";

import { useSecondData } from "@/components/field-book/compare/use-second-data";
import { useLogVersion } from "@/components/field-book/field-book-context";
import { Legend } from "@/components/field-book/legend";
import type { PassOrientation } from "@/components/field-book/pass-scale";
import { UnrolledPass } from "@/components/field-book/unrolled-pass";
import type { Classes } from "@/components/field-book/use-classes";
import { usePasses } from "@/components/field-book/use-log-data";

/** The legend of the second side, with its own readings behind it. Inside the second book. */
export function SecondLegend({ firstClasses }: { firstClasses: Classes | null }) {
  const { classes, unit } = useSecondData(firstClasses);
  return <Legend classes={classes} unit={unit} />;
}

export interface SecondPassProps {
  firstClasses: Classes | null;
  orientation: PassOrientation;
}

const NO_ROWS: number[] = [];

/** The pass of the second side, with the cursor of the first. Inside the second book. */
export function SecondPass({ firstClasses, orientation }: SecondPassProps) {
  const { data: passes = [] } = usePasses(useLogVersion());
  const { classes, track } = useSecondData(firstClasses);
  return (
    <UnrolledPass
      track={track}
      classes={classes}
      passes={passes.map(({ pass }) => pass)}
      flagged={NO_ROWS}
      orientation={orientation}
    />
  );
}
