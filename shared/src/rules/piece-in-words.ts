import type { Development } from '../bending/development';
import type { PieceName } from '../brake/plates';
import { type RuleContext, nameOf } from './rule-context';

/** "the base", "the panel beyond B2", "bend B3". */
export function pieceInWords(context: RuleContext, development: Development, { kind, index }: PieceName): string {
  if (kind === 'zone') return `bend ${nameOf(context, development.zones[index]?.bendId ?? '')}`;
  const bendId = development.panels[index]?.bendId ?? null;
  return bendId === null ? 'the base' : `the panel beyond ${nameOf(context, bendId)}`;
}
