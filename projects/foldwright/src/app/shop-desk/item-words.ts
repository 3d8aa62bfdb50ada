import type { SaleItem } from '@foldwright/shared/contracts/sales';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';

/** A piece in one line, for forms. */
export function itemWords({ what }: SaleItem): string {
  if (what.kind === 'hardware') return [what.name, what.specification].filter(Boolean).join(', ');
  return `${what.partName}, revision ${what.letter}, ${finishWords(what.finishId).toLowerCase()}`;
}
