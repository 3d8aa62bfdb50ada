import { TestBed } from '@angular/core/testing';
import { BrandMark } from './brand-mark';

describe('BrandMark', () => {
  it('stands with the name, or alone', async () => {
    const fixture = TestBed.createComponent(BrandMark);
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    expect(host.textContent?.trim()).toBe('Foldwright');
    expect(host.querySelectorAll('svg path')).toHaveLength(2);
    fixture.componentRef.setInput('withName', false);
    await fixture.whenStable();
    expect(host.textContent?.trim()).toBe('');
  });
});
