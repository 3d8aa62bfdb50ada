import type { OutlineLoop } from '../bending/layout';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop } from '../geometry/path';
import { segmentLength } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { edgeSegment } from '../part/outline-edge-sizes';
import { copyIds } from './copies';
import type { Finding } from './finding';
import { type RuleContext, listNames, nameOf, placeOfLayout } from './rule-context';

const WHY = { text: 'a cut has two sides', source: 'plane geometry', confidence: 'published' } as const;

/** Edges of the outline and its cut-outs that cross, touch or lie on one another, as drawn. Cut-outs drawn twice count once. */
export function checkOutlineCrossesItself(context: RuleContext): readonly Finding[] {
  const { layout } = context.document;
  const copies = copyIds(layout);
  const chains = [layout.outer, ...layout.cutouts.filter(({ id }) => !copies.has(id))].map(usableEdges);
  const seen = new Set<string>();
  return findCrossings(
    chains.map(({ loop }) => loop),
    COINCIDENT_MM,
  ).flatMap((crossing): readonly Finding[] => {
    const ids = [crossing.first, crossing.second].map(
      ({ loopIndex, segmentIndex }) => chains[loopIndex]?.ids[segmentIndex] ?? '',
    );
    const id = `outlineCrossesItself-${[...ids].sort().join('-')}`;
    if (seen.has(id)) return [];
    seen.add(id);
    const names = listNames(ids.map((edgeId) => nameOf(context, edgeId)));
    return [
      {
        id,
        rule: 'outlineCrossesItself',
        severity: 'blocker',
        title: crossing.kind === 'crossing' ? `Edges ${names} cross` : `Edges ${names} lie on one another`,
        detail: 'The outline meets itself there, so nobody can tell which side is metal.',
        foundMm: null,
        requiredMm: null,
        why: WHY,
        ids,
        at: placeOfLayout(context, crossing.at),
        advice: 'Move one of their corners until the edges are clear of each other, or take the corner away.',
        mend: null,
      },
    ];
  });
}

/** The chain as a loop with the ids of its edges; edges of no length are left out. */
function usableEdges(outline: OutlineLoop): { readonly loop: Loop; readonly ids: readonly string[] } {
  const edges = outline.edges
    .map(({ id }, index) => ({ id, segment: edgeSegment(outline, index) }))
    .filter(({ segment }) => segmentLength(segment) > COINCIDENT_MM);
  return { loop: edges.map(({ segment }) => segment), ids: edges.map(({ id }) => id) };
}
