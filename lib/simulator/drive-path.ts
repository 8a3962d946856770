/** A stretch of the path of one point of the machine: a straight, or an arc where `curvaturePerM` (right positive) is not 0. */
export interface PathSegment {
  eastM: number;
  northM: number;
  headingRad: number;
  lengthM: number;
  curvaturePerM: number;
  /** Pass number while the implement is down, 0 while it is lifted. */
  pass: number;
  /** Seconds without records before this segment (driving to another part of the field). */
  pauseBeforeS: number;
}

export interface PathPoint {
  eastM: number;
  northM: number;
  headingRad: number;
}

/** The point `distanceM` along a segment; exact for straights and arcs. */
export function pointOnSegment(segment: PathSegment, distanceM: number): PathPoint {
  const { eastM, northM, headingRad, curvaturePerM } = segment;
  if (curvaturePerM === 0) {
    return {
      eastM: eastM + distanceM * Math.sin(headingRad),
      northM: northM + distanceM * Math.cos(headingRad),
      headingRad,
    };
  }
  const turned = headingRad + curvaturePerM * distanceM;
  return {
    eastM: eastM + (Math.cos(headingRad) - Math.cos(turned)) / curvaturePerM,
    northM: northM + (Math.sin(turned) - Math.sin(headingRad)) / curvaturePerM,
    headingRad: turned,
  };
}

/** Grows a path piece by piece, each beginning where the one before ended. */
export class PathBuilder {
  readonly segments: PathSegment[] = [];
  private end: PathPoint = { eastM: 0, northM: 0, headingRad: 0 };
  private pauseS = 0;

  /** Goes on from another place after `pauseS` seconds without records. */
  moveTo(start: PathPoint, pauseS: number): void {
    this.end = start;
    this.pauseS = pauseS;
  }

  /** A straight (curvature 0) or an arc; lengths of 0 or less are left out. */
  add(lengthM: number, curvaturePerM: number, pass: number): void {
    if (lengthM <= 1e-9) return;
    const segment: PathSegment = { ...this.end, lengthM, curvaturePerM, pass, pauseBeforeS: this.pauseS };
    this.segments.push(segment);
    this.end = pointOnSegment(segment, lengthM);
    this.pauseS = 0;
  }

  /** Lifted turn to a parallel line `spacingM` to the right (`side` 1) or left (-1), ending beside where it began. */
  addTurnBack(spacingM: number, radiusM: number, side: 1 | -1): void {
    const curvature = side / radiusM;
    if (spacingM >= 2 * radiusM) {
      this.add((Math.PI / 2) * radiusM, curvature, 0);
      this.add(spacingM - 2 * radiusM, 0, 0);
      this.add((Math.PI / 2) * radiusM, curvature, 0);
      return;
    }
    // Lines nearer than a full turn: swing out first, then round (three tangent circles of one radius).
    const swing = Math.acos((spacingM / 2 + radiusM) / (2 * radiusM));
    this.add(swing * radiusM, -curvature, 0);
    this.add((Math.PI + 2 * swing) * radiusM, curvature, 0);
    this.add(swing * radiusM, -curvature, 0);
  }
}
