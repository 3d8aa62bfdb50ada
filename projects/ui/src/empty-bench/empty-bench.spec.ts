import { ChangeDetectionStrategy, Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { EmptyBench } from './empty-bench';

@Component({
  imports: [EmptyBench],
  template: `<fw-empty-bench heading="The bench is clear." lead="Start with card.">
    <button benchAction type="button">Take a photo</button>
    <p benchAside>Or type sizes.</p>
    <svg benchPicture></svg>
  </fw-empty-bench>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Bench {}

describe('EmptyBench', () => {
  it('says what to do first, then how, beside a picture', async () => {
    const fixture = TestBed.createComponent(Bench);
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    expect(host.querySelector('h2')?.textContent).toBe('The bench is clear.');
    expect(host.querySelector('.go button')?.textContent).toBe('Take a photo');
    expect(host.querySelector('.aside')?.textContent).toContain('Or type sizes.');
    expect(host.querySelector('.picture svg')).not.toBeNull();
  });
});
