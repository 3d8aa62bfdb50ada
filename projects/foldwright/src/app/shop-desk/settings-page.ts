import { ChangeDetectionStrategy, Component, effect, inject, untracked } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { parseMoneyMinor, typedMoney } from '@foldwright/shared/units/money';
import { Notices } from '../api/notices';
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';

/** Address, words, tax and postage of the shop, and whether it is open. */
@Component({
  selector: 'fw-settings-page',
  imports: [MatButtonModule, ReactiveFormsModule],
  templateUrl: './settings-page.html',
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SettingsPage {
  private readonly api = inject(ShopDeskApi);
  private readonly notices = inject(Notices);
  protected readonly call = new OnceCall();

  protected readonly read = this.api.settings();
  protected readonly form = inject(NonNullableFormBuilder).group({
    isOpen: [false],
    slug: ['', [Validators.required, Validators.pattern(/^[a-z0-9]+(-[a-z0-9]+)*$/), Validators.maxLength(60)]],
    headline: ['', [Validators.required, Validators.maxLength(120)]],
    about: ['', Validators.maxLength(2000)],
    taxName: ['', [Validators.required, Validators.maxLength(20)]],
    taxPercent: [0, [Validators.required, Validators.min(0), Validators.max(30)]],
    taxNumber: ['', Validators.maxLength(40)],
    postage: ['', [Validators.required, Validators.pattern(/^\d+([.,]\d{1,2})?$/)]],
    packingDays: [1, [Validators.required, Validators.min(0), Validators.max(60), Validators.pattern(/^\d+$/)]],
    senderAddress: ['', Validators.maxLength(400)],
    questionsTo: ['', [Validators.required, Validators.email]],
  });
  private filledWith: number | null = null;

  constructor() {
    effect(() => {
      const settings = this.read.value();
      untracked(() => {
        if (settings === undefined || this.filledWith === settings.revision) return;
        this.filledWith = settings.revision;
        const { postageMinor, taxBasisPoints, currency, ...rest } = settings;
        this.form.patchValue({
          ...rest,
          taxPercent: taxBasisPoints / 100,
          postage: typedMoney({ amountMinor: postageMinor, currency }),
        });
      });
    });
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    const settings = this.read.value();
    if (this.form.invalid || settings === undefined) return;
    const { taxPercent, postage, ...rest } = this.form.getRawValue();
    const body = {
      ...rest,
      currency: settings.currency,
      taxBasisPoints: Math.round(taxPercent * 100),
      postageMinor: parseMoneyMinor(postage, settings.currency) ?? 0,
    };
    const kept = await this.call.run(() => this.api.changeSettings(body, settings.revision));
    if (kept === undefined) return;
    this.read.set(kept);
    this.notices.showNews('Kept', kept.isOpen ? 'The shop is open.' : 'The shop is closed: customers don’t see it.');
  }
}
