/**
 * The code behind revision nicks: which of fourteen slots along an edge carry a nick. Always five do, so a nick that was lost or a dent
 * that was added shows; and the places of the five add up to a multiple of fourteen, so one that was read in the wrong slot shows too.
 */
export const SLOT_COUNT = 14;
export const NICK_COUNT = 5;

export type NickHand = 'either' | 'left' | 'right';

/** What nicks say: the revision letter and the hand of the part. */
export interface NickMessage {
  /** "A" to "Z", then "AA" on, as far as `LETTER_COUNT` goes. */
  readonly letter: string;
  readonly hand: NickHand;
}

const HANDS: readonly NickHand[] = ['either', 'left', 'right'];

/** Every valid pattern in rising order: the slots that carry a nick, 0 to 13. */
const PATTERNS: readonly (readonly number[])[] = patternsFrom(0, []);

/** How many revision letters the code holds, each in three hands. */
export const LETTER_COUNT = Math.floor(PATTERNS.length / HANDS.length);

function patternsFrom(next: number, chosen: readonly number[]): readonly (readonly number[])[] {
  if (chosen.length === NICK_COUNT)
    return chosen.reduce((sum, slot) => sum + slot, 0) % SLOT_COUNT === 0 ? [chosen] : [];
  const patterns: (readonly number[])[] = [];
  for (let slot = next; slot < SLOT_COUNT; slot += 1) patterns.push(...patternsFrom(slot + 1, [...chosen, slot]));
  return patterns;
}

/** Number of a revision letter, A = 0, Z = 25, AA = 26; `null` for what is no revision letter. */
function numberOfLetter(letter: string): number | null {
  if (!/^[A-Z]{1,2}$/u.test(letter)) return null;
  return [...letter].reduce((sum, one) => sum * 26 + one.charCodeAt(0) - 64, 0) - 1;
}

function letterOfNumber(number: number): string {
  const last = String.fromCharCode(65 + (number % 26));
  return number < 26 ? last : letterOfNumber(Math.floor(number / 26) - 1) + last;
}

/** Slots that carry a nick for a message, rising; `null` when the letter is beyond the code. */
export function slotsOf({ letter, hand }: NickMessage): readonly number[] | null {
  const number = numberOfLetter(letter);
  if (number === null || number >= LETTER_COUNT) return null;
  return PATTERNS[number * HANDS.length + HANDS.indexOf(hand)] ?? null;
}

/** The message that slots stand for; `null` when no message has them, which a single fault always leads to. */
export function messageOf(slots: readonly number[]): NickMessage | null {
  const key = [...slots].sort((a, b) => a - b).join(' ');
  const at = PATTERNS.findIndex((pattern) => pattern.join(' ') === key);
  const hand = HANDS[at % HANDS.length];
  const number = Math.floor(at / HANDS.length);
  return at < 0 || hand === undefined || number >= LETTER_COUNT ? null : { letter: letterOfNumber(number), hand };
}
