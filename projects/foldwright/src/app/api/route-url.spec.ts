import { localAddress } from './local-address';
import { routeUrl } from './route-url';

describe('routeUrl', () => {
  it('fills in parameters and appends the query, encoded', () => {
    expect(
      routeUrl(
        '/api/parts/:partId/x/:kind',
        { partId: 'a/b', kind: 'dxf' },
        { search: 'pump & tray', paper: undefined },
      ),
    ).toBe('/api/parts/a%2Fb/x/dxf?search=pump%20%26%20tray');
  });

  it('refuses an address with a hole in it', () => {
    expect(() => routeUrl('/api/parts/:partId', {})).toThrow(RangeError);
  });
});

describe('localAddress', () => {
  it('keeps addresses of this application and nothing else', () => {
    expect(localAddress('/orders?late=1')).toBe('/orders?late=1');
    for (const elsewhere of [undefined, '//example.test', '/\\example.test', 'https://example.test', 'orders']) {
      expect(localAddress(elsewhere)).toBe('/');
    }
  });
});
