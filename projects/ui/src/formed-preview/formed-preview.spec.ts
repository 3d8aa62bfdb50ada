import { TestBed } from '@angular/core/testing';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { FormedPreview } from './formed-preview';

const BRACKET = starterDocument({ shape: 'l-bracket', baseMm: 60, flangeMm: 40, widthMm: 50, bendAngleDeg: 90 });

describe('FormedPreview', () => {
  async function draw(inputs: Record<string, unknown>): Promise<HTMLElement> {
    const fixture = TestBed.createComponent(FormedPreview);
    for (const [name, value] of Object.entries({ document: BRACKET, madeOf: 'blued', pxPerMm: 1, ...inputs })) {
      fixture.componentRef.setInput(name, value);
    }
    await fixture.whenStable();
    return fixture.nativeElement as HTMLElement;
  }
  const width = (host: HTMLElement) => Number(host.querySelector('svg')?.getAttribute('width'));

  it('is drawn to scale', async () => {
    const [once, twice] = [await draw({}), await draw({ pxPerMm: 2 })];
    expect(width(twice)).toBeCloseTo(2 * width(once), 6);
  });

  it('lies flat with its creases as card, and stands formed in metal', async () => {
    const card = await draw({ madeOf: 'card' });
    expect(card.querySelector('.crease')).not.toBeNull();
    expect(card.className).toBe('card');
    const metal = await draw({ madeOf: 'moss' });
    expect(metal.querySelector('.crease')).toBeNull();
    expect(metal.querySelectorAll('.scribed').length).toBeGreaterThan(0);
  });

  it('has a name only where it is asked for', async () => {
    expect((await draw({})).querySelector('svg')?.getAttribute('aria-hidden')).toBe('true');
    expect((await draw({ label: 'L bracket' })).querySelector('svg')?.getAttribute('role')).toBe('img');
  });
});
