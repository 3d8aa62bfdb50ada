import type { BendRow } from '../bending/development';
import { between } from '../geometry/vector';
import { radiansFromDeg } from '../units/angle';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { LIMIT_SLACK_MM, SEAT_GAP } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { standsRadius } from './radius-below-minimum';
import { type RuleContext, nameOf, placeOfLayout } from './rule-context';

/**
 * Bends that turn round a corner of what the part sits on: an inside radius R larger than the corner's radius r rides on the
 * corner, and a flange stands off (see `standOffMm`). A gap that bolts pull shut does not count.
 */
export function checkSeatCorner(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  const corners = document.assembly?.seat?.corners ?? [];
  if (development === null) return [];
  return development.bendTable.flatMap((row) => {
    // A bend turns round one corner; where several were named, the sharpest decides.
    const radii = corners.filter(({ bendId }) => bendId === row.bendId).map(({ radiusMm }) => radiusMm);
    return radii.length === 0 ? [] : checkCorner(context, row, Math.min(...radii));
  });
}

/**
 * How far a flange stands off when the other lies flat, mm: (R - r)(1 - cos A).
 *
 * Lay the first flange on the seat's first face, the x axis, with the metal of the seat above it. The part's inner surface
 * turns about a centre at height R, the seat's corner about one at height r. With the second flange on its face too, both
 * surfaces have one apex, and the centres lie R tan(A/2) and r tan(A/2) before it along x. The corner is inside the bend's
 * curve as long as the centres are no further apart than R - r; but R - r is their difference in height alone, so they have
 * to stand one above the other: the part has to be pulled back along x by t = (R - r) tan(A/2). That lifts the second flange
 * off its face, which is turned by A, by t sin A = (R - r) tan(A/2) 2 sin(A/2) cos(A/2) = (R - r)(1 - cos A): R - r for a
 * square bend. Shared evenly between both flanges, each stands off by (R - r)(1 - cos(A/2)).
 */
export function standOffMm(insideRadiusMm: number, cornerRadiusMm: number, bendAngleDeg: number): number {
  return Math.max(0, insideRadiusMm - cornerRadiusMm) * (1 - Math.cos(radiansFromDeg(bendAngleDeg)));
}

function checkCorner(context: RuleContext, row: BendRow, cornerMm: number): readonly Finding[] {
  const bend = context.document.layout.bends.find(({ id }) => id === row.bendId);
  const gapMm = standOffMm(row.insideRadiusMm, cornerMm, row.bendAngleDeg);
  if (bend === undefined || gapMm <= SEAT_GAP.withinMm + LIMIT_SLACK_MM) return [];
  const name = nameOf(context, row.bendId);
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const clearMm = cornerMm + SEAT_GAP.withinMm / (1 - Math.cos(radiansFromDeg(row.bendAngleDeg)));
  const setMm = Math.floor(clearMm * 100 + LIMIT_SLACK_MM) / 100;
  const id = `seatCorner-${row.bendId}`;
  return [
    {
      id,
      rule: 'seatCorner',
      severity: 'caution',
      title: `${name} rides on the corner it turns round`,
      detail:
        `Its inside radius is ${mm(row.insideRadiusMm)} mm, the corner’s ${mm(cornerMm)}. With one flange flat, the other ` +
        `stands off ${mm(gapMm)} mm.`,
      foundMm: row.insideRadiusMm,
      requiredMm: clearMm,
      why: SEAT_GAP.why,
      ids: [row.bendId],
      at: placeOfLayout(context, between(bend.line.from, bend.line.to, 0.5)),
      advice:
        'Round or chamfer the corner it sits on, put a shim under the flange, or bend it tighter if the metal stands it.',
      // One radius holds for both sheets, so both have to stand it.
      mend: Object.values(context.document.stocks).every((sheet) => standsRadius(sheet, bend, setMm))
        ? mendThatHolds(context, id, `Set the radius to ${mm(setMm)} mm`, [
            { kind: 'changeBend', bendId: bend.id, bend: { ...bend, insideRadiusMm: setMm } },
          ])
        : null,
    },
  ];
}
