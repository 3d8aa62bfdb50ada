import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Pictogram } from '../pictogram/pictogram';
import { FindingSign } from '../finding-note/finding-sign';

/** What a notice says; pages put it up. */
export interface NoticeWords {
  readonly tone: 'stop' | 'know';
  readonly title: string;
  readonly detail: string;
  readonly kept: string | null;
  readonly next: string | null;
  /** For the workshop's operator, when it broke on our side. */
  readonly requestId: string | null;
}

/** A notice: what happened, what was kept, what to do. */
@Component({
  selector: 'fw-notice-card',
  imports: [FindingSign, Pictogram],
  template: `
    <fw-finding-sign [severity]="severity()" />
    <div class="words">
      <p>
        <b>{{ notice().title }}.</b> {{ notice().detail }}
      </p>
      @if (more()) {
        <p>{{ more() }}</p>
      }
      @if (notice().requestId; as id) {
        <p class="fw-note">
          Tell the operator this number: <span class="fw-figure">{{ id }}</span>
        </p>
      }
    </div>
    <button type="button" aria-label="Put this notice away" title="Put this notice away" (click)="dismissed.emit()">
      <fw-pictogram name="close" />
    </button>
  `,
  styleUrl: './notice-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'notice().tone' },
})
export class NoticeCard {
  readonly notice = input.required<NoticeWords>();

  readonly dismissed = output<void>();

  protected readonly severity = computed(() => (this.notice().tone === 'stop' ? 'blocker' : 'hint'));
  protected readonly more = computed(() =>
    [this.notice().kept, this.notice().next].filter((part) => part !== null).join(' '),
  );
}
