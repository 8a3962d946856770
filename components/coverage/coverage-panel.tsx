"use client";

import { ChevronRight } from "lucide-react";
import { useState } from "react";
import { areasOfKind, coverageLines, type CoverageLine } from "@/components/coverage/coverage-lines";
import { useCoverage, useCoverageAreas, useSwaths } from "@/components/coverage/use-coverage";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { Button } from "@/components/ui/button";
import { CheckField } from "@/components/ui/check-field";
import { classNames } from "@/components/ui/class-names";
import { Quantity } from "@/components/units/quantity";
import { useUnits } from "@/components/units/use-units";
import { describeFailure } from "@/lib/api/api-problem";
import type { GroundLayer } from "@/lib/map-state/ground-layers";
import type { CoverageAreas } from "@/lib/schemas/coverage";
import type { CoverageBody } from "@/lib/schemas/logs";
import { formatQuantity } from "@/lib/units/format-quantity";

/** How much ground a log went over, how much of it twice, what it left out; folded until somebody asks. */
export function CoveragePanel() {
  const { logVersion } = useBook();
  const coverage = useCoverage(logVersion);
  const { format } = useUnits();
  const [isOpen, setOpen] = useState(false);
  const areas = useCoverageAreas(logVersion, isOpen && coverage.data?.overlapByCause !== undefined);
  const lines = coverage.data ? coverageLines(coverage.data) : [];
  const isDrawn = (layer: GroundLayer) => hasPieces(layer, coverage.data, areas.data);
  return (
    <details className="group px-4 py-2" data-testid="coverage" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="flex min-h-11 items-center gap-1 md:min-h-8">
        <ChevronRight size={16} aria-hidden className="shrink-0 text-slate [details[open]_&]:rotate-90" />
        <h2 className="text-section">Ground</h2>
        <span className="ml-2 text-table text-ink-soft">
          {coverage.data ? `${format(coverage.data.coveredM2, "m2")} covered` : ""}
        </span>
      </summary>
      {coverage.isPending ? (
        <p role="status" className="py-2 text-ink-soft">
          Measuring the ground…
        </p>
      ) : null}
      {coverage.isError ? (
        <p role="alert" className="py-2 text-ink-soft">
          The areas could not be fetched. Check the connection and reload the page.
        </p>
      ) : null}
      {coverage.data ? (
        <>
          <CoverageTable lines={lines} isDrawn={isDrawn} />
          <LayerSwitches isDrawn={isDrawn} />
          <p className="pb-2 text-table text-ink-soft">
            Measured on a grid of {format(coverage.data.resolutionM, "m", "rowSpacing")}.
          </p>
        </>
      ) : null}
    </details>
  );
}

/** Whether a layer has a piece large enough to be drawn; true as long as nobody knows. */
function hasPieces(layer: GroundLayer, coverage: CoverageBody | undefined, areas: CoverageAreas | undefined): boolean {
  if (layer === "swaths") return true;
  if (layer === "skips") return coverage?.skips?.count !== 0;
  return areas === undefined || areasOfKind(areas, "overlap").features.length > 0;
}

interface DrawnProps {
  /** False: there is ground of this kind, but no piece of it is large enough to be drawn. */
  isDrawn: (layer: GroundLayer) => boolean;
}

function CoverageTable({ lines, isDrawn }: DrawnProps & { lines: CoverageLine[] }) {
  return (
    <table className="tabular w-full border-collapse text-table">
      <caption className="sr-only">Areas of this log</caption>
      <thead className="sr-only">
        <tr>
          <th scope="col">What</th>
          <th scope="col">Area and share</th>
          <th scope="col">Map</th>
        </tr>
      </thead>
      <tbody>
        {lines.map((line) => (
          <tr key={line.id} className="border-b border-rule">
            <th scope="row" className={classNames("py-1.5 text-left font-normal", line.isPart && "pl-4")}>
              <span className={classNames(!line.isPart && "font-semibold")}>{line.words}</span>
              {line.meaning ? <span className="block text-ink-soft">{line.meaning}</span> : null}
              {line.layer && line.areaM2 > 0 && !isDrawn(line.layer) ? (
                <span className="block text-ink-soft">Only slivers, too thin to draw.</span>
              ) : null}
            </th>
            <td className="px-2 py-1.5 text-right align-top">
              <Quantity value={line.areaM2} unit="m2" />
              <span className="block whitespace-nowrap text-ink-soft">{shareWords(line)}</span>
            </td>
            <td className="py-0.5 pl-2 text-right align-top">
              {line.layer && line.areaM2 > 0 && isDrawn(line.layer) ? (
                <LayerButton layer={line.layer} name={line.words} />
              ) : null}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function shareWords({ share, shareOf }: CoverageLine): string {
  if (share === null) return "";
  return `${formatQuantity(share, "fraction", "metric", { decimals: 1 }).text} of ${shareOf}`;
}

function LayerButton({ layer, name }: { layer: GroundLayer; name: string }) {
  const { store } = useBook();
  const isShown = useBookState((state) => state.ground.includes(layer));
  return (
    <Button
      kind="quiet"
      className="px-2 text-table"
      aria-pressed={isShown}
      aria-label={`${isShown ? "Hide" : "Show"} on the map: ${name}`}
      onClick={() => store.getState().toggleGround(layer)}
    >
      {isShown ? "Hide" : "Show"}
    </Button>
  );
}

/** What is shown on the map, and word of what is on its way to it. */
function LayerSwitches({ isDrawn }: DrawnProps) {
  const { store, logVersion } = useBook();
  const ground = useBookState((state) => state.ground);
  const swaths = useSwaths(logVersion, ground.includes("swaths"));
  const areas = useCoverageAreas(logVersion, ground.includes("overlap") || ground.includes("skips"));
  const isWaiting = swaths.isFetching || areas.isFetching;
  return (
    <div>
      <CheckField
        label="Outline each pass on the map"
        checked={ground.includes("swaths")}
        onChange={() => store.getState().toggleGround("swaths")}
      />
      <p role="status" className="text-table text-ink-soft">
        {isWaiting ? "Drawing the ground…" : groundWords(ground.filter(isDrawn))}
      </p>
      {swaths.isError || areas.isError ? (
        <p role="alert" className="text-table text-clay">
          This could not be drawn: {describeFailure(swaths.error ?? areas.error)}
        </p>
      ) : null}
    </div>
  );
}

/** The key to what lies on the map. */
function groundWords(ground: readonly GroundLayer[]): string {
  const words = [
    ground.includes("overlap") ? "Overlapped ground is hatched." : "",
    ground.includes("skips") ? "Skipped ground has a thick outline." : "",
  ];
  return words.filter((sentence) => sentence !== "").join(" ");
}
