/** When something leaves the workshop, as a customer reads it. */
export function leavesWords(days: number): string {
  if (days === 0) return 'sent today';
  if (days === 1) return 'sent tomorrow';
  return `leaves in about ${days} days`;
}

/** What is on the shelf, as a customer reads it. */
export function shelfWords(onShelf: number, what: string, days: number): string {
  if (onShelf === 0) return `Cut and bent for you, ${leavesWords(days)}`;
  return `${onShelf > 9 ? 'More than 9' : onShelf} ${what} on the shelf, ${leavesWords(days)}`;
}
