import { OrderDesk } from './order-desk';
import { drawPlate } from './test-drawing';
import type { QuoteRequest, ShopState } from './wire';
import { EMPTY_SHOP_STATE } from './wire';

const PLATE = drawPlate({
  widthMm: 192,
  heightMm: 92,
  holes: [{ x: 20, y: 20, diameterMm: 6.6 }],
  towardAtX: [60],
});
const BEND = { name: 'B1', angleDeg: 90, direction: 'toward', insideRadiusMm: 1, lengthMm: 92 } as const;

const asked = (changes: Partial<QuoteRequest> = {}): QuoteRequest => ({
  reference: 'test',
  partName: 'Test plate',
  dxf: PLATE,
  material: 'DC01',
  thicknessMm: 1,
  quantities: [1, 10, 50],
  currency: 'EUR',
  statement: 'cut-and-bend-to-our-flat',
  bends: [BEND],
  ...changes,
});

function openDesk(): { desk: OrderDesk; state: ShopState; walk: () => void; told: string[] } {
  const state = structuredClone(EMPTY_SHOP_STATE);
  const waiting: (() => void)[] = [];
  const told: string[] = [];
  const desk = new OrderDesk(state, {
    now: () => new Date('2026-03-02T08:00:00Z'),
    paceMs: 1000,
    after: (_delayMs, run) => void waiting.push(run),
    save: () => undefined,
    announce: (body) => void told.push(String(JSON.parse(body).type)),
  });
  return { desk, state, told, walk: () => waiting.shift()?.() };
}

const refusal = (changes: Partial<QuoteRequest>) =>
  openDesk()
    .desk.quote(asked(changes))
    .reasons.map((reason) => reason.code);

describe('prices of the cutting shop', () => {
  it('adds up one piece of a plate of 192 by 92 by 1 mm in cold rolled steel', () => {
    // By hand: the sheet is 0.2 x 0.1 x 0.001 m3 at 7850 kg/m3 = 0.157 kg at 190 -> 30; the cut is 568 mm of outline and
    // 20.7 mm of hole at 70 a metre -> 41; two pierces at 6 -> 12; deburring 0.5887 m at 22 -> 13; one tool, one bend.
    const [one] = openDesk().desk.quote(asked()).breaks;
    expect(one?.lines.map((line) => line.amountMinor)).toEqual([1800, 30, 41, 12, 13, 650, 95, 590]);
    expect(one).toMatchObject({ quantity: 1, totalMinor: 3231, eachMinor: 3231 });
  });

  it('takes less for each piece of a larger lot, and its lines always add up', () => {
    const { breaks } = openDesk().desk.quote(asked());
    const each = breaks.map((row) => row.eachMinor);
    expect(each).toEqual([...each].sort((a, b) => b - a));
    for (const row of breaks) expect(row.lines.reduce((sum, line) => sum + line.amountMinor, 0)).toBe(row.totalMinor);
  });

  it('prices in dollars when asked', () => {
    expect(openDesk().desk.quote(asked({ currency: 'USD' })).breaks[0]?.lines[0]?.amountMinor).toBe(1944);
  });
});

describe('opinions of the cutting shop', () => {
  it.each([
    ['a blank larger than the bed', { dxf: drawPlate({ widthMm: 3010, heightMm: 500 }), bends: [] }, 'blank-too-large'],
    ['a blank wider than the bed', { dxf: drawPlate({ widthMm: 1600, heightMm: 1510 }), bends: [] }, 'blank-too-large'],
    ['a sliver', { dxf: drawPlate({ widthMm: 100, heightMm: 10 }), bends: [] }, 'blank-too-small'],
    ['an open outline', { dxf: drawPlate({ widthMm: 100, heightMm: 50, isOpen: true }), bends: [] }, 'open-contour'],
    [
      'a hole below 0.8 of the thickness',
      { dxf: drawPlate({ widthMm: 100, heightMm: 50, holes: [{ x: 20, y: 20, diameterMm: 0.7 }] }), bends: [] },
      'hole-too-small',
    ],
    [
      'a hole outside',
      { dxf: drawPlate({ widthMm: 100, heightMm: 50, holes: [{ x: 120, y: 20, diameterMm: 5 }] }), bends: [] },
      'opening-outside',
    ],
    ['a sheet it does not keep', { material: 'UNOBTAINIUM' }, 'not-stocked'],
    ['a thickness it does not keep', { thicknessMm: 1.37 }, 'not-stocked'],
    ['a bend line without a row in the table', { bends: [] }, 'bends-do-not-match'],
    ['a row in the table without a bend line', { bends: [BEND, BEND] }, 'bends-do-not-match'],
    ['a bend the other way than drawn', { bends: [{ ...BEND, direction: 'away' as const }] }, 'bends-do-not-match'],
    ['a file that is no drawing', { dxf: 'dear shop' }, 'drawing-unreadable'],
    ['more pieces than it takes', { quantities: [2001] }, 'too-many-pieces'],
  ])('refuses %s', (_name, changes, code) => {
    expect(refusal(changes)).toContain(code);
  });

  it('takes a blank that just fits the bed, and a hole of exactly 0.8 of the thickness', () => {
    const dxf = drawPlate({ widthMm: 3000, heightMm: 1500, holes: [{ x: 20, y: 20, diameterMm: 0.8 }] });
    expect(refusal({ dxf, bends: [] })).toEqual([]);
  });
});

describe('orders of the cutting shop', () => {
  const drawing = Buffer.from('%PDF-1.7 test').toString('base64');
  const ordered = (quoteId: string) => ({ reference: 'F-1', quoteId, quantity: 10, dxf: PLATE, drawing });

  it('walks an order through the shop and gives it a tracking code', () => {
    const { desk, walk, told } = openDesk();
    const { order } = desk.order(ordered(desk.quote(asked()).id));
    for (let step = 0; step < 6; step += 1) walk();
    expect(told).toEqual(['order.accepted', 'order.cutting', 'order.bending', 'order.shipped']);
    expect(order.trackingCode).toMatch(/^AM [0-9A-F]{10}$/);
  });

  it('answers a second request with the first order', () => {
    const { desk, state } = openDesk();
    const request = ordered(desk.quote(asked()).id);
    const first = desk.order(request);
    expect(desk.order(request)).toEqual({ order: first.order, isNew: false });
    expect(Object.keys(state.orders)).toHaveLength(1);
  });

  it('refuses another drawing than the one it priced', () => {
    const { desk } = openDesk();
    const request = { ...ordered(desk.quote(asked()).id), dxf: drawPlate({ widthMm: 1, heightMm: 1 }) };
    expect(() => desk.order(request)).toThrow('not the one that was quoted');
  });

  it('hands an order back when told to be unwilling', () => {
    const { desk, state, walk, told } = openDesk();
    const { order } = desk.order(ordered(desk.quote(asked()).id));
    state.mood.refuseOrders = true;
    for (let step = 0; step < 3; step += 1) walk();
    expect(told).toEqual(['order.refused']);
    expect(order.reason).toContain('hand this order back');
  });

  it('cancels before cutting, not after', () => {
    const { desk, walk } = openDesk();
    const quoteId = desk.quote(asked()).id;
    const early = desk.order(ordered(quoteId)).order;
    expect(desk.cancel(early.id).state).toBe('cancelled');
    const late = desk.order({ ...ordered(quoteId), reference: 'F-2' }).order;
    for (let step = 0; step < 3; step += 1) walk();
    expect(() => desk.cancel(late.id)).toThrow('already');
  });
});
