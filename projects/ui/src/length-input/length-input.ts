import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  forwardRef,
  input,
  output,
  signal,
  viewChild,
} from '@angular/core';
import {
  type AbstractControl,
  type ControlValueAccessor,
  NG_VALIDATORS,
  NG_VALUE_ACCESSOR,
  type ValidationErrors,
  type Validator,
} from '@angular/forms';
import {
  type LengthReading,
  type LengthStyle,
  MM_STYLE,
  formatLength,
  parseLength,
} from '@foldwright/shared/units/length';

let nextId = 0;

/**
 * A field for a length. What is typed may be `12`, `12 mm`, `0.5in` or `1 3/8"`; the control's value is a number of mm, or
 * null while nothing readable stands there. The reason why it can't be read stands under the field and in the control's
 * errors as `length`.
 */
@Component({
  selector: 'fw-length-input',
  templateUrl: './length-input.html',
  styleUrl: './length-input.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [
    { provide: NG_VALUE_ACCESSOR, useExisting: forwardRef(() => LengthInput), multi: true },
    { provide: NG_VALIDATORS, useExisting: forwardRef(() => LengthInput), multi: true },
  ],
  host: { '[class.wrong]': 'shownReason() !== null' },
})
export class LengthInput implements ControlValueAccessor, Validator {
  readonly label = input.required<string>();
  /** Whether the label is only for readers, because the place says it to those who see. */
  readonly labelHidden = input(false);
  readonly hint = input<string | null>(null);
  readonly minimumMm = input<number | null>(null);
  readonly maximumMm = input<number | null>(null);
  readonly lengthStyle = input<LengthStyle>(MM_STYLE);
  /** How typed text is read; a thickness field also takes gauges. */
  readonly reader = input<(text: string) => LengthReading>((text) => parseLength(text, this.lengthStyle().unit));

  /** The length in mm, when a person is done with it: Enter, or leaving the field after a change. */
  readonly committed = output<number>();
  /** Escape was pressed: the field shows again what it showed before. */
  readonly cancelled = output<void>();

  private readonly field = viewChild.required<ElementRef<HTMLInputElement>>('field');

  protected readonly inputId = `fw-length-${nextId++}`;
  protected readonly text = signal('');
  protected readonly disabled = signal(false);
  private readonly valueMm = signal<number | null>(null);
  private readonly reason = signal<string | null>(null);
  private readonly touched = signal(false);
  private committedMm: number | null = null;
  private tellChange: (valueMm: number | null) => void = () => undefined;
  private tellTouched: () => void = () => undefined;
  private tellValidity: () => void = () => undefined;

  /** A field that was never left doesn't scold. */
  protected readonly shownReason = computed(() => (this.touched() ? this.reason() : null));
  protected readonly unit = computed(() => this.lengthStyle().unit);
  protected readonly describedBy = computed(() =>
    this.shownReason() !== null ? `${this.inputId}-why` : this.hint() !== null ? `${this.inputId}-hint` : null,
  );

  /** Puts the caret into the field with all of it selected, ready to be typed over. */
  focus(): void {
    this.field().nativeElement.focus();
    this.field().nativeElement.select();
  }

  writeValue(valueMm: number | null): void {
    this.valueMm.set(valueMm);
    this.committedMm = valueMm;
    this.reason.set(null);
    this.text.set(valueMm === null ? '' : this.shown(valueMm));
  }

  registerOnChange(tell: (valueMm: number | null) => void): void {
    this.tellChange = tell;
  }

  registerOnTouched(tell: () => void): void {
    this.tellTouched = tell;
  }

  registerOnValidatorChange(tell: () => void): void {
    this.tellValidity = tell;
  }

  setDisabledState(isDisabled: boolean): void {
    this.disabled.set(isDisabled);
  }

  validate(control: AbstractControl<number | null>): ValidationErrors | null {
    const reason = this.reason() ?? (control.value === null ? null : this.limitReason(control.value));
    return reason === null ? null : { length: reason };
  }

  protected type(text: string): void {
    this.text.set(text);
    const reading = this.read(text);
    this.reason.set(reading.ok ? null : reason(reading));
    this.valueMm.set(reading.ok ? reading.valueMm : null);
    this.tellChange(this.valueMm());
    this.tellValidity();
  }

  protected commit(): void {
    this.touched.set(true);
    const valueMm = this.valueMm();
    if (valueMm === null || valueMm === this.committedMm) return;
    this.committedMm = valueMm;
    this.text.set(this.shown(valueMm));
    this.committed.emit(valueMm);
  }

  protected leave(): void {
    this.commit();
    this.tellTouched();
    const valueMm = this.valueMm();
    if (valueMm !== null) this.text.set(this.shown(valueMm));
  }

  protected cancel(): void {
    this.writeValue(this.committedMm);
    this.tellChange(this.committedMm);
    this.cancelled.emit();
  }

  private read(text: string): LengthReading {
    const reading = this.reader()(text);
    if (!reading.ok) return reading;
    const limit = this.limitReason(reading.valueMm);
    return limit === null ? reading : { ok: false, reason: limit };
  }

  private limitReason(valueMm: number): string | null {
    const [minimum, maximum] = [this.minimumMm(), this.maximumMm()];
    if (minimum !== null && valueMm < minimum) return `At least ${formatLength(minimum, this.lengthStyle())}.`;
    if (maximum !== null && valueMm > maximum) return `At most ${formatLength(maximum, this.lengthStyle())}.`;
    return null;
  }

  /** As typed into the field: the unit stands beside it. */
  private shown(valueMm: number): string {
    return formatLength(valueMm, this.lengthStyle()).replace(/\s*(mm|in|")$/, '');
  }
}

function reason(reading: { readonly reason: string }): string {
  return reading.reason;
}
