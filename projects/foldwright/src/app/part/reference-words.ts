import type { LengthReference } from '@foldwright/shared/bending/layout';

const WORDS: Readonly<Record<LengthReference, string>> = {
  outsideApex: 'outside apex',
  insideApex: 'inside apex',
  outsideTangent: 'outermost point',
  insideTangent: 'innermost point',
  tangent: 'tangent line',
};

/** What a length at a bend reaches to, in words for tables and menus. */
export function referenceWords(reference: LengthReference): string {
  return WORDS[reference];
}
