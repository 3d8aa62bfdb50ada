import { loopReach } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { directionDeg, scale, subtract, turn, turnLeft } from '../geometry/vector';
import { formatDecimal } from '../units/length';
import { cutSheet } from './cut-openings';
import type { Finding } from './finding';
import { CUTTING_BED, LIMIT_SLACK_MM } from './limits';
import { type RuleContext, placeOfFlat } from './rule-context';
import { looksTooLarge, looksTooSmall } from './units-slip';

/**
 * The blank against the sheet a usual cutting service loads and the slats it lies on, laid as it fits best. Cautions:
 * another service may have a larger bed or leave tabs. A part whose size looks like a slip of units is left to that rule.
 */
export function checkBlankOutOfRange(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  if (development === null) return [];
  const { outer } = cutSheet(context);
  const sides = smallestBox(outer);
  const isLarge =
    sides.longMm > CUTTING_BED.longMm + LIMIT_SLACK_MM || sides.shortMm > CUTTING_BED.shortMm + LIMIT_SLACK_MM;
  const isSmall = sides.shortMm < CUTTING_BED.smallestMm - LIMIT_SLACK_MM;
  if (!isLarge && !isSmall) return [];
  if (isLarge ? looksTooLarge(document.layout) : looksTooSmall(document.layout)) return [];
  const mm = (valueMm: number) => formatDecimal(valueMm, 1);
  const isTooLong = sides.longMm > CUTTING_BED.longMm + LIMIT_SLACK_MM;
  const at = outer[0]?.from;
  return [
    {
      id: `blankOutOfRange-${isLarge ? 'large' : 'small'}`,
      rule: 'blankOutOfRange',
      severity: 'caution',
      title: isLarge ? 'The blank is larger than a usual sheet' : 'The blank may fall through the slats',
      detail: isLarge
        ? `Flat it is ${mm(sides.longMm)} × ${mm(sides.shortMm)} mm; a usual sheet has ${CUTTING_BED.longMm} × ` +
          `${CUTTING_BED.shortMm} to cut from.`
        : `Flat it is ${mm(sides.longMm)} × ${mm(sides.shortMm)} mm. Under ${CUTTING_BED.smallestMm} mm wide it does ` +
          'not lie on the grid of the machine.',
      foundMm: isLarge && isTooLong ? sides.longMm : sides.shortMm,
      requiredMm: isLarge ? (isTooLong ? CUTTING_BED.longMm : CUTTING_BED.shortMm) : CUTTING_BED.smallestMm,
      why: isLarge ? CUTTING_BED.why : CUTTING_BED.slatsWhy,
      ids: [],
      at: at === undefined ? null : placeOfFlat(development, at),
      advice: isLarge
        ? 'Ask for a service with a larger bed, or make the part of two pieces.'
        : 'Have it cut several at a time with tabs between, or make it wider.',
      mend: null,
    },
  ];
}

interface Sides {
  readonly longMm: number;
  readonly shortMm: number;
}

/** Sides of the box around a blank that is turned to lie along the axes or along one of its straight edges, the best of them. */
function smallestBox(outer: Loop): Sides {
  const directions = new Map<number, Point>([[0, { x: 1, y: 0 }]]);
  for (const segment of outer) {
    if (segment.kind === 'arc') continue;
    const angleDeg = directionDeg(subtract(segment.to, segment.from));
    // Edges within a degree give the same box for this purpose; a full circle of them is enough however many there are.
    const key = ((Math.round(angleDeg) % 90) + 90) % 90;
    if (!directions.has(key)) directions.set(key, turn({ x: 1, y: 0 }, angleDeg));
  }
  const boxes = [...directions.values()].map((direction): Sides => {
    const extents = [direction, turnLeft(direction)].map(
      (axis) => loopReach(outer, axis) + loopReach(outer, scale(axis, -1)),
    );
    return { longMm: Math.max(...extents), shortMm: Math.min(...extents) };
  });
  return boxes.reduce((best, box) => (overhang(box) < overhang(best) ? box : best));
}

/** By how much a box is too large for the bed; boxes that fit are told apart by their short side, the widest the best. */
function overhang({ longMm, shortMm }: Sides): number {
  const overMm = Math.max(longMm - CUTTING_BED.longMm, shortMm - CUTTING_BED.shortMm);
  return overMm > 0 ? overMm : -1 / (1 + shortMm);
}
