import { revisionLetter } from './revision-letter';

describe('revisionLetter', () => {
  it('leaves out the letters that read as other signs', () => {
    const letters = Array.from({ length: 20 }, (_, position) => revisionLetter(position));
    expect(letters.join('')).toBe('ABCDEFGHJKLMNPRTUVWY');
  });

  it('goes on with two letters', () => {
    expect([20, 21, 39, 40, 419, 420].map(revisionLetter)).toEqual(['AA', 'AB', 'AY', 'BA', 'YY', 'AAA']);
  });

  it('has none for what is no position', () => {
    expect(() => revisionLetter(-1)).toThrow(RangeError);
    expect(() => revisionLetter(0.5)).toThrow(RangeError);
  });
});
