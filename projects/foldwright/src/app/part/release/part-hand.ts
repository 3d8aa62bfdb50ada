import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PartDetail } from '@foldwright/shared/contracts/parts';
import { newIdempotencyKey } from '../../api/api-client';
import { Notices } from '../../api/notices';
import { StockApi } from '../../api/stock-api';

const HANDS = [
  { hand: 'either', words: 'only one hand' },
  { hand: 'left', words: 'left' },
  { hand: 'right', words: 'right' },
] as const;

/** Which hand a part is, and the way to its mirror image: a part of its own, with a number of its own. */
@Component({
  selector: 'fw-part-hand',
  imports: [MatButtonModule, RouterLink],
  template: `
    <fieldset>
      <legend>Which hand is it?</legend>
      @for (option of hands; track option.hand) {
        <label>
          <input
            type="radio"
            name="part-hand"
            [checked]="option.hand === part().hand"
            [disabled]="!canEdit() || isBusy()"
            (change)="set(option.hand)"
          />{{ option.words }}
        </label>
      }
    </fieldset>
    @if (part().otherHandPartId; as twin) {
      <p><a [routerLink]="['/parts', twin]">Go to the other hand</a></p>
    } @else if (canEdit()) {
      <button matButton="outlined" type="button" [disabled]="isBusy()" (click)="makeOther()">
        Make the other hand
      </button>
    }
    <p class="note">
      Counts for revisions released from now on; the other hand is mirrored from the part as it is now.
    </p>
  `,
  styles: `
    :host {
      display: block;
      max-width: 760px;
    }

    fieldset {
      display: flex;
      flex-wrap: wrap;
      gap: 0 18px;
    }

    legend {
      font: 600 14px/20px var(--fw-sans);
    }

    label {
      display: flex;
      gap: 8px;
      align-items: center;
      min-height: 44px;
      font: var(--fw-label);
    }

    .note {
      margin-top: 6px;
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-paper' },
})
export class PartHand {
  private readonly api = inject(StockApi);
  private readonly notices = inject(Notices);
  private readonly router = inject(Router);

  readonly part = input.required<PartDetail>();
  readonly canEdit = input.required<boolean>();
  readonly changed = output<void>();

  protected readonly hands = HANDS;
  protected readonly isBusy = signal(false);
  private readonly otherName = computed(() => {
    const { name, hand } = this.part();
    return `${name}, ${hand === 'right' ? 'left' : 'right'}`.slice(0, 80);
  });
  private key = newIdempotencyKey();

  protected async set(hand: PartDetail['hand']): Promise<void> {
    await this.run(() => this.api.setHand(this.part().id, hand));
    this.changed.emit();
  }

  protected async makeOther(): Promise<void> {
    const made = await this.run(() => this.api.makeOtherHand(this.part().id, this.otherName(), this.key));
    if (made !== undefined) await this.router.navigate(['/parts', made.partId]);
  }

  private async run<T>(call: () => Promise<T>): Promise<T | undefined> {
    if (this.isBusy()) return undefined;
    this.isBusy.set(true);
    try {
      return await call();
    } catch (error) {
      this.notices.showProblem(error);
      return undefined;
    } finally {
      this.key = newIdempotencyKey();
      this.isBusy.set(false);
    }
  }
}
