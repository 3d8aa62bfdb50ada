import { randomBytes, randomUUID } from 'node:crypto';
import { loggedPath } from './request-log';

describe('an address in the log', () => {
  it('keeps no private link: whoever reads the log is not let in', () => {
    for (let count = 0; count < 50; count += 1) {
      const link = randomBytes(32).toString('base64url');
      expect(loggedPath(`/api/sale-links/${link}/fitting-sheet`)).toBe('/api/sale-links/…/fitting-sheet');
      expect(loggedPath(`/shop/order/${link}`)).toBe('/shop/order/…');
    }
  });

  it('stays as it is otherwise, ids of rows included', () => {
    const path = `/api/sales/${randomUUID()}/shipments/${randomUUID()}/packing-slip`;
    expect(loggedPath(path)).toBe(path);
    expect(loggedPath('/')).toBe('/');
  });
});
