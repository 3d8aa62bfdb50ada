import { orderStrip } from './order-strip';

const item = (short: number) => ({ short }) as never;
const marks = (state: string, shorts: readonly number[]) =>
  orderStrip(
    { state: state as never, paymentState: 'paid', items: shorts.map(item), events: [], leavesInDays: 13 },
    new Date('2026-05-16T10:00:00Z'),
  ).map(({ mark }) => mark);

describe('the strip of a customer’s order', () => {
  it('shows what is done, what is now and what is to come', () => {
    expect(marks('placed', [0])).toEqual(['ring', 'tick', 'tick', 'tick']);
    expect(marks('paid', [0, 1])).toEqual(['punched', 'ring', 'tick', 'tick']);
    expect(marks('paid', [0, 0])).toEqual(['punched', 'punched', 'ring', 'tick']);
    expect(marks('shipped', [0])).toEqual(['punched', 'punched', 'punched', 'ring']);
    expect(marks('delivered', [0])).toEqual(['punched', 'punched', 'punched', 'punched']);
    expect(marks('cancelled', [0])).toEqual(['ring']);
  });
});
