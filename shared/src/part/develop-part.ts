import { developLayout } from '../bending/develop';
import type { DevelopmentResult } from '../bending/development';
import { resolveStock } from '../stock/resolve-stock';
import type { PartDocument, StockRole } from './part-document';

/**
 * Flat pattern, bend table and formed sizes of a part in one of its two sheets.
 * @returns the development, or the problems that stand in its way with the ids they concern
 */
export function developPart(document: PartDocument, role: StockRole): DevelopmentResult {
  const resolution = resolveStock(document.stocks[role]);
  if (!resolution.ok) return { ok: false, problems: [resolution.problem] };
  return developLayout(document.layout, document.template, resolution.stock);
}
