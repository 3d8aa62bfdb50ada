import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The bench: kraft card that real things lie on. Small text belongs on something that lies here, not on the fibre itself. */
@Component({
  selector: 'fw-kraft-ground',
  template: '<ng-content />',
  styles: `
    :host {
      display: block;
      background: var(--fw-bench);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KraftGround {}
