import { prefixOf } from './workshop-fields';

describe('letters of part numbers', () => {
  it.each([
    ['Larkfield Cartworks', 'LC'],
    ['  élan vital ', 'EV'],
    ['One two three four five', 'OTTF'],
    ['42', ''],
  ])('of “%s” are “%s”', (name, prefix) => {
    expect(prefixOf(name)).toBe(prefix);
  });
});
