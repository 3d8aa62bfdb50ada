import { TestBed } from '@angular/core/testing';
import { ScaleBar } from './scale-bar';

describe('ScaleBar', () => {
  it('is as long as its length at the scale', async () => {
    const fixture = TestBed.createComponent(ScaleBar);
    fixture.componentRef.setInput('pxPerMm', 0.8);
    fixture.componentRef.setInput('lengthMm', 50);
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    expect(host.querySelector('path')?.getAttribute('d')).toContain('h40');
    expect(host.querySelector('svg')?.getAttribute('aria-label')).toBe('Scale bar, 50 mm');
  });
});
