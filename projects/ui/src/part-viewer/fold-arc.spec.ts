import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { ChangeDetectionStrategy, Component, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { FoldArc, type FoldChange } from './fold-arc';
import { foldAt, restingFold } from './fold-motion';
import { FoldArcHarness } from './testing/fold-arc-harness';

@Component({
  imports: [FoldArc],
  template: '<fw-fold-arc [fold]="fold()" (changed)="take($event)" />',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Host {
  readonly fold = signal(1);
  readonly changes: FoldChange[] = [];
  take(change: FoldChange): void {
    this.changes.push(change);
    this.fold.set(change.fold);
  }
}

describe('FoldArc', () => {
  it('folds by keys and says how far', async () => {
    const fixture = TestBed.createComponent(Host);
    await fixture.whenStable();
    const arc = await TestbedHarnessEnvironment.loader(fixture).getHarness(FoldArcHarness);
    expect(await arc.words()).toBe('formed');
    await arc.press('down');
    expect(await arc.words()).toBe('95 % folded');
    await arc.press('home');
    expect(await arc.words()).toBe('flat');
    await arc.press('down');
    expect(await arc.words()).toBe('flat');
    await arc.press('end');
    expect(fixture.componentInstance.changes.every(({ isHeld }) => !isHeld)).toBe(true);
    expect(fixture.componentInstance.fold()).toBe(1);
  });
});

describe('fold motion', () => {
  it('starts and ends exactly and never leaves the way', () => {
    expect(foldAt(0.2, 1, 0)).toBe(0.2);
    expect(foldAt(0.2, 1, 320)).toBe(1);
    expect(foldAt(0.2, 1, 5000)).toBe(1);
    expect(foldAt(0.2, 1, 100)).toBeGreaterThan(0.2);
    expect(foldAt(0.2, 1, 100)).toBeLessThan(1);
  });

  it('comes to rest at an end that is near', () => {
    expect([0.03, 0.5, 0.97].map(restingFold)).toEqual([0, 0.5, 1]);
  });
});
