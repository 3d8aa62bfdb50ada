import { TestBed } from '@angular/core/testing';
import type { Feature } from '@foldwright/shared/bending/layout';
import type { Assembly } from '@foldwright/shared/part/assembly';
import { AssemblyForm } from './assembly-form';

const hole = (id: string): Feature => ({
  kind: 'hole',
  id,
  centre: { x: 0, y: 0 },
  purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' },
});

describe('AssemblyForm', () => {
  const show = async (assembly?: Assembly) => {
    const fixture = TestBed.createComponent(AssemblyForm);
    const said: Assembly[] = [];
    fixture.componentRef.setInput('assembly', assembly);
    fixture.componentRef.setInput('features', [hole('h1'), hole('h2')]);
    fixture.componentInstance.changed.subscribe((one) => said.push(one));
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    return { host, said };
  };
  const choose = (host: HTMLElement, at: number, value: string): void => {
    const select = host.querySelectorAll('select')[at];
    if (select === undefined) throw new Error('no such choice');
    select.value = value;
    select.dispatchEvent(new Event('change'));
  };

  it('begins with a bare part about whose seat nobody said anything', async () => {
    const { host, said } = await show();
    choose(host, 0, 'powder-moss');
    expect(said).toEqual([
      { finishId: 'powder-moss', hardwareSet: 'after-coating', seat: null, neighbours: [], bolts: null },
    ]);
  });

  it('takes every clearance hole into the bolts that must start', async () => {
    const { host, said } = await show();
    host.querySelector<HTMLInputElement>('input[type=checkbox]')?.dispatchEvent(new Event('change'));
    expect(said[0]?.bolts).toEqual({ featureIds: ['h1', 'h2'], placeHalfWidthMm: 0.25, wantedChance: 0.95 });
  });

  it('adds a box it must clear, and keeps one that would be inside out as it was', async () => {
    const { host, said } = await show();
    [...host.querySelectorAll('button')].at(-1)?.click();
    const [added] = said;
    if (added === undefined) throw new Error('nothing was said');
    expect(added.neighbours).toHaveLength(1);
    const shown = await show(added);
    const numbers = shown.host.querySelectorAll<HTMLInputElement>('.corner input');
    expect(numbers).toHaveLength(6);
    const x = numbers[0];
    if (x === undefined) throw new Error('no field');
    x.value = '90';
    x.dispatchEvent(new Event('change'));
    expect(shown.said).toEqual([]);
    x.value = '-5';
    x.dispatchEvent(new Event('change'));
    expect(shown.said[0]?.neighbours[0]).toMatchObject({ min: { x: -5, y: 0, z: -20 } });
  });
});
