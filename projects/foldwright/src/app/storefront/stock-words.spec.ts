import { leavesWords, shelfWords } from './stock-words';

describe('words about the shelf', () => {
  it('say when it leaves', () => {
    expect([0, 1, 12].map(leavesWords)).toEqual(['sent today', 'sent tomorrow', 'leaves in about 12 days']);
  });

  it('say how many there are, and never more than anybody needs to know', () => {
    expect(shelfWords(6, 'in moss', 1)).toBe('6 in moss on the shelf, sent tomorrow');
    expect(shelfWords(240, 'in moss', 1)).toBe('More than 9 in moss on the shelf, sent tomorrow');
    expect(shelfWords(0, 'in moss', 13)).toBe('Cut and bent for you, leaves in about 13 days');
  });
});
