import { TestBed } from '@angular/core/testing';
import { CartStore, addLine } from './cart-store';

const LISTING = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const line = (quantity: number, finishId = 'bare') => ({ listingId: LISTING, finishId, quantity });

describe('the cart', () => {
  beforeEach(() => localStorage.clear());

  it('puts the same thing in the same finish together, and never more than can be ordered', () => {
    expect(addLine([line(2)], line(3))).toEqual([line(5)]);
    expect(addLine([line(2)], line(1, 'powder-moss'))).toHaveLength(2);
    expect(addLine([line(499)], line(3))).toEqual([line(500)]);
  });

  it('is kept for each shop and read again', () => {
    const cart = TestBed.inject(CartStore);
    cart.add('larkfield', line(2));
    expect(cart.lines('other')()).toEqual([]);
    TestBed.resetTestingModule();
    expect(TestBed.inject(CartStore).lines('larkfield')()).toEqual([line(2)]);
  });

  it('takes a line out at none, and what another tab did in', () => {
    const cart = TestBed.inject(CartStore);
    cart.add('larkfield', line(2));
    cart.change('larkfield', line(2), 0);
    expect(cart.lines('larkfield')()).toEqual([]);
    localStorage.setItem('foldwright.cart.larkfield', JSON.stringify([line(4)]));
    window.dispatchEvent(new StorageEvent('storage', { key: 'foldwright.cart.larkfield' }));
    expect(cart.lines('larkfield')()).toEqual([line(4)]);
  });

  it('begins anew when what was kept can’t be read', () => {
    localStorage.setItem('foldwright.cart.larkfield', '{"broken');
    expect(TestBed.inject(CartStore).lines('larkfield')()).toEqual([]);
  });
});
