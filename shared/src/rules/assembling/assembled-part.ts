import type { Development } from '../../bending/development';
import type { Feature } from '../../bending/layout';
import type { Point } from '../../geometry/point';
import { between } from '../../geometry/vector';
import { type Finish, findFinish } from '../../stock/finishes';
import { threadDiameterMm, threadThrough } from '../../stock/thread-size';
import { capital } from '../in-words';
import { type RuleContext, listSome, nameOf } from '../rule-context';

/** Finish of the sheet at hand; null without one: bare, nothing said, or the trial sheet, which stays bare. */
export function finishOf({ document, role }: RuleContext): Finish | null {
  if (document.assembly === undefined || role !== 'production') return null;
  const finish = findFinish(document.assembly.finishId);
  return finish === null || finish.process === 'none' ? null : finish;
}

/** Thread of the bolt that goes through an opening: said by its purpose, else read off its width; null when no bolt does. */
export function boltThread(feature: Feature): string | null {
  if (feature.kind === 'slot') return threadThrough(feature.widthMm);
  const { purpose } = feature;
  switch (purpose.kind) {
    case 'clearance':
    case 'countersunk':
      return purpose.thread;
    case 'plain':
    case 'pass-through':
      return threadThrough(purpose.diameterMm);
    default:
      return null;
  }
}

/** Largest diameter of that bolt, mm. */
export function boltDiameterMm(feature: Feature): number | null {
  const thread = boltThread(feature);
  return thread === null ? null : threadDiameterMm(thread);
}

/** Middle of an opening in the layout. */
export function middleOf(feature: Feature): Point {
  return feature.kind === 'hole' ? feature.centre : between(feature.from, feature.to, 0.5);
}

/** Where in the flat pattern a bolt may sit: a hole's middle, both end centres of a slot. */
export function flatPlaces({ flat }: Development, { id }: Feature): readonly Point[] {
  const hole = flat.holes.find(({ featureId }) => featureId === id);
  if (hole !== undefined) return [hole.centre];
  const slot = flat.slots.find(({ featureId }) => featureId === id);
  return slot === undefined ? [] : [slot.from, slot.to];
}

/** "Hole H3", "Slot S1". */
export function called(context: RuleContext, feature: Feature): string {
  return `${feature.kind === 'hole' ? 'Hole' : 'Slot'} ${nameOf(context, feature.id)}`;
}

/** "H1", "H1 and H2", "H1, H2, H3 and 12 more", to begin a sentence with. */
export function allCalled(context: RuleContext, ids: readonly string[]): string {
  return capital(listSome(ids.map((id) => nameOf(context, id))));
}
