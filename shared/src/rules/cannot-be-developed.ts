import { between } from '../geometry/vector';
import type { Point } from '../geometry/point';
import type { DevelopmentProblem } from '../bending/development';
import type { Finding } from './finding';
import { type RuleContext, placeOfLayout } from './rule-context';

const WHY = {
  text: 'a flat pattern needs panels joined by straight bends',
  source: 'plane geometry',
  confidence: 'published',
} as const;

const ADVICE: Readonly<Record<DevelopmentProblem['code'], string>> = {
  outlineNotSimple: 'Clear the places where the outline meets itself or an opening runs over it.',
  bendLineOutside: 'Move the bend onto the sheet.',
  bendLineEndsInside: 'Draw the bend from edge to edge, or cut a notch where it is to end.',
  bendLinesCross: 'Move one of the bends, or cut a relief where they meet.',
  panelRing: 'Cut the ring of panels open at one of its edges.',
  bendTooClose: 'Move the bends apart, or make their radius smaller.',
  angleOutOfRange: 'Give the bend an angle from 0.5° to 180°.',
  radiusOutOfRange: 'Give the bend an inside radius that this sheet can take.',
  referenceNotAllowed: 'Measure this bend’s lengths another way; beyond 90° to the outermost point of the bend.',
  kOutOfRange: 'Enter a K above 0 and up to 0.5, or a deduction that leads to one.',
  baseAnchorOutside: 'Put the base anchor into the panel that is to stay put.',
  stockUnknown: 'Choose a material from the table.',
  holeUnknown: 'Choose a thread from the fastener table.',
};

/** What stands in the way of a flat pattern, as findings. `isTold` knows problems that another rule tells better. */
export function checkCannotBeDeveloped(
  context: RuleContext,
  isTold: (problem: DevelopmentProblem) => boolean,
): readonly Finding[] {
  return context.problems
    .filter((problem) => !isTold(problem))
    .map((problem): Finding => {
      const at = placeOfIds(context, problem.ids);
      return {
        id: `cannotBeDeveloped-${problem.code}-${problem.ids.join('-')}`,
        rule: 'cannotBeDeveloped',
        severity: 'blocker',
        title: 'There is no flat pattern for this',
        detail: problem.message,
        foundMm: null,
        requiredMm: null,
        why: WHY,
        ids: problem.ids,
        at: at === null ? null : placeOfLayout(context, at),
        advice: ADVICE[problem.code],
        mend: null,
      };
    });
}

/** The first of the things that has a place in the layout. */
function placeOfIds({ document: { layout } }: RuleContext, ids: readonly string[]): Point | null {
  for (const id of ids) {
    const bend = layout.bends.find((candidate) => candidate.id === id);
    if (bend !== undefined) return between(bend.line.from, bend.line.to, 0.5);
    const edge = [layout.outer, ...layout.cutouts]
      .flatMap(({ edges }) => edges)
      .find((candidate) => candidate.id === id);
    if (edge !== undefined) return edge.start;
    const feature = layout.features.find((candidate) => candidate.id === id);
    if (feature !== undefined) return feature.kind === 'hole' ? feature.centre : feature.from;
  }
  return null;
}
