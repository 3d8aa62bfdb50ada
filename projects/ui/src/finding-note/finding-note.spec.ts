import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { TestBed } from '@angular/core/testing';
import type { Finding, Mend } from '@foldwright/shared/rules/finding';
import { FindingNote } from './finding-note';
import { FindingNoteHarness } from './testing/finding-note-harness';

const FINDING: Finding = {
  id: 'holeInBendZone:h5',
  rule: 'holeInBendZone',
  severity: 'caution',
  title: 'Hole H5 may pull oval',
  detail: 'Its rim sits 11.5 mm from the bend.',
  foundMm: 11.5,
  requiredMm: 12,
  why: { text: 'half the die’s opening', source: '', confidence: 'common-practice' },
  ids: ['h5'],
  at: null,
  advice: 'Move it out, or size it after bending.',
  mend: { label: 'Move it 0.5 mm out', commands: [] },
};

describe('FindingNote', () => {
  async function draw(inputs: Record<string, unknown> = {}) {
    const fixture = TestBed.createComponent(FindingNote);
    for (const [name, value] of Object.entries({ finding: FINDING, ...inputs }))
      fixture.componentRef.setInput(name, value);
    const mends: Mend[] = [];
    fixture.componentInstance.mended.subscribe((mend) => mends.push(mend));
    await fixture.whenStable();
    return { harness: await TestbedHarnessEnvironment.harnessForFixture(fixture, FindingNoteHarness), mends };
  }

  it('says what, where, what to do and why', async () => {
    const { harness } = await draw();
    expect(await harness.headline()).toBe('Check this: Hole H5 may pull oval');
    const text = await harness.text();
    for (const part of ['11.5 mm', 'Move it out', 'half the die’s opening', 'common practice'])
      expect(text).toContain(part);
  });

  it('hands out the mend that was clicked', async () => {
    const { harness, mends } = await draw();
    await harness.mend();
    expect(mends).toEqual([FINDING.mend]);
  });

  it('offers no mend to somebody who may not change the part', async () => {
    const { harness } = await draw({ canMend: false });
    expect(await harness.mendLabel()).toBeNull();
  });
});
