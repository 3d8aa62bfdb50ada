import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** A clear bench: says what to do first, with room for the verbs that do it and for a picture of how. */
@Component({
  selector: 'fw-empty-bench',
  template: `
    <div class="words">
      <h2>{{ heading() }}</h2>
      <p class="lead">{{ lead() }}</p>
      <div class="go"><ng-content select="[benchAction]" /></div>
      <div class="aside"><ng-content select="[benchAside]" /></div>
    </div>
    <div class="picture"><ng-content select="[benchPicture]" /></div>
  `,
  styleUrl: './empty-bench.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EmptyBench {
  readonly heading = input.required<string>();
  readonly lead = input.required<string>();
}
