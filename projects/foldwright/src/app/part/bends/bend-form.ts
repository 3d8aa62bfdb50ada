import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { isReferenceAllowed, usualReference } from '@foldwright/shared/bending/allowance';
import type { BendRow } from '@foldwright/shared/bending/development';
import type { BendDeclaration, BendDirection, LengthReference } from '@foldwright/shared/bending/layout';
import { formatDecimal } from '@foldwright/shared/units/length';
import { LengthField } from '../drawing-board/fields/length-field';
import { referenceWords } from '../reference-words';
import { AngleField } from './angle-field';

const REFERENCES: readonly LengthReference[] = [
  'outsideApex',
  'insideApex',
  'outsideTangent',
  'insideTangent',
  'tangent',
];

/** Everything declared about one bend. What is changed is handed out as the whole declaration. */
@Component({
  selector: 'fw-bend-form',
  imports: [AngleField, LengthField, ReactiveFormsModule],
  templateUrl: './bend-form.html',
  styleUrls: ['../drawing-board/fields/form-card.scss', './bend-form.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BendForm {
  private readonly builder = inject(NonNullableFormBuilder);

  readonly heading = input.required<string>();
  readonly bend = input.required<BendDeclaration>();
  /** The bend in the table of the sheet that is shown; null when the part can't be unfolded. */
  readonly row = input<BendRow | null>(null);
  /** Whether the layout came from a template, whose answers can say what its lengths mean. */
  readonly hasTemplate = input(false);
  readonly disabled = input(false);

  readonly changed = output<BendDeclaration>();

  protected readonly form = this.builder.group({
    direction: this.builder.control<BendDirection>('towards'),
    lengths: this.builder.control<LengthReference | 'template'>('outsideApex'),
    radius: this.builder.control<'delivered' | 'asked'>('delivered'),
  });
  protected readonly kForm = this.builder.group({
    kFactor: this.builder.control('', [Validators.required, Validators.pattern(/^\s*0?[.,]\d{1,4}\s*$/)]),
    reason: this.builder.control('', [Validators.required, Validators.maxLength(200)]),
  });
  protected readonly references = computed(() =>
    REFERENCES.filter((reference) => isReferenceAllowed(reference, this.bend().bendAngleDeg)).map((reference) => ({
      reference,
      words: referenceWords(reference),
    })),
  );
  protected readonly radiusMm = computed(() => this.bend().insideRadiusMm ?? this.row()?.insideRadiusMm ?? 1);
  protected readonly delivered = computed(() => {
    const row = this.row();
    return row === null || this.bend().insideRadiusMm !== null
      ? 'by the tooling'
      : `by the tooling, R ${formatDecimal(row.insideRadiusMm, 2)}`;
  });
  protected readonly kWords = computed(() => {
    const row = this.row();
    if (row === null) return '';
    return `K ${formatDecimal(row.kFactor, 3)}, ${row.kProvenance.text}`;
  });

  constructor() {
    // The forms are not signals: they are told when the bend changes, by undo or by somebody else.
    effect(() => {
      const { direction, lengths, insideRadiusMm, override } = this.bend();
      const radius = insideRadiusMm === null ? ('delivered' as const) : ('asked' as const);
      const from = lengths.from === 'template' ? ('template' as const) : lengths.reference;
      this.form.setValue({ direction, lengths: from, radius }, { emitEvent: false });
      if (override?.kind === 'kFactor')
        this.kForm.setValue({ kFactor: String(override.kFactor), reason: override.reason }, { emitEvent: false });
    });
    effect(() => {
      for (const form of [this.form, this.kForm]) {
        if (this.disabled()) form.disable({ emitEvent: false });
        else form.enable({ emitEvent: false });
      }
    });
  }

  protected change(): void {
    const bend = this.bend();
    const { direction, lengths, radius } = this.form.getRawValue();
    this.changed.emit({
      ...bend,
      direction,
      lengths:
        lengths === 'template' ? { from: 'template', override: null } : { from: 'reference', reference: lengths },
      insideRadiusMm: radius === 'delivered' ? null : this.radiusMm(),
    });
  }

  protected changeAngle(bendAngleDeg: number): void {
    const bend = this.bend();
    const { lengths } = bend;
    const fits = lengths.from === 'template' || isReferenceAllowed(lengths.reference, bendAngleDeg);
    const usual = { from: 'reference', reference: usualReference(bendAngleDeg) } as const;
    this.changed.emit({ ...bend, bendAngleDeg, lengths: fits ? lengths : usual });
  }

  protected changeRadius(insideRadiusMm: number): void {
    this.changed.emit({ ...this.bend(), insideRadiusMm });
  }

  protected useK(): void {
    this.kForm.markAllAsTouched();
    if (this.kForm.invalid) return;
    const { kFactor, reason } = this.kForm.getRawValue();
    const value = Number(kFactor.trim().replace(',', '.'));
    this.changed.emit({ ...this.bend(), override: { kind: 'kFactor', kFactor: value, reason: reason.trim() } });
  }

  protected dropK(): void {
    this.kForm.reset();
    this.changed.emit({ ...this.bend(), override: null });
  }
}
