import { nextLetter } from './next-letter';

describe('nextLetter', () => {
  it.each([
    ['A', 'B'],
    ['H', 'J'],
    ['W', 'Y'],
    ['Y', 'AA'],
    ['AY', 'BA'],
    ['I', null],
    ['', null],
  ])('%s is followed by %s', (letter, expected) => expect(nextLetter(letter)).toBe(expected));
});
