import type { Feature, Layout, OutlineLoop } from '../bending/layout';
import { loopBounds, loopFromBulges } from '../geometry/loop';
import { scale } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import type { PartDocument } from '../part/part-document';
import { rescaleLayout } from '../part/rescale-layout';
import { MM_PER_INCH, formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { LIMIT_SLACK_MM, USUAL_SIZE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, placeOfLayout } from './rule-context';

/**
 * A layout whose longest side is under 12 mm or over 2.5 m was most likely drawn in inches and read in millimetres, or the
 * other way round: a caution, because nothing but its size speaks for it.
 */
export function checkUnitsSlip(context: RuleContext): readonly Finding[] {
  const { document } = context;
  const longestMm = longestSideMm(document.layout.outer);
  const slip = slipOf(longestMm);
  if (slip === null) return [];
  const isSmall = slip === 'small';
  const factor = isSmall ? MM_PER_INCH : 1 / MM_PER_INCH;
  const wouldBe = formatDecimal(longestMm * factor, 1);
  const id = 'unitsSlip';
  return [
    {
      id,
      rule: 'unitsSlip',
      severity: 'caution',
      title: isSmall ? 'It may have been drawn in inches' : 'It may have been read in inches',
      detail:
        `Its longest side is ${formatDecimal(longestMm, 2)} mm. ` +
        (isSmall
          ? `If its numbers were inches, it would be ${wouldBe} mm long.`
          : `If its numbers were millimetres that were taken for inches, it would be ${wouldBe} mm long.`),
      foundMm: longestMm,
      requiredMm: isSmall ? USUAL_SIZE.smallestMm : USUAL_SIZE.largestMm,
      why: USUAL_SIZE.why,
      ids: document.layout.outer.edges[0] === undefined ? [] : [document.layout.outer.edges[0].id],
      at: placeOfLayout(context, document.layout.outer.edges[0]?.start ?? document.layout.baseAnchor),
      advice: 'Measure one edge. If it is 25.4 times off, scale the whole part; otherwise leave it.',
      mend: mendThatHolds(
        context,
        id,
        isSmall ? 'Make it 25.4 times larger' : 'Make it 25.4 times smaller',
        rescaled(document, factor),
      ),
    },
  ];
}

/** Whether the part is so small that it looks like inches read as millimetres; rules about small blanks leave it to this one. */
export function looksTooSmall(layout: Layout): boolean {
  return slipOf(longestSideMm(layout.outer)) === 'small';
}

/** The same for a part that looks like millimetres read as inches. */
export function looksTooLarge(layout: Layout): boolean {
  return slipOf(longestSideMm(layout.outer)) === 'large';
}

function slipOf(longestMm: number): 'small' | 'large' | null {
  if (longestMm <= 0) return null;
  if (longestMm < USUAL_SIZE.smallestMm - LIMIT_SLACK_MM) return 'small';
  return longestMm > USUAL_SIZE.largestMm + LIMIT_SLACK_MM ? 'large' : null;
}

function longestSideMm(outer: OutlineLoop): number {
  const bounds = loopBounds(loopFromBulges(outer.edges));
  return bounds === null ? 0 : Math.max(bounds.max.x - bounds.min.x, bounds.max.y - bounds.min.y);
}

/** Everything that was drawn, scaled: places, and the sizes that holes and slots have of their own. Threads stay what they are. */
function rescaled({ layout, marks }: PartDocument, factor: number): readonly PartCommand[] {
  const resized: Layout = { ...layout, features: layout.features.map((feature) => resize(feature, factor)) };
  const scaled = rescaleLayout(resized, { x: factor, y: factor });
  return [
    { kind: 'replaceLayout', layout: scaled, origin: 'import' },
    ...(marks === undefined
      ? []
      : [{ kind: 'setMarks' as const, marks: marks.map((mark) => ({ ...mark, at: scale(mark.at, factor) })) }]),
  ];
}

function resize(feature: Feature, factor: number): Feature {
  if (feature.kind === 'slot') return { ...feature, widthMm: feature.widthMm * factor };
  const { purpose } = feature;
  return 'diameterMm' in purpose
    ? { ...feature, purpose: { ...purpose, diameterMm: purpose.diameterMm * factor } }
    : feature;
}
