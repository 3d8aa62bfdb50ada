import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { ApiProblem } from '../api/api-problem';

/** Stands in for a page of a shop that can't be shown: says why, and what to do. */
@Component({
  selector: 'fw-missing-shop',
  template: `
    @if (problem(); as problem) {
      <section role="alert">
        <h1>{{ problem.slug === 'not-found' ? 'There is nothing here' : problem.details.title }}</h1>
        <p>
          @if (problem.slug === 'not-found') {
            {{ missing() }}
          } @else {
            {{ problem.details.detail }} {{ problem.details.next }}
          }
        </p>
      </section>
    } @else {
      <p role="status">Reading</p>
    }
  `,
  styles: `
    :host {
      display: block;
      padding: 48px max(20px, calc(50vw - 600px));
    }

    p {
      max-width: 560px;
      margin-top: 12px;
      font: var(--fw-read);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MissingShop {
  readonly problem = input.required<ApiProblem | null>();
  readonly missing = input('The shop is closed, or the address has a slip in it.');
}
