import type { Development } from '../../bending/development';
import type { Feature } from '../../bending/layout';
import { pointToLoop } from '../../geometry/clearance';
import type { Point } from '../../geometry/point';
import { COINCIDENT_MM } from '../../geometry/tolerance';
import { along, dot, scale, subtract, unit } from '../../geometry/vector';
import { findHexEnvelope } from '../../stock/fastener-heads';
import { WASHER_SOURCE } from '../../stock/fastener-tables';
import { formatDecimal } from '../../units/length';
import { type CutOpening, cutSheet } from '../cut-openings';
import type { Finding } from '../finding';
import { LIMIT_SLACK_MM, ruleFrom } from '../limits';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, layoutShift, nameOf, placeOfFlat } from '../rule-context';
import { boltThread, flatPlaces } from './assembled-part';
import { panelIndexAt } from './inside-u';

/** What lies nearest to a washer's middle. */
interface Nearest {
  readonly washerAt: Point;
  readonly foundMm: number;
  readonly place: Point;
  /** Opening or bend that it is; null for the panel's edge. */
  readonly id: string | null;
  readonly what: 'edge' | 'opening' | 'bend';
}

/** Washers on clearance holes and bolted slots lie flat all round: off the tangent lines, off the edges, off other openings. */
export function checkWasherSeat(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  if (development === null || document.assembly === undefined) return [];
  const { openings } = cutSheet(context);
  return document.layout.features.flatMap((feature) => checkWasher(context, development, feature, openings));
}

function checkWasher(
  context: RuleContext,
  development: Development,
  feature: Feature,
  openings: readonly CutOpening[],
): readonly Finding[] {
  if (feature.kind === 'hole' && feature.purpose.kind !== 'clearance') return [];
  const thread = boltThread(feature);
  const envelope = thread === null ? null : findHexEnvelope(thread);
  if (thread === null || envelope === null) return [];
  const requiredMm = envelope.washerRadiusMm;
  const nearest = flatPlaces(development, feature)
    .flatMap((at) => nearestTo(development, feature.id, at, openings))
    .reduce<Nearest | null>((best, one) => (best === null || one.foundMm < best.foundMm ? one : best), null);
  if (nearest === null || nearest.foundMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const id = `washerNotSeated-${feature.id}`;
  const name = nameOf(context, feature.id);
  const missingMm = requiredMm - nearest.foundMm;
  const other = nearest.id === null ? '' : nameOf(context, nearest.id);
  const where = { edge: 'overhangs the edge', opening: `runs over ${other}`, bend: `rides on bend ${other}` };
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const away = subtract(nearest.washerAt, nearest.place);
  return [
    {
      id,
      rule: 'washerNotSeated',
      severity: 'caution',
      title: `Washer of ${name} ${where[nearest.what]}`,
      detail:
        `An ${thread} washer is ${mm(2 * requiredMm)} mm across; from its middle there are ${mm(nearest.foundMm)} mm of flat, ` +
        `and it wants ${mm(requiredMm)}.`,
      foundMm: nearest.foundMm,
      requiredMm,
      why: ruleFrom('a washer lies flat all round', WASHER_SOURCE),
      ids: nearest.id === null ? [feature.id] : [feature.id, nearest.id],
      at: placeOfFlat(development, nearest.washerAt),
      advice: 'Move the hole, take a smaller bolt, or make the flange wider.',
      mend:
        nearest.foundMm > 0
          ? mendThatHolds(context, id, `Move it ${mm(missingMm)} mm in`, [
              {
                kind: 'moveFeature',
                featureId: feature.id,
                by: layoutShift(development, nearest.washerAt, scale(unit(away), missingMm)),
              },
            ])
          : null,
    },
  ];
}

/** Boundary of the panel and other openings, as seen from a washer's middle. */
function nearestTo(
  development: Development,
  featureId: string,
  washerAt: Point,
  openings: readonly CutOpening[],
): readonly Nearest[] {
  const index = panelIndexAt(development, washerAt);
  const panel = index === null ? undefined : development.panels[index];
  if (panel === undefined) return [];
  const near = (loop: CutOpening['loop'], what: Nearest['what'], id: string | null): readonly Nearest[] => {
    const way = pointToLoop(washerAt, loop);
    return way === null ? [] : [{ washerAt, foundMm: way.distanceMm, place: way.to, what, id }];
  };
  const rim = near(panel.outer, 'edge', null).map((one): Nearest => {
    const bendId = bendAt(development, panel.index, one.place);
    return bendId === null ? one : { ...one, what: 'bend', id: bendId };
  });
  const others = openings.filter((opening) => opening.id !== featureId);
  return [...rim, ...others.flatMap(({ loop, id }) => near(loop, 'opening', id))];
}

/** Bend whose tangent line on a panel runs through a point. */
function bendAt({ zones }: Development, panelIndex: number, point: Point): string | null {
  const zone = zones.find(({ parentIndex, childIndex, origin, towardsChild, bendAllowanceMm }) => {
    if (panelIndex !== parentIndex && panelIndex !== childIndex) return false;
    const tangent = panelIndex === parentIndex ? origin : along(origin, towardsChild, bendAllowanceMm);
    return Math.abs(dot(subtract(point, tangent), towardsChild)) <= 4 * COINCIDENT_MM;
  });
  return zone?.bendId ?? null;
}
