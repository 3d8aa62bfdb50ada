import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { LengthField } from './length-field';

/** Two lengths that belong together: a place across and up, or a slot's length and width. */
@Component({
  selector: 'fw-pair-field',
  imports: [LengthField],
  template: `
    <div class="fields" role="group" [attr.aria-label]="heading()">
      <h3>{{ heading() }}</h3>
      <div class="pair">
        <fw-length-field
          [label]="firstLabel()"
          [labelHidden]="false"
          [valueMm]="firstMm()"
          [minimumMm]="minimumMm()"
          [disabled]="disabled()"
          (committed)="changed.emit({ firstMm: $event, secondMm: secondMm() })"
        />
        <fw-length-field
          [label]="secondLabel()"
          [labelHidden]="false"
          [valueMm]="secondMm()"
          [minimumMm]="minimumMm()"
          [disabled]="disabled()"
          (committed)="changed.emit({ firstMm: firstMm(), secondMm: $event })"
        />
      </div>
    </div>
  `,
  styleUrl: './form-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PairField {
  readonly heading = input.required<string>();
  readonly firstLabel = input('Across');
  readonly secondLabel = input('Up');
  readonly firstMm = input.required<number>();
  readonly secondMm = input.required<number>();
  readonly minimumMm = input<number | null>(null);
  readonly disabled = input(false);

  readonly changed = output<{ readonly firstMm: number; readonly secondMm: number }>();
}
