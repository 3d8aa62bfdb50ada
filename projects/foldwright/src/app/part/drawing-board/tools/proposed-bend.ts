import type { BendDeclaration } from '@foldwright/shared/bending/layout';
import type { Template } from '@foldwright/shared/part/part-document';

/** A bend as it is proposed, before it has a place. */
export type ProposedBend = Omit<BendDeclaration, 'id' | 'line'>;

/**
 * The bend that is drawn unless a person says otherwise. A part from a template bends the way its flanges fold, and its
 * lengths mean what the template measured; typed parts bend towards face A, to the outside apex.
 */
export function proposedBend(template: Template | null): ProposedBend {
  return {
    bendAngleDeg: 90,
    direction: template?.flangesFold ?? 'towards',
    lengths: template === null ? { from: 'reference', reference: 'outsideApex' } : { from: 'template', override: null },
    insideRadiusMm: null,
    override: null,
    sideEdges: 'trimmed',
  };
}
