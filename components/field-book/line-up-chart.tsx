"use client";

import { useRef } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import {
  colourOf,
  PointedRow,
  RowMark,
  RowNumbers,
  TargetLine,
  ValueAxis,
} from "@/components/field-book/line-up/line-up-marks";
import { plotOf } from "@/components/field-book/line-up/line-up-plot";
import { ScoreStrip, ShareStrips } from "@/components/field-book/line-up/line-up-strips";
import { ToolbarStrip } from "@/components/field-book/line-up/toolbar-strip";
import { useShareStrips, useToolbarLayout } from "@/components/field-book/line-up/use-line-up-layout";
import { useRowKeys } from "@/components/field-book/line-up/use-row-keys";
import type { Classes } from "@/components/field-book/use-classes";
import { useSize } from "@/components/field-book/use-size";
import type { RowStatisticsBody } from "@/lib/schemas/logs";

export interface LineUpChartProps {
  statistics: RowStatisticsBody;
  classes: Classes | null;
}

/**
 * The rows as they stand on the toolbar, left to right looking forward: median, quartiles, 5th to 95th percentile, how far each is
 * from the others, shares of distance, and the toolbar itself.
 */
export function LineUpChart({ statistics, classes }: LineUpChartProps) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const { store } = useBook();
  const selected = useBookState((state) => state.row);
  const { items, wheelTrackRows = [] } = statistics;
  const layout = useToolbarLayout(items.length);
  const shares = useShareStrips(statistics);
  const target = statistics.channel === "margin" ? (classes?.context.targetMarginN ?? null) : null;
  const plot = plotOf(items, { width, height, layout, shares });
  const onKeyDown = useRowKeys(items.length);
  return (
    <div
      ref={box}
      role="listbox"
      tabIndex={0}
      aria-label="Rows from left to right looking forward. Left and right arrows choose a row."
      aria-activedescendant={selected === null ? undefined : `line-up-row-${selected}`}
      onKeyDown={onKeyDown}
      className="relative h-full min-h-0"
    >
      {width > 0 && plot ? (
        <svg width={width} height={height} className="absolute inset-0 block" role="presentation">
          <ValueAxis plot={plot} statistics={statistics} />
          <PointedRow plot={plot} />
          {items.map((item) => (
            <RowMark
              key={item.row}
              item={item}
              plot={plot}
              colour={colourOf(item, classes)}
              selected={item.row === selected}
              onChoose={() => store.getState().chooseRow(item.row)}
            />
          ))}
          {target !== null ? <TargetLine plot={plot} value={target} /> : null}
          <ScoreStrip plot={plot} items={items} />
          <ShareStrips plot={plot} shares={shares} />
          <ToolbarStrip plot={plot} layout={layout} wheelTrackRows={wheelTrackRows} />
          <RowNumbers plot={plot} items={items} selected={selected} />
        </svg>
      ) : null}
    </div>
  );
}
