import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { ChangeDetectionStrategy, Component, viewChild } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { LengthInput } from './length-input';
import { LengthInputHarness } from './testing/length-input-harness';

@Component({
  imports: [LengthInput, ReactiveFormsModule],
  template: `<fw-length-input
    label="Width"
    [minimumMm]="1"
    [maximumMm]="3000"
    [formControl]="width"
    (committed)="committed.push($event)"
  />`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class WidthForm {
  readonly width = new FormControl<number | null>(84);
  readonly committed: number[] = [];
  readonly field = viewChild.required(LengthInput);
}

describe('LengthInput', () => {
  async function draw() {
    const fixture = TestBed.createComponent(WidthForm);
    await fixture.whenStable();
    const harness = await TestbedHarnessEnvironment.loader(fixture).getHarness(LengthInputHarness);
    return { form: fixture.componentInstance, harness };
  }

  it('shows mm and takes inches', async () => {
    const { form, harness } = await draw();
    expect(await harness.text()).toBe('84');
    await harness.type('1 3/8"');
    expect(form.width.value).toBeCloseTo(34.925, 9);
    await harness.press('enter');
    expect(form.committed).toEqual([34.925]);
    // Callipers check two decimals; the value keeps the rest.
    expect(await harness.text()).toBe('34.92');
    expect(form.width.value).toBe(34.925);
  });

  it('says why it can’t read what was typed, once the field is left', async () => {
    const { form, harness } = await draw();
    await harness.type('about 12');
    expect(await harness.complaint()).toBeNull();
    await harness.leave();
    expect(await harness.complaint()).toContain('is not a length');
    expect(form.width.value).toBeNull();
    expect(form.width.valid).toBe(false);
    expect(form.committed).toEqual([]);
  });

  it('names the limit that was passed', async () => {
    const { form, harness } = await draw();
    await harness.type('3500');
    await harness.leave();
    expect(await harness.complaint()).toBe('At most 3000 mm.');
    expect(form.width.valid).toBe(false);
  });

  it('goes back on Escape', async () => {
    const { form, harness } = await draw();
    await harness.type('99');
    await harness.press('escape');
    expect(await harness.text()).toBe('84');
    expect(form.width.value).toBe(84);
  });
});
