import { randomUUID } from 'node:crypto';
import type { OpenShop } from '../support/open-shop';
import { sendOnce, sendOrder, startOpenShop } from '../support/open-shop';
import { TestBrowser, addPerson, asOwner } from '../support/people';
import { ADDRESS, addHardware, expectBalance, offerFor, place, readLink, receive } from '../support/shop';

jest.setTimeout(90_000);

describe('the shelf', () => {
  let shop: OpenShop;

  beforeEach(async () => {
    shop = await startOpenShop();
  });
  afterEach(() => shop.close());

  const moss = () => ({ kind: 'bracket' as const, revisionId: shop.revisionId, finishId: 'powder-moss' });
  const receipt = (changes: object = {}) => ({ what: moss(), quantity: 1, orderId: null, reason: '', ...changes });
  const adjust = (positionId: string, change: number, key?: string, reason = 'counted') =>
    sendOnce(shop.owner, `/api/stock/${positionId}/adjustments`, { change, reason }, key);
  const readShelf = async () => (await shop.owner.get('/api/stock').expect(200)).body;
  const readMoves = async (positionId: string) =>
    (await shop.owner.get(`/api/stock/${positionId}/moves`).expect(200)).body.moves;
  /** A sale of one bracket that keeps what is there. */
  const sell = () => place(shop.guest, [shop.line()]);

  it('takes in brackets by finish, and hardware, and shows what they look like', async () => {
    expect(await readShelf()).toMatchObject({ brackets: [], hardware: [], arrivals: [], drawings: [] });
    await receive(shop.owner, moss(), 3);
    await receive(shop.owner, { ...moss(), finishId: 'bare' }, 1);
    expect(await receive(shop.owner, moss(), 2)).toMatchObject({ onHand: 5, reserved: 0 });
    const hardwareId = await addHardware(shop.owner);
    const before = await readShelf();
    expect(before.hardware).toMatchObject([{ positionId: null, onHand: 0, free: 0, short: 0 }]);
    await receive(shop.owner, { kind: 'hardware', hardwareId }, 40);
    const { brackets, hardware, drawings } = await readShelf();
    expect(brackets).toMatchObject([
      { finishId: 'bare', onHand: 1, bracket: { letter: 'A', hand: 'either', revisionId: shop.revisionId } },
      { finishId: 'powder-moss', onHand: 5, reserved: 0, free: 5, short: 0 },
    ]);
    expect(hardware).toMatchObject([{ onHand: 40, free: 40, hardware: { id: hardwareId } }]);
    // One drawing for both finishes.
    expect(drawings.map(({ revisionId }: { revisionId: string }) => revisionId)).toEqual([shop.revisionId]);
    await expectBalance(shop.owner);
  });

  it('counts a press once, also when it is pressed twice at once', async () => {
    const key = randomUUID();
    const answers = await Promise.all(
      [1, 2, 3].map(() => sendOnce(shop.owner, '/api/stock/receipts', receipt({ quantity: 4 }), key)),
    );
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
    expect(new Set(answers.map(({ body }) => JSON.stringify(body))).size).toBe(1);
    const [position] = (await readShelf()).brackets;
    expect(position).toMatchObject({ onHand: 4 });
    const other = await sendOnce(shop.owner, '/api/stock/receipts', receipt({ quantity: 5 }), key);
    expect([other.status, other.body.type]).toEqual([409, '/problems/already-exists']);

    const adjustKey = randomUUID();
    await Promise.all([1, 2].map(() => adjust(position.positionId, -1, adjustKey)));
    expect((await readShelf()).brackets).toMatchObject([{ onHand: 3 }]);
    expect(await readMoves(position.positionId)).toHaveLength(2);
  });

  it('refuses what cannot be put there', async () => {
    const send = (changes: object) => sendOnce(shop.owner, '/api/stock/receipts', receipt(changes));
    expect((await send({ quantity: 0 })).status).toBe(400);
    expect((await send({ quantity: 1.5 })).status).toBe(400);
    expect((await send({ what: { ...moss(), finishId: 'powder-plaid' } })).status).toBe(400);
    expect((await send({ what: { ...moss(), revisionId: randomUUID() } })).status).toBe(404);
    expect((await send({ what: { kind: 'hardware', hardwareId: randomUUID() } })).status).toBe(404);
    expect((await send({ orderId: randomUUID() })).status).toBe(404);
    expect((await readShelf()).brackets).toEqual([]);
    const { positionId } = await receive(shop.owner, moss(), 1);
    expect((await adjust(positionId, 0)).status).toBe(400);
    expect((await adjust(positionId, 1, undefined, '  ')).status).toBe(400);
    expect((await adjust(randomUUID(), 1)).status).toBe(404);
    await shop.owner.get(`/api/stock/${randomUUID()}/moves`).expect(404);
  });

  it('is corrected with a reason, never below what is kept for sales', async () => {
    const { positionId } = await receive(shop.owner, moss(), 3);
    await sell();
    await sell();
    const refused = await adjust(positionId, -2);
    expect(refused.status).toBe(409);
    expect(refused.body).toMatchObject({
      type: '/problems/not-enough-stock',
      detail: '3 lie on the shelf, 2 of them are kept for sales.',
      kept: 'The shelf is as it was.',
    });
    expect((await adjust(positionId, -1, undefined, 'one fell')).body).toEqual({ positionId, onHand: 2, reserved: 2 });
    const moves = await readMoves(positionId);
    expect(moves).toMatchObject([
      { kind: 'adjusted', onHandChange: -1, onHandAfter: 2, reason: 'one fell', by: 'Imogen Harrow' },
      { kind: 'reserved', onHandChange: 0, reservedChange: 1, saleNumber: 1002, by: 'Foldwright' },
      { kind: 'reserved', saleNumber: 1001 },
      { kind: 'received', onHandChange: 3, onHandAfter: 3, saleNumber: null, orderNumber: null },
    ]);
    await expectBalance(shop.owner);
    const audit = await asOwner(shop.ownerUrl, async (client) => {
      const { rows } = await client.query('SELECT what, about FROM audit_entries ORDER BY created_at');
      return rows;
    });
    expect(JSON.stringify(audit)).toContain('one fell');
  });

  it('serves sales that wait, the oldest first, by what comes in and by what is found', async () => {
    const links = [await sell(), await sell(), await sell()];
    const [first, second, third] = await Promise.all(links.map((link) => readLink(shop.guest, link)));
    expect(first?.items).toMatchObject([{ short: 1 }]);
    const { positionId, reserved } = await receive(shop.owner, moss(), 1);
    expect(reserved).toBe(1);
    expect((await readLink(shop.guest, links[0] ?? '')).items).toMatchObject([{ short: 0 }]);
    expect((await readLink(shop.guest, links[1] ?? '')).items).toMatchObject([{ short: 1 }]);
    expect((await adjust(positionId, 2)).body).toEqual({ positionId, onHand: 3, reserved: 3 });
    expect(new Set([first?.number, second?.number, third?.number]).size).toBe(3);
    for (const link of links) expect((await readLink(shop.guest, link)).items).toMatchObject([{ short: 0 }]);
    // Only paid sales count as short on the shelf: what nobody pays for is not cut.
    await sell();
    expect((await readShelf()).brackets).toMatchObject([{ free: 0, short: 0 }]);
    await expectBalance(shop.owner);
  });

  it('stays whole when many receive and correct at once', async () => {
    const { positionId } = await receive(shop.owner, moss(), 4);
    await sell();
    await sell();
    const answers = await Promise.all([
      ...Array.from({ length: 8 }, () => adjust(positionId, -1)),
      ...Array.from({ length: 4 }, () => sendOnce(shop.owner, '/api/stock/receipts', receipt())),
    ]);
    const done = answers.map(({ status }, at) => ({ change: at < 8 ? -1 : 1, status }));
    expect(done.every(({ status }) => status === 201 || status === 409)).toBe(true);
    expect(done.filter(({ change, status }) => change === 1 && status === 201)).toHaveLength(4);
    const sum = done.reduce((total, { change, status }) => total + (status === 201 ? change : 0), 4);
    const [position] = (await readShelf()).brackets;
    expect(position).toMatchObject({ onHand: sum, reserved: 2, free: sum - 2 });
    expect(sum).toBeGreaterThanOrEqual(2);
    // Two at least were refused: at most six of eight could go.
    expect(done.filter(({ status }) => status === 409).length).toBeGreaterThanOrEqual(2);
    await expectBalance(shop.owner);
  });

  it('gives the last bracket to a sale or to a correction, never to both', async () => {
    const { positionId } = await receive(shop.owner, moss(), 1);
    const { offerHash } = await offerFor(shop.guest, [shop.line()]);
    const order = { lines: [shop.line()], offerHash, email: 'ravi@example.test', address: ADDRESS };
    const [sold, corrected] = await Promise.all([sendOrder(shop.guest, order), adjust(positionId, -1)]);
    expect([sold.status, corrected.status].sort()).toEqual([201, 409]);
    const [position] = (await readShelf()).brackets;
    expect(position).toMatchObject(sold.status === 201 ? { onHand: 1, reserved: 1 } : { onHand: 0, reserved: 0 });
    await expectBalance(shop.owner);
  });

  it('is read by a viewer and changed by makers only', async () => {
    const { positionId } = await receive(shop.owner, moss(), 1);
    const workshop = await asOwner(shop.ownerUrl, async (client) => {
      const { rows } = await client.query<{ id: string }>('SELECT id FROM workshops');
      return rows[0]?.id ?? '';
    });
    const viewer = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Odd Viewer', { [workshop]: 'viewer' }),
    );
    await viewer.get('/api/stock').expect(200);
    await viewer.get(`/api/stock/${positionId}/moves`).expect(200);
    expect((await sendOnce(viewer, '/api/stock/receipts', receipt())).status).toBe(403);
    const body = { change: 1, reason: 'counted' };
    expect((await sendOnce(viewer, `/api/stock/${positionId}/adjustments`, body)).status).toBe(403);
  });
});
