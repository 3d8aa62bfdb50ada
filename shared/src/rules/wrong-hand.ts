import type { BendDeclaration, BendDirection } from '../bending/layout';
import { between } from '../geometry/vector';
import type { Finding } from './finding';
import { plural } from './in-words';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

const WHY = {
  text: 'a template that was turned over gives the other hand',
  source: 'common practice, no source',
  confidence: 'common-practice',
} as const;

/**
 * Bends of a template that fold the other way than the template was said to, or, where nobody said, a single bend that
 * folds against at least two others. Most are meant, so it is a hint. Typed parts say each bend's way themselves.
 */
export function checkWrongHand(context: RuleContext): readonly Finding[] {
  const { template, layout } = context.document;
  if (template === null) return [];
  const said = template.flangesFold;
  const odd = said === undefined ? loneBend(layout.bends) : layout.bends.filter(({ direction }) => direction !== said);
  const [first] = odd;
  if (first === undefined) return [];
  const names = listSome(odd.map(({ id }) => nameOf(context, id)));
  const other = opposite(first.direction);
  const id = 'wrongHand';
  return [
    {
      id,
      rule: 'wrongHand',
      severity: 'hint',
      title: `${names} ${plural(odd.length, 'folds', 'fold')} the other way`,
      detail:
        said === undefined
          ? `All other bends fold ${words(other)} as face A shows. A slip here makes the other hand of the part.`
          : `The template’s flanges were said to fold ${words(said)} as face A shows. A template photographed from its ` +
            'back makes the other hand of the part.',
      foundMm: null,
      requiredMm: null,
      why: WHY,
      ids: odd.map((bend) => bend.id),
      at: placeOfLayout(context, between(first.line.from, first.line.to, 0.5)),
      advice: 'Hold the template as in the photo and look which way it folds there.',
      mend: mendThatHolds(
        context,
        id,
        `Fold ${odd.length === 1 ? 'it' : 'them'} ${words(other)}`,
        odd.map((bend) => ({ kind: 'changeBend', bendId: bend.id, bend: { ...bend, direction: other } })),
      ),
    },
  ];
}

function loneBend(bends: readonly BendDeclaration[]): readonly BendDeclaration[] {
  if (bends.length < 3) return [];
  const towards = bends.filter(({ direction }) => direction === 'towards');
  const away = bends.filter(({ direction }) => direction === 'away');
  return towards.length === 1 ? towards : away.length === 1 ? away : [];
}

function opposite(direction: BendDirection): BendDirection {
  return direction === 'towards' ? 'away' : 'towards';
}

function words(direction: BendDirection): string {
  return direction === 'towards' ? 'towards you' : 'away from you';
}
