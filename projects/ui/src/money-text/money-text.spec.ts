import { TestBed } from '@angular/core/testing';
import { MoneyText } from './money-text';

describe('MoneyText', () => {
  it('writes whole minor units as money', async () => {
    const fixture = TestBed.createComponent(MoneyText);
    fixture.componentRef.setInput('amount', { amountMinor: 120405, currency: 'EUR' });
    await fixture.whenStable();
    expect((fixture.nativeElement as HTMLElement).textContent).toContain('1,204.05');
  });
});
