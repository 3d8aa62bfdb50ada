import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { Origin } from './starter-form';

interface OriginPicture {
  readonly origin: Origin;
  readonly label: string;
  /** Section or plan of the shape, on a 64 by 40 grid. */
  readonly d: string;
  readonly dashed: boolean;
}

const PICTURES: readonly OriginPicture[] = [
  { origin: 'mock-up', label: 'A mock-up', d: 'M22 6h20v8h12v14H42v6H22v-6H10V14h12zM22 14h20v14H22z', dashed: true },
  { origin: 'flat-plate', label: 'A flat plate', d: 'M10 20h44', dashed: false },
  { origin: 'l-bracket', label: 'An L', d: 'M12 32h30a6 6 0 0 0 6-6V8', dashed: false },
  { origin: 'u-bracket', label: 'A U', d: 'M14 8v18a6 6 0 0 0 6 6h24a6 6 0 0 0 6-6V8', dashed: false },
  { origin: 'z-bracket', label: 'A Z', d: 'M10 33h16a6 6 0 0 0 6-6V13a6 6 0 0 1 6-6h16', dashed: false },
  {
    origin: 'hat-section',
    label: 'A hat',
    d: 'M6 33h9a5 5 0 0 0 5-5V13a5 5 0 0 1 5-5h14a5 5 0 0 1 5 5v15a5 5 0 0 0 5 5h9',
    dashed: false,
  },
  {
    origin: 'tray',
    label: 'A tray',
    d: 'M18 10h28v20H18zM18 4h28v6H18zM18 30h28v6H18zM11 10h7v20h-7zM46 10h7v20h-7z',
    dashed: false,
  },
  { origin: 'gusseted-l', label: 'An L with a gusset', d: 'M12 33h31a6 6 0 0 0 6-6V6M24 30 44 12', dashed: false },
];

/** What to start from, pictured: radio buttons that look like what they mean. */
@Component({
  selector: 'fw-origin-choice',
  template: `
    <fieldset>
      <legend>Start from</legend>
      <div class="choices">
        @for (picture of pictures; track picture.origin) {
          <label [class.on]="picture.origin === chosen()">
            <input
              type="radio"
              name="origin"
              class="fw-hidden"
              [value]="picture.origin"
              [checked]="picture.origin === chosen()"
              (change)="choose.emit(picture.origin)"
            />
            <svg viewBox="0 0 64 40" focusable="false" aria-hidden="true">
              <path [class.dashed]="picture.dashed" [attr.d]="picture.d" />
            </svg>
            {{ picture.label }}
          </label>
        }
      </div>
    </fieldset>
  `,
  styleUrl: './origin-choice.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OriginChoice {
  readonly chosen = input.required<Origin>();

  readonly choose = output<Origin>();

  protected readonly pictures = PICTURES;
}
