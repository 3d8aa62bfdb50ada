import type { SheetStock } from '@foldwright/shared/part/part-document';
import { findMaterial } from '@foldwright/shared/stock/materials';
import { formatDecimal } from '@foldwright/shared/units/length';

/** A sheet as a person would say it: "DC01 1.5", "5052 3". */
export function stockWords(stock: SheetStock): string {
  const name = findMaterial(stock.materialId)?.shortName ?? stock.materialId;
  return `${name} ${thicknessWords(stock.thicknessMm)}`;
}

/** A thickness with one decimal, or as many as it needs. */
export function thicknessWords(thicknessMm: number): string {
  const short = formatDecimal(thicknessMm, 2);
  return short.includes('.') ? short : `${short}.0`;
}
