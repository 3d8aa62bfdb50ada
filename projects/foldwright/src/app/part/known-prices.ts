import type { Quote } from '@foldwright/shared/contracts/orders';
import type { KnownPrice } from './part-card/part-card';

/** For each sheet the newest priced quote's highest quantity up to ten: what one piece costs. Quotes come newest first. */
export function knownPrices(quotes: readonly Quote[]): readonly KnownPrice[] {
  return (['trial', 'production'] as const).flatMap((role) => {
    const quote = quotes.find((candidate) => candidate.stock === role && candidate.state === 'priced');
    const breaks = [...(quote?.breaks ?? [])].sort((a, b) => a.quantity - b.quantity);
    const chosen = breaks.findLast(({ quantity }) => quantity <= 10) ?? breaks[0];
    return chosen === undefined ? [] : [{ role, quantity: chosen.quantity, each: chosen.each }];
  });
}
