import { dayWords, momentWords } from './date-words';

describe('dayWords and momentWords', () => {
  const now = new Date(2026, 4, 20, 12);
  const at = (...parts: [number, number, number, number?, number?]) => new Date(...parts).toISOString();

  it('leaves the year out while it is this one', () => {
    expect(dayWords(at(2026, 2, 4, 9), now)).toBe('4 March');
    expect(dayWords(at(2025, 2, 4, 9), now)).toBe('4 March 2025');
  });

  it('says the time of day, and "today"', () => {
    expect(momentWords(at(2026, 4, 20, 9, 5), now)).toBe('today, 09:05');
    expect(momentWords(at(2026, 4, 19, 14, 2), now)).toBe('19 May, 14:02');
  });
});
