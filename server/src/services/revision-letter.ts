/** Letters of revisions in order. I, O, Q, S, X and Z are left out: on a drawing they read as other signs. */
const LETTERS = 'ABCDEFGHJKLMNPRTUVWY';

/**
 * Letter of the n-th revision of a part: A, B, ..., Y, AA, AB, ...
 * @param position 0 for the first
 * @throws RangeError when it is no whole number from 0
 */
export function revisionLetter(position: number): string {
  if (!Number.isInteger(position) || position < 0) throw new RangeError(`${position} is no position of a revision.`);
  const last = LETTERS.charAt(position % LETTERS.length);
  const before = Math.floor(position / LETTERS.length);
  return before === 0 ? last : `${revisionLetter(before - 1)}${last}`;
}
