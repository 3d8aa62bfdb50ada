import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output } from '@angular/core';
import { FormControl, NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import type { SheetStock, StockRole } from '@foldwright/shared/part/part-document';
import { SHEET_MATERIALS, findMaterial } from '@foldwright/shared/stock/materials';
import { stockThicknessesMm } from '@foldwright/shared/stock/stock-thicknesses';
import { parseThickness } from '@foldwright/shared/stock/thickness-input';
import { V_DIE_CHART, usualVOpeningMm } from '@foldwright/shared/stock/v-dies';
import { type LengthReading, formatDecimal, parseLength } from '@foldwright/shared/units/length';
import { LengthInput } from '@foldwright/ui/length-input/length-input';

type Grain = 'unknown' | 'across' | 'along';
const GRAIN_DEG: Readonly<Record<Grain, number | null>> = { unknown: null, along: 0, across: 90 };

/** One of the part's two sheets: metal, thickness (gauges too), die and the direction of rolling. */
@Component({
  selector: 'fw-sheet-picker',
  imports: [LengthInput, ReactiveFormsModule],
  templateUrl: './sheet-picker.html',
  styleUrl: './sheet-picker.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SheetPicker {
  private readonly builder = inject(NonNullableFormBuilder);

  readonly role = input.required<StockRole>();
  readonly stock = input.required<SheetStock>();
  readonly disabled = input(false);

  readonly changed = output<SheetStock>();

  protected readonly materials = SHEET_MATERIALS;
  protected readonly dies = V_DIE_CHART;
  protected readonly form = this.builder.group({
    materialId: '',
    vOpening: 'usual',
    grain: this.builder.control<Grain>('unknown'),
  });
  protected readonly thickness = new FormControl(1, { nonNullable: true });
  protected readonly heading = computed(() => (this.role() === 'trial' ? 'Trial sheet' : 'Production sheet'));
  protected readonly rack = computed(() => stockThicknessesMm(this.stock().materialId).slice(0, 16));
  protected readonly usualDie = computed(() => usualVOpeningMm(this.stock().thicknessMm));
  protected readonly note = computed(() => findMaterial(this.stock().materialId)?.note ?? '');
  /** Gauges mean other thicknesses in every metal, so they are read with the one that is chosen. */
  protected readonly reader = computed(() => {
    const material = findMaterial(this.stock().materialId);
    return (text: string): LengthReading => (material === null ? parseLength(text) : parseThickness(text, material));
  });

  constructor() {
    // The form is not a signal: it is told when the sheet changes, by undo or by somebody else.
    effect(() => {
      const { materialId, thicknessMm, vOpeningMm, grainDirectionDeg } = this.stock();
      const grain: Grain = grainDirectionDeg === null ? 'unknown' : grainDirectionDeg === 0 ? 'along' : 'across';
      const vOpening = vOpeningMm === null ? 'usual' : String(vOpeningMm);
      this.form.setValue({ materialId, vOpening, grain }, { emitEvent: false });
      this.thickness.setValue(thicknessMm, { emitEvent: false });
    });
    effect(() => {
      for (const control of [this.form, this.thickness]) {
        if (this.disabled()) control.disable({ emitEvent: false });
        else control.enable({ emitEvent: false });
      }
    });
  }

  protected change(): void {
    const { materialId, vOpening, grain } = this.form.getRawValue();
    this.changed.emit({
      ...this.stock(),
      materialId,
      vOpeningMm: vOpening === 'usual' ? null : Number(vOpening),
      grainDirectionDeg: GRAIN_DEG[grain],
    });
  }

  protected changeThickness(thicknessMm: number): void {
    if (thicknessMm > 0) this.changed.emit({ ...this.stock(), thicknessMm });
  }

  protected figure(valueMm: number): string {
    return formatDecimal(valueMm, 2);
  }
}
