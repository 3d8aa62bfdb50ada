import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { HardwareItem } from '@foldwright/shared/contracts/stock';
import { parseMoneyMinor, typedMoney } from '@foldwright/shared/units/money';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { OnceCall } from '../api/once-call';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { StockApi } from '../api/stock-api';

const CURRENCY = 'EUR';

/** Bought things that go with brackets: what they are, what they cost, how many lie there. */
@Component({
  selector: 'fw-hardware-page',
  imports: [MatButtonModule, MoneyText, ReactiveFormsModule],
  templateUrl: './hardware-page.html',
  styles: `
    :host {
      display: grid;
      grid-template-columns: minmax(0, 1fr);
      gap: 18px;
    }

    form {
      display: flex;
      flex-wrap: wrap;
      gap: 12px 16px;
      align-items: flex-end;
    }

    .wide {
      flex: 1 1 220px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HardwarePage {
  private readonly api = inject(StockApi);
  protected readonly canMake = inject(SessionApi).canMake;

  protected readonly stock = this.api.stock();
  protected readonly rows = computed(() => this.stock.value()?.hardware ?? []);
  /** The item that is being changed; undefined for a new one, null when the form is away. */
  protected readonly edited = signal<HardwareItem | undefined | null>(null);
  protected readonly once = new OnceCall();
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', [Validators.required, Validators.maxLength(80)]],
    specification: ['', Validators.maxLength(120)],
    cost: ['', [Validators.required, (control: { value: unknown }) => costFault(control.value)]],
    isInUse: [true],
  });

  constructor() {
    rereadOn(['stock-changed'], () => this.stock.reload());
  }

  protected edit(item: HardwareItem | undefined): void {
    this.edited.set(item);
    this.form.reset(
      item === undefined
        ? undefined
        : {
            name: item.name,
            specification: item.specification,
            cost: typedMoney(item.cost),
            isInUse: item.isInUse,
          },
    );
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    const edited = this.edited();
    if (this.form.invalid || edited === null) return;
    const { name, specification, cost, isInUse } = this.form.getRawValue();
    const amountMinor = parseMoneyMinor(cost, CURRENCY) ?? 0;
    const body = { name, specification, isInUse, cost: { amountMinor, currency: edited?.cost.currency ?? CURRENCY } };
    const kept = await this.once.run((key) =>
      edited === undefined
        ? this.api.addHardware(body, key)
        : this.api.changeHardware(edited.id, body, edited.revision),
    );
    if (kept === undefined) return;
    this.edited.set(null);
    this.stock.reload();
  }
}

function costFault(value: unknown): { readonly cost: true } | null {
  return typeof value === 'string' && parseMoneyMinor(value, CURRENCY) !== null ? null : { cost: true };
}
