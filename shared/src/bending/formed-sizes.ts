import { loopReach } from '../geometry/loop';
import type { Point } from '../geometry/point';
import { dot, scale } from '../geometry/vector';
import { insideSetbackMm, outsideSetbackMm, setbackMm } from './allowance';
import type { BendZone, FormedSize, KBand, Panel } from './development';
import { bandFor } from './k-factor';
import type { ResolvedBend } from './resolved-bend';

/** Spread to plan with. Common practice, no source: what a good shop holds on a brake with a back gauge. */
const PLAN = {
  gaugingMm: 0.4,
  radiusShare: 0.15,
  kHalfWidth: 0.03,
  thicknessShare: 0.05,
  angleDeg: 1,
  cutMm: 0.1,
} as const;

const CAUSES = {
  gauging: 'gauging on the brake',
  radius: 'the inside radius the die delivers',
  neutral: 'where the neutral line runs (K)',
  thickness: 'the thickness of the sheet',
  angle: 'the bend angle',
  cut: 'the cut',
} as const;
type Cause = keyof typeof CAUSES;

interface SizedZone {
  readonly zone: BendZone;
  readonly bend: ResolvedBend;
  /** Out of the panel, across the bend. */
  readonly outwards: Point;
}

/** Bends whose directions differ by less than this count as parallel: sine of 0.06 degrees. */
const PARALLEL_SINE = 0.001;

/**
 * Sizes of the formed part a person can check with callipers: every panel across its bends, from the outside of the bend to the
 * edge or to the outside of the bend opposite. To the apex up to 90 degrees, to the outermost point of the bend above.
 * @param kBands the material's own bands of K, for the share of K in the spread.
 */
export function formedSizes(
  panels: readonly Panel[],
  zones: readonly BendZone[],
  bends: readonly ResolvedBend[],
  kBands: readonly KBand[],
): readonly FormedSize[] {
  return panels.flatMap((panel) => {
    const own = zones.flatMap((zone): readonly SizedZone[] => {
      const bend = bends.find(({ declaration }) => declaration.id === zone.bendId);
      if (bend === undefined) return [];
      if (zone.parentIndex === panel.index) return [{ zone, bend, outwards: zone.towardsChild }];
      if (zone.childIndex === panel.index) return [{ zone, bend, outwards: scale(zone.towardsChild, -1) }];
      return [];
    });
    const used = new Set<SizedZone>();
    const sizes: FormedSize[] = [];
    for (const first of own) {
      if (used.has(first)) continue;
      for (const other of own) if (isSameSide(first, other)) used.add(other);
      const opposite = own.find((other) => isOpposite(first, other));
      for (const other of own) if (opposite !== undefined && isSameSide(opposite, other)) used.add(other);
      sizes.push(sizeOf(panel, first, opposite ?? null, kBands));
    }
    return sizes;
  });
}

function isSameSide(a: SizedZone, b: SizedZone): boolean {
  return (
    isParallel(a, b) &&
    dot(a.outwards, b.outwards) > 0 &&
    Math.abs(edgeAt(a, a.outwards) - edgeAt(b, a.outwards)) < PARALLEL_SINE
  );
}

function isOpposite(a: SizedZone, b: SizedZone): boolean {
  return isParallel(a, b) && dot(a.outwards, b.outwards) < 0;
}

function isParallel(a: SizedZone, b: SizedZone): boolean {
  return Math.abs(a.outwards.x * b.outwards.y - a.outwards.y * b.outwards.x) < PARALLEL_SINE;
}

/** Place of the panel's tangent line along a direction, mm. */
function edgeAt({ zone, outwards }: SizedZone, direction: Point): number {
  const isParentSide = dot(outwards, zone.towardsChild) > 0;
  const at = dot(zone.origin, direction);
  return isParentSide ? at : at + dot(zone.towardsChild, direction) * zone.bendAllowanceMm;
}

function sizeOf(panel: Panel, first: SizedZone, opposite: SizedZone | null, kBands: readonly KBand[]): FormedSize {
  const start = edgeAt(first, first.outwards);
  const far = opposite === null ? -loopReach(panel.outer, scale(first.outwards, -1)) : edgeAt(opposite, first.outwards);
  const included = opposite === null ? [first] : [first, opposite];
  const valueMm = start - far + included.reduce((sum, { bend }) => sum + outsideReachMm(bend), 0);
  const name = panel.parentIndex === null ? 'Base' : `Flange at ${first.bend.name}`;
  const label =
    opposite === null
      ? `${name}, outside of ${first.bend.name} to edge`
      : `${panel.parentIndex === null ? 'Base' : 'Web'}, outside of ${first.bend.name} to outside of ${opposite.bend.name}`;
  return { label, valueMm, ...spreadOf(included, start - far, opposite === null, kBands) };
}

function outsideReachMm(bend: ResolvedBend): number {
  return setbackMm(bend.geometry, bend.geometry.bendAngleDeg <= 90 ? 'outsideApex' : 'outsideTangent');
}

/** First order, independent causes added as squares; half-width of what is to be expected. */
function spreadOf(
  included: readonly SizedZone[],
  flatMm: number,
  endsAtEdge: boolean,
  kBands: readonly KBand[],
): Pick<FormedSize, 'spreadMm' | 'mostlyFrom'> {
  const squares: Record<Cause, number> = {
    gauging: 0,
    radius: 0,
    neutral: 0,
    thickness: 0,
    angle: 0,
    cut: endsAtEdge ? PLAN.cutMm ** 2 : 0,
  };
  for (const { bend } of included) {
    const { bendAngleDeg, insideRadiusMm, thicknessMm, kFactor } = bend.geometry;
    const turnedRad = (bendAngleDeg * Math.PI) / 180;
    const band = bandFor(kBands, insideRadiusMm / thicknessMm);
    const kHalf = band === null ? PLAN.kHalfWidth : (band.high - band.low) / 2;
    // The flat is cut to length: a leg takes half of whatever the bend uses up more or less than planned.
    const radiusGain =
      bendAngleDeg < 180
        ? outsideSetbackMm({ ...bend.geometry, thicknessMm: 1, insideRadiusMm: 1 }) / 2 - turnedRad / 2
        : 1 - turnedRad / 2;
    const thicknessGain =
      bendAngleDeg < 180
        ? insideSetbackMm({ ...bend.geometry, insideRadiusMm: 1 }) - (turnedRad * kFactor) / 2
        : 1 - (turnedRad * kFactor) / 2;
    squares.gauging += PLAN.gaugingMm ** 2;
    squares.radius += (radiusGain * PLAN.radiusShare * insideRadiusMm) ** 2;
    squares.neutral += ((turnedRad * thicknessMm * kHalf) / 2) ** 2;
    squares.thickness += (thicknessGain * PLAN.thicknessShare * thicknessMm) ** 2;
    // A flange leaning by a small angle shows on its height only by the square of it.
    squares.angle += (flatMm * (1 - Math.cos((PLAN.angleDeg * Math.PI) / 180))) ** 2;
  }
  const causes: readonly Cause[] = ['gauging', 'radius', 'neutral', 'thickness', 'angle', 'cut'];
  const largest = causes.reduce((best, cause) => (squares[cause] > squares[best] ? cause : best), 'gauging');
  const sum = causes.reduce((total, cause) => total + squares[cause], 0);
  return { spreadMm: Math.sqrt(sum), mostlyFrom: CAUSES[largest] };
}
