import type { OutlineLoop } from '../bending/layout';
import { segmentLength } from '../geometry/segment';
import type { PartCommand } from '../part/commands';
import { edgeSegment } from '../part/outline-edge-sizes';
import { widestKerfMm } from '../stock/laser-kerf';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { plural } from './in-words';
import { LIMIT_SLACK_MM, TINY_EDGE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

interface ShortEdge {
  readonly id: string;
  readonly outline: OutlineLoop;
  readonly lengthMm: number;
}

/**
 * Edges that are there by a slip: under 0.05 mm, where two corners stand on one spot (caution), and under the width of the
 * cut, which do not show in metal (hint). Each sort is told once.
 */
export function checkTinyEdge(context: RuleContext): readonly Finding[] {
  const { layout } = context.document;
  const kerfMm = widestKerfMm(context.sheet.thicknessMm);
  const short = [layout.outer, ...layout.cutouts].flatMap((outline) =>
    outline.edges.flatMap(({ id }, index): readonly ShortEdge[] => {
      const lengthMm = segmentLength(edgeSegment(outline, index));
      return lengthMm < kerfMm - LIMIT_SLACK_MM ? [{ id, outline, lengthMm }] : [];
    }),
  );
  const isNothing = ({ lengthMm }: ShortEdge) => lengthMm < TINY_EDGE.belowMm - LIMIT_SLACK_MM;
  return [
    ...describe(context, 'nothing', short.filter(isNothing), TINY_EDGE.belowMm),
    ...describe(
      context,
      'kerf',
      short.filter((edge) => !isNothing(edge)),
      kerfMm,
    ),
  ];
}

function describe(
  context: RuleContext,
  sort: 'nothing' | 'kerf',
  edges: readonly ShortEdge[],
  limitMm: number,
): readonly Finding[] {
  const [first] = edges;
  if (first === undefined) return [];
  const shortest = edges.reduce((least, edge) => (edge.lengthMm < least.lengthMm ? edge : least), first);
  const names = listSome(edges.map(({ id }) => nameOf(context, id)));
  const mm = (valueMm: number) => formatDecimal(valueMm, 3);
  const id = `tinyEdge-${sort}`;
  const at = shortest.outline.edges.find((edge) => edge.id === shortest.id)?.start;
  return [
    {
      id,
      rule: 'tinyEdge',
      severity: sort === 'nothing' ? 'caution' : 'hint',
      title:
        sort === 'nothing'
          ? `${names} ${plural(edges.length, 'has', 'have')} no length to speak of`
          : `${names} ${plural(edges.length, 'is', 'are')} shorter than the cut is wide`,
      detail:
        `${edges.length === 1 ? 'It is' : 'The shortest is'} ${mm(shortest.lengthMm)} mm long. ` +
        (sort === 'nothing'
          ? 'Two corners stand on one spot there, and a machine may stop at it.'
          : `The cut is up to ${mm(limitMm)} wide in this sheet and rounds it away.`),
      foundMm: shortest.lengthMm,
      requiredMm: limitMm,
      why: TINY_EDGE.why,
      ids: edges.map((edge) => edge.id),
      at: at === undefined ? null : placeOfLayout(context, at),
      advice: 'Take the corner away, unless the edge is to be longer.',
      mend: mendThatHolds(context, id, `Take ${edges.length} ${plural(edges.length, 'corner')} away`, removals(edges)),
    },
  ];
}

/** Takes the corner away where each edge starts. The edge before it reaches on to the edge's end and keeps its bulge. */
function removals(edges: readonly ShortEdge[]): readonly PartCommand[] {
  const gone = new Set<string>();
  return edges.flatMap(({ id, outline }): readonly PartCommand[] => {
    const left = outline.edges.filter((edge) => !gone.has(edge.id));
    const previous = left.at(left.findIndex((edge) => edge.id === id) - 1);
    gone.add(id);
    const removal: PartCommand = { kind: 'removeVertex', edgeId: id };
    if (previous === undefined || previous.bulge === 0) return [removal];
    return [removal, { kind: 'setEdgeBulge', edgeId: previous.id, bulge: previous.bulge }];
  });
}
