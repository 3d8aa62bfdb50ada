import { ChangeDetectionStrategy, Component, type ElementRef, computed, input, output, viewChild } from '@angular/core';
import { formatDecimal } from '@foldwright/shared/units/length';

let nextId = 0;

/** The angle that the sheet is turned through: 0 stays flat, 90 is square, 180 a hem. */
@Component({
  selector: 'fw-angle-field',
  template: `
    <label [for]="id">Angle</label>
    <span class="box">
      <input
        #field
        type="text"
        inputmode="decimal"
        autocomplete="off"
        [id]="id"
        [value]="text()"
        [disabled]="disabled()"
        (change)="commit(field.value)"
        (keydown.enter)="commit(field.value)"
      />
      <span class="unit">°</span>
    </span>
  `,
  styleUrl: './angle-field.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AngleField {
  readonly angleDeg = input.required<number>();
  readonly disabled = input(false);

  readonly committed = output<number>();

  private readonly field = viewChild.required<ElementRef<HTMLInputElement>>('field');
  protected readonly id = `fw-angle-${nextId++}`;
  protected readonly text = computed(() => formatDecimal(this.angleDeg(), 2));

  protected commit(text: string): void {
    const angleDeg = Number(text.trim().replace(',', '.').replace('°', ''));
    if (Number.isFinite(angleDeg) && angleDeg > 0 && angleDeg <= 180) {
      if (angleDeg !== this.angleDeg()) this.committed.emit(angleDeg);
    } else {
      // What can't be bent is not kept; the field shows again what is.
      this.field().nativeElement.value = this.text();
    }
  }
}
