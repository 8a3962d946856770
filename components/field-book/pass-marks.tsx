"use client";

import { useBookState } from "@/components/field-book/field-book-context";
import { boxOf, type Box, type PassScale } from "@/components/field-book/pass-scale";
import { recordSpanM, type PassTrack } from "@/lib/map-state/pass-track";
import { recordAtMoment } from "@/lib/map-state/work-clock";

/** What lies over the picture of a pass: brushed stretch, selected row, crosshair and the cell pointed at. */
export function PassMarks({ track, scale }: { track: PassTrack; scale: PassScale }) {
  const row = useBookState((state) => state.row);
  const stretch = useBookState((state) => (state.stretch?.pass === track.pass ? state.stretch : null));
  const cursor = useBookState((state) => (state.cursor?.pass === track.pass ? state.cursor : null));
  const timeS = useBookState((state) => state.timeS);
  const workedM = timeS === null ? track.lengthM : workedLengthM(track, timeS);
  const whole: [number, number] = [0, track.lengthM];
  const allRows: [number, number] = [1, track.rows];
  return (
    <svg className="pointer-events-none absolute inset-0 size-full overflow-visible" aria-hidden="true">
      {workedM < track.lengthM ? (
        <rect {...boxOf(scale, allRows, [workedM, track.lengthM])} fill="#FFFFFF" data-testid="pass-veil" />
      ) : null}
      {stretch ? (
        <Outline box={boxOf(scale, allRows, [stretch.fromM, stretch.toM])} fill="#2F5D80" fillOpacity={0.18} />
      ) : null}
      {row !== null && row <= track.rows ? <Outline box={boxOf(scale, [row, row], whole)} grow={1} /> : null}
      {cursor && cursor.record < track.records ? (
        <>
          <Hair box={boxOf(scale, allRows, recordSpanM(track, cursor.record))} orientation={scale.orientation} />
          <Outline
            box={boxOf(scale, [cursor.row, cursor.row], recordSpanM(track, cursor.record))}
            grow={1.5}
            stroke="#1E2430"
          />
        </>
      ) : null}
    </svg>
  );
}

/** How far along the pass the machine was at a moment. */
function workedLengthM(track: PassTrack, timeS: number): number {
  const record = recordAtMoment(track.timesS, timeS);
  return record < 0 ? 0 : recordSpanM(track, record)[1];
}

interface OutlineProps {
  box: Box;
  /** Pixels the line stands outside the box. */
  grow?: number;
  stroke?: string;
  fill?: string;
  fillOpacity?: number;
}

/** Two lines, white under colour, so that it shows on any ramp. */
function Outline({ box, grow = 0, stroke = "#2F5D80", fill = "none", fillOpacity }: OutlineProps) {
  const place = {
    x: box.x - grow,
    y: box.y - grow,
    width: Math.max(1, box.width + 2 * grow),
    height: Math.max(1, box.height + 2 * grow),
  };
  return (
    <>
      <rect {...place} fill="none" stroke="#FFFFFF" strokeWidth={4} />
      <rect {...place} fill={fill} fillOpacity={fillOpacity} stroke={stroke} strokeWidth={2} />
    </>
  );
}

/** The line through all rows at the moment pointed at. */
function Hair({ box, orientation }: { box: Box; orientation: PassScale["orientation"] }) {
  const x = box.x + box.width / 2;
  const y = box.y + box.height / 2;
  const line =
    orientation === "across"
      ? { x1: x, x2: x, y1: box.y - 4, y2: box.y + box.height + 4 }
      : { x1: box.x - 4, x2: box.x + box.width + 4, y1: y, y2: y };
  return (
    <>
      <line {...line} stroke="#FFFFFF" strokeWidth={3} opacity={0.8} />
      <line {...line} stroke="#1E2430" strokeWidth={1} />
    </>
  );
}
