import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { StorefrontApi } from '../api/storefront-api';
import { MissingShop } from './missing-shop';
import { QuestionThread } from './question-thread';
import { ShopFrame } from './shop-frame';

/** A question that was asked before buying, behind its private link. */
@Component({
  selector: 'fw-question-page',
  imports: [MissingShop, PartCardFrame, QuestionThread, ShopFrame],
  template: `
    @if (read.value(); as found) {
      <fw-shop-frame [front]="found.shop">
        <div class="page">
          <fw-part-card-frame heading="Your question">
            <h1>Your question about {{ found.question.about }}</h1>
            <fw-question-thread [thread]="thread()" [send]="ask" />
          </fw-part-card-frame>
        </div>
      </fw-shop-frame>
    } @else {
      <fw-missing-shop
        [problem]="read.problem()"
        missing="This link leads to no question. Copy the whole of it from the mail."
      />
    }
  `,
  styles: `
    :host {
      display: contents;
    }

    .page {
      flex: 1;
      padding: 28px max(20px, calc(50vw - 320px)) 48px;
      background: var(--fw-bench);
    }

    h1 {
      padding-right: 34px;
      font: 600 22px/28px var(--fw-sans);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuestionPage {
  private readonly api = inject(StorefrontApi);

  readonly link = input.required<string>();

  protected readonly read = this.api.question(this.link);
  protected readonly thread = computed(() => this.read.value()?.question ?? null);

  protected readonly ask = async (text: string, key: string): Promise<void> => {
    const question = await this.api.askMore(this.link(), text, key);
    const known = this.read.value();
    if (known !== undefined) this.read.set({ ...known, question });
  };
}
