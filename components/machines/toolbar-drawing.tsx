import type { Machine } from "@/lib/machines/machine";

const WIDTH = 360;
const HEIGHT = 190;
const PAD = 22;

interface Point {
  xM: number;
  /** Ahead of the line of rows positive. */
  yM: number;
}

interface Layout {
  rows: Point[];
  antenna: Point | null;
  hitch: Point | null;
  /** Widths drawn as bars: header, spread. */
  bars: { widthM: number; yM: number; word: string }[];
}

/** A form may be half filled in: what is missing is not drawn. */
export type DraftMachine = { kind: Machine["kind"] } & { [Key in string]?: unknown };

function numberOf(value: unknown): number | null {
  return typeof value === "number" && Number.isFinite(value) ? value : null;
}

function listOf(value: unknown): number[] | null {
  return Array.isArray(value) && value.every((entry) => numberOf(entry) !== null) ? (value as number[]) : null;
}

function placeRows(machine: DraftMachine): Point[] {
  const count = Math.min(256, Math.max(0, Math.floor(numberOf(machine.rowCount) ?? 0)));
  const spacing = numberOf(machine.rowSpacingM) ?? 0;
  const offsets = listOf(machine.rowOffsetsM);
  const forward = listOf(machine.rowForwardM);
  return Array.from({ length: count }, (_, index) => ({
    xM: offsets?.[index] ?? (index - (count - 1) / 2) * spacing,
    yM: forward?.[index] ?? 0,
  }));
}

/** Where everything stands on the machine, seen from above. */
export function layoutMachine(machine: DraftMachine): Layout {
  if (machine.kind === "combine") {
    const header = numberOf(machine.headerWidthM);
    const spread = numberOf(machine.spreadWidthM);
    const bars = [
      ...(header === null ? [] : [{ widthM: header, yM: 3, word: "header" }]),
      ...(spread === null ? [] : [{ widthM: spread, yM: -3, word: "spread" }]),
    ];
    return { rows: [], antenna: null, hitch: null, bars };
  }
  const isTrailed = machine.hitch === "trailed";
  const hitchAhead = isTrailed ? numberOf(machine.hitchToRowsM) : null;
  const pinBehind = numberOf(machine.antennaToHitchM);
  const antennaAhead =
    isTrailed && hitchAhead !== null && pinBehind !== null ? hitchAhead + pinBehind : numberOf(machine.antennaToRowsM);
  return {
    rows: placeRows(machine),
    antenna: antennaAhead === null ? null : { xM: numberOf(machine.antennaRightM) ?? 0, yM: antennaAhead },
    hitch: hitchAhead === null ? null : { xM: 0, yM: hitchAhead },
    bars: [],
  };
}

function createScale(layout: Layout): (point: Point) => { x: number; y: number } {
  const points = [
    ...layout.rows,
    ...(layout.antenna ? [layout.antenna] : []),
    ...(layout.hitch ? [layout.hitch] : []),
    { xM: 0, yM: 0 },
  ];
  for (const bar of layout.bars) points.push({ xM: bar.widthM / 2, yM: bar.yM }, { xM: -bar.widthM / 2, yM: bar.yM });
  const half = Math.max(1, ...points.map((point) => Math.abs(point.xM)));
  const top = Math.max(1, ...points.map((point) => point.yM));
  const bottom = Math.min(0, ...points.map((point) => point.yM));
  const scale = Math.min((WIDTH / 2 - PAD) / half, (HEIGHT - 2 * PAD - 24) / (top - bottom));
  const height = (top - bottom) * scale;
  const start = (HEIGHT - 14 - height) / 2 + 4;
  return (point) => ({ x: WIDTH / 2 + point.xM * scale, y: start + (top - point.yM) * scale });
}

/** The machine from above, travelling up the page: rows, antenna, hitch. Drawn from what is filled in so far. */
export function ToolbarDrawing({ machine, label }: { machine: DraftMachine; label: string }) {
  const layout = layoutMachine(machine);
  const place = createScale(layout);
  const [first, last] = [layout.rows[0], layout.rows.at(-1)];
  const centre = place({ xM: 0, yM: 0 });
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      role="img"
      aria-label={label}
      className="w-full"
      fontSize="11"
      fill="#4A5261"
    >
      <path d="M16 34V14m-4 5 4-5 4 5" fill="none" stroke="#6B7280" />
      <text x="26" y="26">
        travel
      </text>
      {layout.rows.length === 0 && layout.bars.length === 0 ? (
        <text x={WIDTH / 2} y={HEIGHT / 2} textAnchor="middle" fontSize="13">
          It is drawn here as you describe it.
        </text>
      ) : null}
      {first && last ? <RowMarks rows={layout.rows} place={place} /> : null}
      {layout.hitch ? <Drawbar from={place(layout.hitch)} to={centre} /> : null}
      {layout.antenna ? <Antenna at={place(layout.antenna)} /> : null}
      {layout.bars.map((bar) => {
        const left = place({ xM: -bar.widthM / 2, yM: bar.yM });
        const right = place({ xM: bar.widthM / 2, yM: bar.yM });
        return (
          <g key={bar.word}>
            <path
              d={`M${left.x} ${left.y}H${right.x}`}
              stroke="#1E2430"
              strokeWidth="3"
              strokeDasharray={bar.word === "spread" ? "3 4" : undefined}
            />
            <text x={WIDTH / 2} y={left.y + 16} textAnchor="middle">
              {bar.word}
            </text>
          </g>
        );
      })}
      {layout.bars.length > 0 ? (
        <rect
          x={WIDTH / 2 - 14}
          y={HEIGHT / 2 - 26}
          width="28"
          height="40"
          rx="2"
          fill="none"
          stroke="#1E2430"
          strokeWidth="1.5"
        />
      ) : null}
    </svg>
  );
}

type Place = (point: Point) => { x: number; y: number };

function RowMarks({ rows, place }: { rows: Point[]; place: Place }) {
  const marks = rows.map(place);
  const [first, last] = [marks[0], marks.at(-1)];
  if (!first || !last) return null;
  return (
    <g>
      <path d={`M${first.x} ${place({ xM: 0, yM: 0 }).y - 5}H${last.x}`} stroke="#1E2430" strokeWidth="2.5" />
      {marks.map((mark, index) => (
        <path
          key={index}
          d={`M${mark.x} ${mark.y - 4}v10`}
          stroke="#7D5A14"
          strokeWidth={marks.length > 80 ? 0.8 : 1.6}
        />
      ))}
      <text x={first.x} y={first.y + 19} textAnchor="middle">
        1
      </text>
      {marks.length > 1 ? (
        <text x={last.x} y={last.y + 19} textAnchor="middle">
          {marks.length}
        </text>
      ) : null}
    </g>
  );
}

function Drawbar({ from, to }: { from: { x: number; y: number }; to: { x: number; y: number } }) {
  return (
    <g>
      <path d={`M${from.x} ${from.y}L${to.x} ${to.y - 5}`} stroke="#1E2430" strokeWidth="1.5" />
      <circle cx={from.x} cy={from.y} r="3.5" fill="#FFFFFF" stroke="#1E2430" strokeWidth="1.5" />
      <text x={from.x + 8} y={from.y + 4}>
        hitch pin
      </text>
    </g>
  );
}

function Antenna({ at }: { at: { x: number; y: number } }) {
  return (
    <g>
      <path d={`M${at.x - 5} ${at.y + 4}L${at.x} ${at.y - 5}L${at.x + 5} ${at.y + 4}Z`} fill="#2F5D80" />
      <text x={at.x + 9} y={at.y + 4}>
        antenna
      </text>
    </g>
  );
}
