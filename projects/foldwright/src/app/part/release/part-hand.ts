import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PartDetail } from '@foldwright/shared/contracts/parts';
import { OnceCall } from '../../api/once-call';
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
            [disabled]="!canEdit() || once.isBusy()"
            (change)="set(option.hand)"
          />{{ option.words }}
        </label>
      }
    </fieldset>
    @if (part().otherHandPartId; as twin) {
      <p><a [routerLink]="['/parts', twin]">Go to the other hand</a></p>
    } @else if (canEdit()) {
      <button matButton="outlined" type="button" [disabled]="once.isBusy()" (click)="makeOther()">
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
  private readonly router = inject(Router);

  readonly part = input.required<PartDetail>();
  readonly canEdit = input.required<boolean>();
  readonly changed = output<void>();

  protected readonly hands = HANDS;
  protected readonly once = new OnceCall();
  private readonly otherName = computed(() => {
    const { name, hand } = this.part();
    return `${name}, ${hand === 'right' ? 'left' : 'right'}`.slice(0, 80);
  });

  protected async set(hand: PartDetail['hand']): Promise<void> {
    await this.once.run(() => this.api.setHand(this.part().id, hand));
    this.changed.emit();
  }

  protected async makeOther(): Promise<void> {
    const made = await this.once.run((key) => this.api.makeOtherHand(this.part().id, this.otherName(), key));
    if (made !== undefined) await this.router.navigate(['/parts', made.partId]);
  }
}
