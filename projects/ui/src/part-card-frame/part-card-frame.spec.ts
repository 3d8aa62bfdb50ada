import { ChangeDetectionStrategy, Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { KraftGround } from '../kraft-ground/kraft-ground';
import { PartCardFrame } from './part-card-frame';

@Component({
  imports: [KraftGround, PartCardFrame],
  template: `<fw-kraft-ground
    ><fw-part-card-frame heading="Part card"><p>137 g</p></fw-part-card-frame></fw-kraft-ground
  >`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Bench {}

describe('PartCardFrame on a KraftGround', () => {
  it('is a named region with its content and an eyelet that readers skip', async () => {
    const fixture = TestBed.createComponent(Bench);
    await fixture.whenStable();
    const card = (fixture.nativeElement as HTMLElement).querySelector('fw-kraft-ground section');
    expect(card?.getAttribute('aria-label')).toBe('Part card');
    expect(card?.textContent).toContain('137 g');
    expect(card?.querySelector('.eyelet')?.getAttribute('aria-hidden')).toBe('true');
  });
});
