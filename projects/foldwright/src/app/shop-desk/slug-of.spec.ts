import { slugOf } from './slug-of';

describe('a title as an address', () => {
  it.each([
    ['Two-pump water kit', 'two-pump-water-kit'],
    ['  Žulička, Ø 17!', 'zulicka-17'],
    ['!', 'listing'],
    ['x'.repeat(80), 'x'.repeat(60)],
  ])('%s is %s', (title, slug) => {
    expect(slugOf(title)).toBe(slug);
  });
});
