import type { BoundaryPoint } from './refine-boundary';

/** What the doubt about a boundary is made of, for a whole photo. */
export interface DoubtSources {
  /** How far page points may be off through camera and lens, mm (one standard deviation). */
  readonly cameraMm: number;
  /** How far the thickness given may be off, mm. */
  readonly thicknessMm: number;
  /** Share by which the print may be off scale, and the size it acts over, mm. */
  readonly printShare: number;
  readonly sizeMm: number;
  /** How far a shadow at the foot can draw the edge, mm. */
  readonly shadowMm: number;
}

export interface Doubt {
  /** Half-width of the band that holds 95 % of such edges, mm. */
  readonly halfWidthMm: number;
  readonly largest: 'camera' | 'thickness' | 'print' | 'shadow' | 'edge';
}

/** Two standard deviations, near enough, hold 95 %. */
const COVERAGE = 2;
/** No edge of board or sheet is straighter or sharper than this, mm. */
const LEAST_EDGE_MM = 0.02;
/** How far a faint edge may be off, mm. */
const FAINT_EDGE_MM = 0.15;

/** Doubt about one stretch of the boundary: its sources added in squares. */
export function doubtOf(points: readonly BoundaryPoint[], residualMm: number, sources: DoubtSources): Doubt {
  const count = Math.max(points.length, 1);
  const slope = points.reduce((sum, point) => sum + Math.abs(point.slope), 0) / count;
  const footShare = points.filter((point) => point.heightMm === 0).length / count;
  const faintShare = points.filter((point) => point.isFaint).length / count;
  const parts = {
    camera: sources.cameraMm,
    thickness: sources.thicknessMm * slope,
    print: (sources.printShare * sources.sizeMm) / 2,
    shadow: sources.shadowMm * (0.5 + 0.5 * footShare),
    edge: Math.hypot(Math.max(residualMm, LEAST_EDGE_MM), FAINT_EDGE_MM * faintShare),
  };
  let largest: Doubt['largest'] = 'camera';
  let squares = 0;
  for (const [name, value] of Object.entries(parts)) {
    squares += value * value;
    if (value > parts[largest]) largest = isSource(name) ? name : largest;
  }
  return { halfWidthMm: COVERAGE * Math.sqrt(squares), largest };
}

function isSource(name: string): name is Doubt['largest'] {
  return ['camera', 'thickness', 'print', 'shadow', 'edge'].includes(name);
}

/** The least half-width that covers `share` of the boundary's length. */
export function coveringHalfWidthMm(
  bands: readonly { readonly halfWidthMm: number; readonly lengthMm: number }[],
  share: number,
): number {
  const sorted = [...bands].sort((a, b) => a.halfWidthMm - b.halfWidthMm);
  const total = sorted.reduce((sum, band) => sum + band.lengthMm, 0);
  let reached = 0;
  for (const band of sorted) {
    reached += band.lengthMm;
    if (reached >= share * total) return band.halfWidthMm;
  }
  return sorted.at(-1)?.halfWidthMm ?? 0;
}
