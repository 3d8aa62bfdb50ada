import { SLOT_COUNT } from './nick-code';

/**
 * A row of nicks in steps of one pitch from its first nick: two nicks a step and a half apart that say where the row begins and which way
 * it runs, the slots a step apart, and a last nick that ends the row and so tells the pitch to whoever reads it.
 */
const SECOND_NICK = 1.5;
const FIRST_SLOT = 3;
export const ROW_STEPS = FIRST_SLOT + SLOT_COUNT;

/** Places of a row's nicks, in steps from the first. */
export function placesOf(slots: readonly number[]): readonly number[] {
  return [0, SECOND_NICK, ...slots.map((slot) => FIRST_SLOT + slot), ROW_STEPS];
}

/** Shares of a step by which a nick may be off its place. */
const OFF_PLACE = 0.2;

/**
 * The slots of a row from the places of its nicks.
 * @param at places along the edge in rising order, mm
 * @returns `null` when they are no row that runs this way
 */
export function slotsFrom(at: readonly number[]): readonly number[] | null {
  const [first, second, last] = [at[0], at[1], at.at(-1)];
  if (first === undefined || second === undefined || last === undefined || at.length < 4) return null;
  const pitchMm = (last - first) / ROW_STEPS;
  if (Math.abs((second - first) / pitchMm - SECOND_NICK) > OFF_PLACE) return null;
  const slots: number[] = [];
  for (const place of at.slice(2, -1)) {
    const step = (place - first) / pitchMm - FIRST_SLOT;
    const slot = Math.round(step);
    if (slot < 0 || slot >= SLOT_COUNT || Math.abs(step - slot) > OFF_PLACE) return null;
    slots.push(slot);
  }
  return slots;
}
