import type { NeutralBend } from './allowance';
import type { BendZone, FormedSize, Panel } from './development';
import { formedSpans } from './formed-spans';
import type { FormedSpan } from './formed-spans';
import { legGains, outsideReachMm, STANDARD_BRAKE } from './leg-gains';

const CAUSES = {
  gauging: 'gauging on the brake',
  radius: 'the inside radius the die delivers',
  neutral: 'where the neutral line runs (K)',
  thickness: 'the thickness of the sheet',
  angle: 'the bend angle',
  cut: 'the cut',
} as const;
type Cause = keyof typeof CAUSES;

/**
 * Sizes of the formed part a person can check with callipers: every panel across its bends, from the outside of the bend to the
 * edge or to the outside of the bend opposite. To the apex up to 90 degrees, to the outermost point of the bend above.
 * @param nameOf name of a bend by its id
 */
export function formedSizes(
  panels: readonly Panel[],
  zones: readonly BendZone[],
  nameOf: (bendId: string) => string,
  thicknessMm: number,
): readonly FormedSize[] {
  return formedSpans(panels, zones, nameOf).map((span) => ({
    label: span.label,
    valueMm: span.flatMm + span.ends.reduce((sum, { zone }) => sum + outsideReachMm({ ...zone, thicknessMm }), 0),
    ...spreadOf(span, thicknessMm),
  }));
}

/**
 * First order, each bend gauged from an edge of its own. What all bends share (die, sheet) adds up along the span, what each has
 * for itself adds as squares. The spread folder does the same for any gauging edge and for holes.
 */
function spreadOf({ ends }: FormedSpan, thicknessMm: number): Pick<FormedSize, 'spreadMm' | 'mostlyFrom'> {
  const brake = STANDARD_BRAKE;
  const bends = ends.map(({ zone }) => {
    const bend: NeutralBend = { ...zone, thicknessMm };
    return { bend, kHalfWidth: zone.kHalfWidth, gains: legGains(bend) };
  });
  const sumOf = (share: (one: (typeof bends)[number]) => number): number =>
    bends.reduce((sum, one) => sum + share(one), 0);
  const squares: Record<Cause, number> = {
    gauging: bends.length * brake.gaugingMm ** 2,
    radius: sumOf(({ bend, gains }) => gains.perRadiusMm * brake.radiusShare * bend.insideRadiusMm) ** 2,
    neutral: sumOf(({ kHalfWidth, gains }) => gains.perK * kHalfWidth) ** 2,
    thickness: sumOf(({ gains }) => gains.perThicknessMm * brake.thicknessShare * thicknessMm) ** 2,
    angle: sumOf(({ gains }) => (gains.perDegree * brake.angleDeg) ** 2),
    // Edges and bends are cut and gauged in one blank: an edge at the far end, or the edge each of two bends was gauged from.
    cut: bends.length * brake.cutMm ** 2,
  };
  const causes: readonly Cause[] = ['gauging', 'radius', 'neutral', 'thickness', 'angle', 'cut'];
  const largest = causes.reduce((best, cause) => (squares[cause] > squares[best] ? cause : best), 'gauging');
  const sum = causes.reduce((total, cause) => total + squares[cause], 0);
  return { spreadMm: Math.sqrt(sum), mostlyFrom: CAUSES[largest] };
}
