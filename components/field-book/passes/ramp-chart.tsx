"use client";

import { extent } from "d3-array";
import { useRef, useState, type KeyboardEvent } from "react";
import { ValueAxis } from "@/components/field-book/passes/value-axis";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import type { RampMetre, RampsBody } from "@/lib/schemas/pass-figures";

const LEFT_PX = 46;
const TOP_PX = 16;
const FOOT_PX = 32;
/** Between the start of the passes and their end. */
const GAP_PX = 22;

interface RampPlot {
  yOf: (value: number) => number;
  /** Pixels of a place so many metres from the start, or before the end. */
  xOf: { start: (metres: number) => number; end: (metres: number) => number };
  floor: number;
}

/** What the first and the last metres of all passes read less the middle of the same pass, with intervals. Arrows walk over the metres. */
export function RampChart({ ramps }: { ramps: RampsBody }) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const units = useChannelUnits(ramps.unit, ramps.channel);
  const distance = useChannelUnits("m", "distance");
  const [at, setAt] = useState(0);
  const { reachM, start, end } = ramps;
  const all = [...start.metres, ...end.metres];
  const [low = 0, high = 0] = extent([
    0,
    ...all.flatMap(({ difference, interval }) => [difference, ...(interval ?? [])]).filter((value) => value !== null),
  ]);
  const margin = (high - low || 1) * 0.08;
  const floor = height - FOOT_PX;
  const half = (width - LEFT_PX - GAP_PX - 6) / 2;
  const plot: RampPlot = {
    floor,
    yOf: (value) => TOP_PX + ((high + margin - value) / (high - low + 2 * margin)) * (floor - TOP_PX),
    xOf: {
      start: (metres) => LEFT_PX + (metres / reachM) * half,
      end: (metres) => LEFT_PX + GAP_PX + 2 * half - (metres / reachM) * half,
    },
  };
  const steps = 2 * reachM;
  const isStart = at < reachM;
  const metre = isStart ? start.metres[at] : end.metres[steps - 1 - at];
  const words = metre ? metreWords(metre, isStart ? "from the start" : "before the end", { units, distance }) : "";
  const onKeyDown = (event: KeyboardEvent) => {
    const to = { ArrowLeft: at - 1, ArrowRight: at + 1, Home: 0, End: steps - 1 }[event.key];
    if (to === undefined) return;
    event.preventDefault();
    setAt(Math.min(steps - 1, Math.max(0, to)));
  };
  const cursorX = isStart ? plot.xOf.start(at + 0.5) : plot.xOf.end(steps - at - 0.5);
  return (
    <div className="flex h-full min-h-0 flex-col">
      <div
        ref={box}
        role="slider"
        tabIndex={0}
        aria-label="Starts and ends of passes, metre by metre"
        aria-valuemin={1}
        aria-valuemax={steps}
        aria-valuenow={at + 1}
        aria-valuetext={words}
        onKeyDown={onKeyDown}
        onPointerMove={(event) => {
          const x = event.clientX - event.currentTarget.getBoundingClientRect().left;
          const share =
            x < LEFT_PX + half + GAP_PX / 2 ? (x - LEFT_PX) / half : 1 + (x - LEFT_PX - half - GAP_PX) / half;
          setAt(Math.min(steps - 1, Math.max(0, Math.floor(share * reachM))));
        }}
        className="relative min-h-0 flex-1"
      >
        {width > 0 && height > 0 ? (
          <svg width={width} height={height} className="absolute inset-0 block" role="presentation">
            <text x={0} y={10} fontSize={11} fill="#4A5261">
              {units.symbol ? `${units.symbol} from the middle of the pass` : "from the middle of the pass"}
            </text>
            <ValueAxis
              low={low - margin}
              high={high + margin}
              units={units}
              yOf={plot.yOf}
              left={LEFT_PX}
              right={width}
            />
            <line x1={LEFT_PX} x2={width} y1={plot.yOf(0)} y2={plot.yOf(0)} stroke="#8C8778" />
            <Side metres={start.metres} xOf={plot.xOf.start} plot={plot} settledAtM={start.settledAtM} />
            <Side metres={end.metres} xOf={plot.xOf.end} plot={plot} settledAtM={null} />
            <DistanceAxis plot={plot} reachM={reachM} />
            <line x1={cursorX} x2={cursorX} y1={TOP_PX} y2={floor} stroke="#2F5D80" strokeWidth={1.5} />
          </svg>
        ) : null}
      </div>
      <p className="min-h-9 text-table text-ink-soft">{words}</p>
    </div>
  );
}

interface Formats {
  units: { format: (value: number | null) => string };
  distance: { format: (value: number) => string };
}

/** "2 m to 3 m from the start: −38 N (−45 N to −30 N), 41 passes". */
function metreWords({ fromM, difference, interval, passes }: RampMetre, where: string, { units, distance }: Formats) {
  const between = interval ? ` (${units.format(interval[0])} to ${units.format(interval[1])})` : "";
  const count = `${passes} ${passes === 1 ? "pass" : "passes"}`;
  return `${distance.format(fromM)} to ${distance.format(fromM + 1)} ${where}: ${units.format(difference)}${between}, ${count}`;
}

interface SideProps {
  metres: readonly RampMetre[];
  xOf: (metres: number) => number;
  plot: RampPlot;
  settledAtM: number | null;
}

function Side({ metres, xOf, plot, settledAtM }: SideProps) {
  const known = metres.filter((metre) => metre.difference !== null);
  const line = known.map((metre) => `${xOf(metre.fromM + 0.5)} ${plot.yOf(metre.difference!)}`).join("L");
  const banded = known.filter((metre) => metre.interval !== null);
  const upper = banded.map((metre) => `${xOf(metre.fromM + 0.5)} ${plot.yOf(metre.interval![1])}`);
  const lower = banded.map((metre) => `${xOf(metre.fromM + 0.5)} ${plot.yOf(metre.interval![0])}`).reverse();
  return (
    <g>
      {banded.length > 1 ? (
        <path d={`M${[...upper, ...lower].join("L")}Z`} fill="#C29A45" fillOpacity={0.35} data-testid="ramp-interval" />
      ) : null}
      {line ? <path d={`M${line}`} fill="none" stroke="#1E2430" strokeWidth={2} data-testid="ramp-line" /> : null}
      {settledAtM !== null && settledAtM > 0 ? (
        <line
          x1={xOf(settledAtM)}
          x2={xOf(settledAtM)}
          y1={TOP_PX}
          y2={plot.floor}
          stroke="#7D5A14"
          strokeDasharray="4 3"
          data-testid="ramp-settled"
        />
      ) : null}
    </g>
  );
}

/** Metres from the start at the left, before the end at the right, in the person's unit. */
function DistanceAxis({ plot, reachM }: { plot: RampPlot; reachM: number }) {
  const { factor, symbol } = useChannelUnits("m", "distance");
  const every = [5, 10, 20, 50].find((step) => reachM / factor / step <= 4) ?? 100;
  const marks = Array.from({ length: Math.floor(reachM / factor / every) + 1 }, (_, index) => index * every);
  return (
    <g className="tabular" fontSize={11} fill="#4A5261" textAnchor="middle">
      {marks.flatMap((mark) => [
        <text key={`start ${mark}`} x={plot.xOf.start(mark * factor)} y={plot.floor + 13}>
          {mark}
        </text>,
        <text key={`end ${mark}`} x={plot.xOf.end(mark * factor)} y={plot.floor + 13}>
          {mark}
        </text>,
      ])}
      <text x={plot.xOf.start(reachM / 2)} y={plot.floor + 28}>{`${symbol} from the start`}</text>
      <text x={plot.xOf.end(reachM / 2)} y={plot.floor + 28}>{`${symbol} before the end`}</text>
    </g>
  );
}
