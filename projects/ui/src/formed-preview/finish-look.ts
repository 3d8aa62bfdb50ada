import { findFinish } from '@foldwright/shared/stock/finishes';
import type { MadeOf } from './draw-part';

const LOOKS: Readonly<Record<string, MadeOf>> = {
  'powder-moss': 'moss',
  'powder-cream': 'cream',
  'powder-ember': 'ember',
  'powder-slate': 'trial-steel',
};

/** What a part in a finish is drawn in: its coat, or the bare metal under a coat too thin to be seen. */
export function lookOfFinish(finishId: string): MadeOf {
  return LOOKS[finishId] ?? 'alloy';
}

/** A finish as a customer reads it: "Powder coat, moss" is moss. */
export function finishWords(finishId: string): string {
  const name = findFinish(finishId)?.name ?? finishId;
  const [process, colour] = name.split(', ');
  const words = process === 'Powder coat' && colour !== undefined ? colour : name;
  return words.charAt(0).toUpperCase() + words.slice(1);
}
