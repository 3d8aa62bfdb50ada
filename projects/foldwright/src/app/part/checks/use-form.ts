import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { DeclaredUse } from '@foldwright/shared/part/part-document';

const USES: readonly { readonly use: DeclaredUse; readonly words: string }[] = [
  { use: 'vehicle', words: 'On a vehicle' },
  { use: 'fuel', words: 'Near fuel' },
  { use: 'pressure', words: 'Holds something under pressure' },
  { use: 'heat', words: 'Near heat' },
  { use: 'vibration', words: 'Where it shakes' },
  { use: 'lifting-people', words: 'Lifts or carries people' },
  { use: 'seat', words: 'Part of a seat' },
  { use: 'steering', words: 'Part of steering' },
  { use: 'brakes', words: 'Part of brakes' },
];

/** What the part is for, as far as it calls for a caution. Declaring a use adds words, never a calculation. */
@Component({
  selector: 'fw-use-form',
  template: `
    <fieldset [disabled]="disabled()">
      <legend>What it is used for</legend>
      @for (row of rows; track row.use) {
        <label>
          <input type="checkbox" [checked]="uses().includes(row.use)" (change)="toggle(row.use)" />{{ row.words }}
        </label>
      }
    </fieldset>
    <p>
      Nothing here works out loads, fatigue or heat. For such uses follow your local code and ask a licensed engineer
      before the part goes into service.
    </p>
  `,
  styleUrl: './use-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class UseForm {
  readonly uses = input.required<readonly DeclaredUse[]>();
  readonly disabled = input(false);

  readonly changed = output<readonly DeclaredUse[]>();

  protected readonly rows = USES;

  protected toggle(use: DeclaredUse): void {
    const uses = this.uses();
    this.changed.emit(uses.includes(use) ? uses.filter((other) => other !== use) : [...uses, use]);
  }
}
