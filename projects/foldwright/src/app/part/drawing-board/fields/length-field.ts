import { ChangeDetectionStrategy, Component, computed, effect, input, output, viewChild } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { LengthInput } from '@foldwright/ui/length-input/length-input';

/** One length, typed at the place it belongs to. Enter keeps it, Escape leaves it as it was. */
@Component({
  selector: 'fw-length-field',
  imports: [LengthInput, ReactiveFormsModule],
  template: `
    <fw-length-input
      [formControl]="control"
      [label]="label()"
      [labelHidden]="labelHidden()"
      [minimumMm]="minimumMm()"
      [maximumMm]="3000"
      (committed)="committed.emit($event)"
      (cancelled)="cancelled.emit()"
    />
  `,
  styleUrl: './length-field.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LengthField {
  readonly label = input.required<string>();
  readonly labelHidden = input(true);
  readonly valueMm = input.required<number>();
  readonly minimumMm = input<number | null>(0.1);
  readonly disabled = input(false);

  readonly committed = output<number>();
  readonly cancelled = output<void>();

  private readonly field = viewChild.required(LengthInput);
  protected readonly control = new FormControl(0, { nonNullable: true });
  private readonly shownMm = computed(() => Math.round(this.valueMm() * 1000) / 1000);

  constructor() {
    // The control is not a signal: it is told when the drawing's value changes.
    effect(() => this.control.setValue(this.shownMm(), { emitEvent: false }));
    effect(() =>
      this.disabled() ? this.control.disable({ emitEvent: false }) : this.control.enable({ emitEvent: false }),
    );
  }

  focus(): void {
    this.field().focus();
  }
}
