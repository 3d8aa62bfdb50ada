import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** A card with an eyelet, lifted off the bench. What stands on it is the content; `heading` names the card for readers. */
@Component({
  selector: 'fw-part-card-frame',
  template: `
    <section [attr.aria-label]="heading()">
      <span class="eyelet" aria-hidden="true"></span>
      <ng-content />
    </section>
  `,
  styleUrl: './part-card-frame.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PartCardFrame {
  readonly heading = input.required<string>();
}
