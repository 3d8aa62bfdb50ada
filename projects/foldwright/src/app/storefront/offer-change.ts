import type { Offer } from '@foldwright/shared/contracts/storefront';
import { formatMoney } from '@foldwright/shared/units/money';
import { leavesWords } from './stock-words';

/** What is different between the offer somebody saw and the one there is now, a line each. */
export function offerChanges(seen: Offer, now: Offer): readonly string[] {
  const changes: string[] = [];
  for (const line of seen.lines) {
    const current = now.lines.find((one) => one.listingId === line.listingId && one.finishId === line.finishId);
    if (current === undefined) {
      changes.push(`${line.title} can’t be had any more.`);
      continue;
    }
    if (current.each.amountMinor !== line.each.amountMinor) {
      changes.push(
        `${line.title}: ${formatMoney(line.each)} each was what you saw, now it is ${formatMoney(current.each)}.`,
      );
    }
    const left = line.contents.filter((piece) => !current.contents.includes(piece));
    const came = current.contents.filter((piece) => !line.contents.includes(piece));
    if (left.length > 0) changes.push(`${line.title}: no longer in it: ${left.join('; ')}.`);
    if (came.length > 0) changes.push(`${line.title}: now in it: ${came.join('; ')}.`);
    if (current.fromShelf !== line.fromShelf) {
      changes.push(
        `${line.title}: ${line.fromShelf} were on the shelf, now there ${current.fromShelf === 1 ? 'is' : 'are'} ${current.fromShelf}; it ${leavesWords(current.leavesInDays)}.`,
      );
    }
  }
  if (seen.postage.amountMinor !== now.postage.amountMinor) {
    changes.push(`Postage: ${formatMoney(seen.postage)} was what you saw, now it is ${formatMoney(now.postage)}.`);
  }
  if (seen.taxBasisPoints !== now.taxBasisPoints) {
    changes.push(`${now.taxName} is ${now.taxBasisPoints / 100} % now.`);
  }
  return changes.length > 0 ? changes : ['The offer was worked out anew.'];
}
