import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { TestBed } from '@angular/core/testing';
import { type RuleTool, type RuleVerb, SteelRule } from './steel-rule';
import { SteelRuleHarness } from './testing/steel-rule-harness';

const VERBS: readonly RuleVerb[] = [
  { id: 'length', label: 'Length', icon: 'edge-length', key: 'L', primary: true },
  { id: 'slide', label: 'Slide', icon: 'slide', key: 'S' },
  { id: 'hem', label: 'Hem', icon: 'hem', disabled: true },
];
const TOOLS: readonly RuleTool[] = [{ id: 'undo', label: 'Undo: slot moved', icon: 'undo' }];

describe('SteelRule', () => {
  async function draw() {
    const fixture = TestBed.createComponent(SteelRule);
    const inputs = {
      pxPerMm: 3,
      zeroPx: 40,
      verbs: VERBS,
      tools: TOOLS,
      what: ['Free edge', 'back flange'],
      selection: { fromMm: 0, toMm: 84 },
    };
    for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
    const chosen: string[] = [];
    fixture.componentInstance.verb.subscribe((id) => chosen.push(id));
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    document.body.append(host);
    return {
      host,
      chosen,
      fixture,
      harness: await TestbedHarnessEnvironment.harnessForFixture(fixture, SteelRuleHarness),
    };
  }

  it('offers the verbs of the selection, and tools by name', async () => {
    const { harness } = await draw();
    expect(await harness.verbs()).toEqual(['Length L', 'Slide S', 'Hem', 'Undo: slot moved']);
  });

  it('tells which verb was chosen', async () => {
    const { harness, chosen } = await draw();
    await harness.choose('slide');
    await harness.choose('undo');
    expect(chosen).toEqual(['slide', 'undo']);
  });

  it('is one tab stop that arrow keys walk along, past what is disabled', async () => {
    const { host, fixture } = await draw();
    const stops = () =>
      [...host.querySelectorAll('button')]
        .filter((button) => button.tabIndex === 0)
        .map((button) => button.dataset['action']);
    expect(stops()).toEqual(['length']);
    host.querySelector<HTMLButtonElement>('[data-action=slide]')?.focus();
    document.activeElement?.dispatchEvent(
      new KeyboardEvent('keydown', { key: 'ArrowRight', bubbles: true, cancelable: true }),
    );
    await fixture.whenStable();
    expect(document.activeElement?.getAttribute('data-action')).toBe('undo');
    expect(stops()).toEqual(['undo']);
  });

  it('marks the selection where it lies', async () => {
    const { host } = await draw();
    expect(host.querySelector('.bar')?.getAttribute('d')).toBe('M40 1.5H292');
  });
});
