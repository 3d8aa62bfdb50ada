import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import type { Notice } from '../api/notices';

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
  readonly notice = input.required<Notice>();

  readonly dismissed = output<void>();

  protected readonly severity = computed(() => (this.notice().tone === 'stop' ? 'blocker' : 'hint'));
  protected readonly more = computed(() =>
    [this.notice().kept, this.notice().next].filter((part) => part !== null).join(' '),
  );
}
