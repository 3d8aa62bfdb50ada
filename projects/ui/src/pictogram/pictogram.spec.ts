import { TestBed } from '@angular/core/testing';
import { Pictogram } from './pictogram';
import { PICTOGRAMS, TRADE_PICTOGRAMS } from './pictogram-paths';

describe('Pictogram', () => {
  async function draw(inputs: Record<string, unknown>): Promise<HTMLElement> {
    const fixture = TestBed.createComponent(Pictogram);
    for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
    await fixture.whenStable();
    return fixture.nativeElement as HTMLElement;
  }

  it('draws every path of the named sign', async () => {
    const host = await draw({ name: 'hem' });
    expect(host.querySelectorAll('path')).toHaveLength(PICTOGRAMS.hem.length);
    expect(host.querySelector('path')?.getAttribute('d')).toBe(PICTOGRAMS.hem[0]?.d);
  });

  it('is silent beside a word and named without one', async () => {
    expect((await draw({ name: 'undo' })).getAttribute('aria-hidden')).toBe('true');
    const named = await draw({ name: 'undo', label: 'Undo' });
    expect(named.getAttribute('role')).toBe('img');
    expect(named.getAttribute('aria-label')).toBe('Undo');
    expect(named.getAttribute('aria-hidden')).toBeNull();
  });

  it('knows the twenty-four signs of the trade', () => {
    expect(Object.keys(TRADE_PICTOGRAMS)).toHaveLength(24);
    for (const paths of Object.values(PICTOGRAMS)) {
      for (const path of paths) expect(path.d).toMatch(/^M[\d.-]/);
    }
  });
});
