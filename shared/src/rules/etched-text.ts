import type { Development } from '../bending/development';
import { loopBounds, loopFromBulges, pointInLoop, polygonLoop } from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { moveLoop, shiftBy } from '../geometry/transform';
import { add, scale, subtract, turn } from '../geometry/vector';
import { type Mark, markLengthMm } from '../part/assembly';
import type { PartCommand } from '../part/commands';
import { findFinish } from '../stock/finishes';
import { formatDecimal } from '../units/length';
import { type CutSheet, cutSheet } from './cut-openings';
import type { Finding } from './finding';
import { ETCHED_TEXT, LAND, LIMIT_SLACK_MM } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';
import { type WholeBend, type ZoneReach, wholeBends, zoneReach } from './zone-reach';

/**
 * Etched texts: high enough to be read at the width of an etched line, on the part, clear of openings and of bend zones, and
 * not under powder coat. Cautions, because nothing but the text is lost; the coat is a hint.
 */
export function checkEtchedText(context: RuleContext): readonly Finding[] {
  const marks = context.document.marks ?? [];
  if (marks.length === 0) return [];
  const sheet = cutSheet(context);
  return [
    ...marks.flatMap((mark) => [...checkHeight(context, mark), ...checkPlace(context, sheet, mark)]),
    ...checkCoat(context, marks),
  ];
}

function checkHeight(context: RuleContext, mark: Mark): readonly Finding[] {
  const requiredMm = ETCHED_TEXT.heightOverStroke * ETCHED_TEXT.strokeMm;
  if (mark.heightMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const id = `etchedText-${mark.id}-height`;
  return [
    {
      ...textFinding(context, mark, id),
      title: `“${mark.text}” is too fine to etch`,
      detail: `It is ${formatDecimal(mark.heightMm, 2)} mm high; its lines would run into each other below ${formatDecimal(requiredMm, 1)}.`,
      foundMm: mark.heightMm,
      requiredMm,
      why: ETCHED_TEXT.why,
      advice: 'Make it higher, or shorter and higher.',
      mend: mendThatHolds(
        context,
        id,
        `Make it ${formatDecimal(requiredMm, 1)} mm high`,
        withMark(context, { ...mark, heightMm: requiredMm }),
      ),
    },
  ];
}

function checkPlace(context: RuleContext, sheet: CutSheet, mark: Mark): readonly Finding[] {
  const box = boxOf(context, mark);
  const id = `etchedText-${mark.id}-place`;
  const base = { ...textFinding(context, mark, id), foundMm: null, requiredMm: null, why: ETCHED_TEXT.placeWhy };
  if (!liesIn(box, sheet.outer)) {
    return [
      {
        ...base,
        title: `“${mark.text}” runs off the part`,
        detail: `It is ${formatDecimal(markLengthMm(mark), 1)} mm long and does not fit where it stands.`,
        advice: 'Move it in, or make it lower.',
        mend: mendThatHolds(context, id, 'Move it onto the part', movedIn(context, mark)),
      },
    ];
  }
  const under = sheet.openings.filter(({ loop }) => findCrossings([box, loop], 0).length > 0 || liesIn(loop, box));
  if (under.length > 0) {
    const names = listSome(under.map((opening) => nameOf(context, opening.id)));
    return [
      {
        ...base,
        title: `“${mark.text}” runs over ${names}`,
        detail: 'There is no metal to etch in an opening.',
        ids: [mark.id, ...under.map((opening) => opening.id)],
        advice: 'Move the text to where there is metal.',
        mend: null,
      },
    ];
  }
  return context.development === null ? [] : checkBends(context, context.development, mark, box, base);
}

function checkBends(
  context: RuleContext,
  development: Development,
  mark: Mark,
  box: Loop,
  base: ReturnType<typeof textFinding> & Pick<Finding, 'why'>,
): readonly Finding[] {
  const over = wholeBends(development).find((one) => reachInto(one, box) !== null);
  const reach = over === undefined ? null : reachInto(over, box);
  if (over === undefined || reach === null) return [];
  const { zone } = over;
  const bend = nameOf(context, zone.bendId);
  const halfMm = zone.bendAllowanceMm / 2;
  const shift = scale(reach.away, halfMm - reach.rimFromCentreMm);
  return [
    {
      ...base,
      title: `“${mark.text}” runs over ${bend}`,
      detail: `It comes to ${formatDecimal(reach.rimFromCentreMm, 2)} mm from the centre of ${bend}; the metal is bent up to ${formatDecimal(halfMm, 2)}.`,
      foundMm: reach.rimFromCentreMm,
      requiredMm: halfMm,
      ids: [mark.id, zone.bendId],
      advice: 'Move it onto flat metal; an etched line on the outside of a bend is where it cracks.',
      mend: mendThatHolds(
        context,
        base.id,
        `Move it ${formatDecimal(halfMm - reach.rimFromCentreMm, 2)} mm away`,
        withMark(context, { ...mark, at: add(mark.at, shift) }),
      ),
    },
  ];
}

/** How a text lies to a bend when it reaches between the tangent lines; else null. */
function reachInto(bend: WholeBend, box: Loop): ZoneReach | null {
  const reach = zoneReach(box, bend);
  return reach === null || reach.rimFromCentreMm >= bend.zone.bendAllowanceMm / 2 - LIMIT_SLACK_MM ? null : reach;
}

function checkCoat(context: RuleContext, marks: readonly Mark[]): readonly Finding[] {
  const finish = findFinish(context.document.assembly?.finishId ?? '');
  const [first] = marks;
  if (context.role !== 'production' || finish?.process !== 'powder' || first === undefined) return [];
  return [
    {
      ...textFinding(context, first, 'etchedText-coat'),
      severity: 'hint',
      title: 'Powder coat hides etched text',
      detail: `${finish.name} goes over it and fills its lines.`,
      foundMm: null,
      requiredMm: null,
      why: ETCHED_TEXT.coatWhy,
      ids: marks.map(({ id }) => id),
      advice: 'Etch after coating, mask the text, or take a finish that shows it.',
      mend: null,
    },
  ];
}

function textFinding(context: RuleContext, mark: Mark, id: string) {
  return {
    id,
    rule: 'etchedText',
    severity: 'caution',
    ids: [mark.id],
    at: placeOfLayout(context, middleOf(mark)),
  } as const satisfies Partial<Finding>;
}

/** The rectangle a text takes up, in layout coordinates. */
function drawnBox({ at, turnDeg, heightMm, ...mark }: Mark): readonly Point[] {
  const right = turn({ x: markLengthMm({ ...mark, heightMm }), y: 0 }, turnDeg);
  const up = turn({ x: 0, y: heightMm }, turnDeg);
  return [at, add(at, right), add(add(at, right), up), add(at, up)];
}

function middleOf(mark: Mark): Point {
  const [a, , c] = drawnBox(mark);
  return a === undefined || c === undefined ? mark.at : scale(add(a, c), 0.5);
}

/** The same in the flat pattern, where the text moves with the panel its middle lies on. */
function boxOf(context: RuleContext, mark: Mark): Loop {
  const { layout, flat } = placeOfLayout(context, middleOf(mark));
  return moveLoop(shiftBy(subtract(flat, layout)), polygonLoop(drawnBox(mark)));
}

function liesIn(inner: Loop, outer: Loop): boolean {
  const corner = inner[0]?.from;
  if (corner === undefined) return false;
  return pointInLoop(corner, outer, COINCIDENT_MM) !== 'outside' && findCrossings([inner, outer], 0).length === 0;
}

/** The texts with one of them changed. */
function withMark({ document }: RuleContext, changed: Mark): readonly PartCommand[] {
  const marks = (document.marks ?? []).map((mark) => (mark.id === changed.id ? changed : mark));
  return [{ kind: 'setMarks', marks }];
}

/** The shortest shift that brings a text within the bounds of the outline, a land off its edges. */
function movedIn(context: RuleContext, mark: Mark): readonly PartCommand[] {
  const bounds = loopBounds(loopFromBulges(context.document.layout.outer.edges));
  const box = loopBounds(polygonLoop(drawnBox(mark)));
  if (bounds === null || box === null) return [];
  const landMm = Math.max(LAND.overT * context.sheet.thicknessMm, LAND.smallestMm);
  const shift = (axis: 'x' | 'y'): number =>
    Math.max(0, bounds.min[axis] + landMm - box.min[axis]) - Math.max(0, box.max[axis] - (bounds.max[axis] - landMm));
  return withMark(context, { ...mark, at: add(mark.at, { x: shift('x'), y: shift('y') }) });
}
