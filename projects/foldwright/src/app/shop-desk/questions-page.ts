import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { ShopDeskApi } from '../api/shop-desk-api';
import { AnswerForm } from './answer-form';

/** Questions about fit, those without an answer first. */
@Component({
  selector: 'fw-questions-page',
  imports: [AnswerForm, EmptyBench, RouterLink],
  template: `
    @for (question of questions(); track question.id) {
      <section class="fw-paper" [attr.aria-labelledby]="'q-' + question.id">
        <h2 [id]="'q-' + question.id">
          {{ question.askedBy }} about {{ question.about }}
          <span class="fw-note">{{ question.isAnswered ? 'answered' : 'waits for an answer' }}</span>
        </h2>
        @if (question.saleId; as saleId) {
          <a [routerLink]="['/shop-desk/sales', saleId]">Go to sale {{ question.saleNumber }}</a>
        }
        <fw-answer-form [question]="question" [canAnswer]="canMake()" (done)="list.reload()" />
      </section>
    } @empty {
      @if (list.value() !== undefined) {
        <fw-empty-bench
          heading="Nobody has asked."
          lead="Questions about fit come here from listings and from orders, and by mail; answers go back the same way."
        />
      }
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 16px;
      max-width: 820px;
    }

    h2 {
      font: 600 16px/22px var(--fw-sans);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuestionsPage {
  protected readonly list = inject(ShopDeskApi).questions();
  protected readonly canMake = inject(SessionApi).canMake;
  protected readonly questions = computed(() => this.list.value()?.questions ?? []);

  constructor() {
    rereadOn(['question-changed'], () => this.list.reload());
  }
}
