import type { CardTemplate } from './card';
import { readCreases } from './crease';
import type { BendingStock, DevelopmentProblem } from './development';
import { unfold } from './flat-pattern';
import type { Unfolded } from './flat-pattern';
import type { Layout } from './layout';
import { cutPanels } from './panels';
import { resolveBend } from './resolved-bend';
import type { ResolvedBend } from './resolved-bend';
import { readSheet } from './sheet';
import type { Sheet } from './sheet';

/** A layout laid out flat, with the bends it was laid out by. */
export type UnfoldLayoutResult =
  | { readonly ok: true; readonly sheet: Sheet; readonly bends: readonly ResolvedBend[]; readonly unfolded: Unfolded }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/**
 * Settles every bend of a layout in a stock and lays the panels out flat.
 * @param template the card the layout was taken from; null when it was typed.
 * @param laidOutAs what the flat is made of where that isn't the stock itself, bend by bend: the panels then end where it bends
 */
export function unfoldLayout(
  layout: Layout,
  template: CardTemplate | null,
  stock: BendingStock,
  laidOutAs: (bend: ResolvedBend) => ResolvedBend = (bend) => bend,
): UnfoldLayoutResult {
  if (!(stock.thicknessMm > 0) || !Number.isFinite(stock.thicknessMm)) {
    const message = `A sheet ${String(stock.thicknessMm)} mm thick cannot be bent.`;
    return { ok: false, problems: [{ code: 'stockUnknown', message, ids: [stock.materialId] }] };
  }
  const problems: DevelopmentProblem[] = [];
  const sheet = readSheet(layout);
  const bends: ResolvedBend[] = [];
  layout.bends.forEach((declaration, index) => {
    const resolved = resolveBend(declaration, `B${String(index + 1)}`, template, stock);
    if (resolved.ok) bends.push(laidOutAs(resolved.bend));
    else problems.push(resolved.problem);
  });
  if (!sheet.ok) return { ok: false, problems: [...sheet.problems, ...problems] };
  const creases = readCreases(layout.bends, sheet.sheet);
  if (!creases.ok) return { ok: false, problems: [...problems, ...creases.problems] };
  if (problems.length > 0) return { ok: false, problems };
  const tree = cutPanels(sheet.sheet, creases.creases, layout.baseAnchor);
  if (!tree.ok) return { ok: false, problems: tree.problems };
  const result = unfold(tree.tree, creases.creases, bends, layout.reliefs);
  if (!result.ok) return { ok: false, problems: result.problems };
  return { ok: true, sheet: sheet.sheet, bends, unfolded: result.unfolded };
}
