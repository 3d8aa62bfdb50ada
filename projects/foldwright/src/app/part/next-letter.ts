/** Letters of revisions in order: those that are misread on a drawing are passed over. Source: common practice, no source. */
const LETTERS = 'ABCDEFGHJKLMNPRTUVWY';

/** The letter of the draft that follows a revision: "H" is followed by "J", "Y" by "AA"; null for what is no such letter. */
export function nextLetter(letter: string): string | null {
  const last = LETTERS.indexOf(letter.slice(-1));
  if (letter === '' || last < 0) return null;
  if (last < LETTERS.length - 1) return letter.slice(0, -1) + LETTERS.charAt(last + 1);
  return letter.length === 1 ? 'AA' : `${nextLetter(letter.slice(0, -1)) ?? ''}A`;
}

/** The button that starts the draft after a revision: "Start draft B". */
export function startDraftWords(letter: string): string {
  const next = nextLetter(letter);
  return next === null ? 'Start the next draft' : `Start draft ${next}`;
}
