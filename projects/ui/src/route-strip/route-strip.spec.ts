import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { type RouteStep, RouteStrip } from './route-strip';
import { RouteStripHarness } from './testing/route-strip-harness';

const STEPS: readonly RouteStep[] = [
  { id: 'outline', label: 'Outline', sub: 'squared up', mark: 'punched' },
  { id: 'bends', label: 'Bends', sub: '4', mark: 'ring' },
  { id: 'checks', label: 'Checks', mark: 'tick' },
  { id: 'release', label: 'Release', mark: 'tick', disabled: true },
];

describe('RouteStrip', () => {
  async function draw(inputs: Record<string, unknown> = {}) {
    TestBed.configureTestingModule({ providers: [provideRouter([])] });
    const fixture = TestBed.createComponent(RouteStrip);
    for (const [name, value] of Object.entries({ steps: STEPS, label: 'Steps', canChoose: true, ...inputs })) {
      fixture.componentRef.setInput(name, value);
    }
    const chosen: string[] = [];
    fixture.componentInstance.chosen.subscribe((id) => chosen.push(id));
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    document.body.append(host);
    return {
      fixture,
      host,
      chosen,
      harness: await TestbedHarnessEnvironment.harnessForFixture(fixture, RouteStripHarness),
    };
  }

  it('says of each step what it is and whether it is done', async () => {
    const { harness } = await draw();
    const steps = await harness.steps();
    expect(steps[0]).toMatch(/Outline\s*squared up\s*, done/);
    expect(steps[1]).toMatch(/Bends\s*4\s*, now/);
    expect(steps[2]).toMatch(/Checks\s*, to come/);
    expect(await harness.current()).toBe(1);
  });

  it('tells which step was chosen, and not a disabled one', async () => {
    const { harness, chosen } = await draw();
    await harness.choose(2);
    await harness.choose(3);
    expect(chosen).toEqual(['checks']);
  });

  it('walks by arrow keys, Home and End past what is disabled', async () => {
    const { host } = await draw();
    const buttons = [...host.querySelectorAll<HTMLButtonElement>('button')];
    const press = (key: string) =>
      document.activeElement?.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
    buttons[0]?.focus();
    press('ArrowRight');
    expect(document.activeElement).toBe(buttons[1]);
    press('End');
    expect(document.activeElement).toBe(buttons[2]);
    press('ArrowRight');
    expect(document.activeElement).toBe(buttons[2]);
    press('Home');
    expect(document.activeElement).toBe(buttons[0]);
  });

  it('makes steps with an address links and leaves a timeline plain text', async () => {
    const linked = await draw({ steps: [{ id: 'a', label: 'A', mark: 'ring', link: '/a' }] });
    expect(linked.host.querySelector('a')?.getAttribute('href')).toBe('/a');
    TestBed.resetTestingModule();
    const plain = await draw({ canChoose: false });
    expect(plain.host.querySelectorAll('a, button')).toHaveLength(0);
    expect(plain.host.querySelector('ol')?.tabIndex).toBe(0);
    expect(linked.host.querySelector('ol')?.hasAttribute('tabindex')).toBe(false);
  });

  it('strikes a mark once, when it becomes done', async () => {
    const { fixture, host } = await draw();
    expect(host.querySelector('.struck')).toBeNull();
    fixture.componentRef.setInput(
      'steps',
      STEPS.map((step) => (step.id === 'bends' ? { ...step, mark: 'punched' } : step)),
    );
    await fixture.whenStable();
    expect(host.querySelectorAll('.struck')).toHaveLength(1);
  });
});
