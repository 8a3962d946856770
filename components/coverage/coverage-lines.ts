import type { GroundLayer } from "@/lib/map-state/ground-layers";
import type { CoverageAreas, OverlapCause } from "@/lib/schemas/coverage";
import type { CoverageBody } from "@/lib/schemas/logs";

/** One area of the panel "Ground". */
export interface CoverageLine {
  id: string;
  words: string;
  /** What the words mean, where that is not plain. */
  meaning?: string;
  areaM2: number;
  /** Share of what `shareOf` names; null where there is nothing to share. */
  share: number | null;
  shareOf: "swept" | "covered";
  /** What shows it on the map. */
  layer?: GroundLayer;
  /** A part of the line above. */
  isPart?: boolean;
}

const CAUSE_WORDS: Record<OverlapCause, string> = {
  headland: "with a headland pass",
  "point-row": "where passes end at an angle",
  "guess-row": "between passes side by side",
  other: "elsewhere",
};

function shareOf(areaM2: number, wholeM2: number): number | null {
  return wholeM2 > 0 ? areaM2 / wholeM2 : null;
}

/** The areas of a log in the order a person asks about them. Shares: of what was swept, skips of what was covered. */
export function coverageLines(coverage: CoverageBody): CoverageLine[] {
  const { sweptM2, coveredM2, overlapM2, skippedM2, overlapByCause, skips } = coverage;
  // Logs placed by an earlier build know neither causes nor places.
  const hasPlaces = overlapByCause !== undefined;
  const ofSwept = (areaM2: number) => ({ areaM2, share: shareOf(areaM2, sweptM2), shareOf: "swept" as const });
  const parts = (overlapByCause ?? []).filter(({ areaM2 }) => areaM2 > 0);
  return [
    { id: "swept", words: "Swept", meaning: "Width times way, every pass", ...ofSwept(sweptM2), share: null },
    { id: "covered", words: "Covered", meaning: "Ground under at least one pass", ...ofSwept(coveredM2) },
    {
      id: "overlap",
      words: "Overlapped",
      meaning: "Ground gone over again by another pass",
      ...ofSwept(overlapM2),
      layer: hasPlaces ? "overlap" : undefined,
    },
    ...parts.map(({ cause, areaM2 }) => ({
      id: cause,
      words: CAUSE_WORDS[cause],
      ...ofSwept(areaM2),
      isPart: true,
    })),
    {
      id: "skipped",
      words: "Skipped",
      meaning: skipWords(skips),
      areaM2: skippedM2,
      share: shareOf(skippedM2, coveredM2),
      shareOf: "covered",
      layer: hasPlaces ? "skips" : undefined,
    },
  ];
}

function skipWords(skips: CoverageBody["skips"]): string {
  const bare = "Bare ground closed in by passes";
  if (!skips || skips.count === 0) return bare;
  return `${bare}, in ${skips.count === 1 ? "one place" : `${skips.count} places`}`;
}

/** The areas of a kind among all of a log's. */
export function areasOfKind({ features }: CoverageAreas, kind: "overlap" | "skip"): CoverageAreas {
  return { type: "FeatureCollection", features: features.filter(({ properties }) => properties.kind === kind) };
}
