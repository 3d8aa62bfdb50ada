import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Question } from '@foldwright/shared/contracts/questions';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';

/** A thread about fit, and the field to answer it; the customer gets the answer by mail. */
@Component({
  selector: 'fw-answer-form',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <ol>
      @for (message of messages(); track message.id) {
        <li [class.ours]="message.side === 'workshop'">
          <span class="fw-note">{{ message.by }}, {{ message.when }}</span>
          <p>{{ message.text }}</p>
        </li>
      }
    </ol>
    @if (canAnswer()) {
      <form (submit)="$event.preventDefault(); send()">
        <label class="fw-field">
          <span>{{ question().isAnswered ? 'Say something more' : 'Your answer' }}</span>
          <textarea rows="3" maxlength="3000" [formControl]="text"></textarea>
        </label>
        <button matButton="outlined" type="submit" [disabled]="call.isBusy()">Send the answer</button>
      </form>
    }
  `,
  styles: `
    li {
      padding: 6px 0;
      font: 400 14px/20px var(--fw-sans);
      overflow-wrap: anywhere;
    }

    p {
      white-space: pre-line;
    }

    .ours {
      padding-left: 12px;
      border-left: 3px solid var(--fw-blue);
    }

    form {
      display: grid;
      gap: 8px;
      justify-items: start;
      margin-top: 8px;
    }

    label {
      width: 100%;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AnswerForm {
  private readonly api = inject(ShopDeskApi);
  protected readonly call = new OnceCall();

  readonly question = input.required<Question>();
  readonly canAnswer = input.required<boolean>();
  readonly done = output<void>();

  protected readonly text = new FormControl('', { nonNullable: true });
  private readonly now = new Date();
  protected readonly messages = computed(() =>
    this.question().messages.map((message) => ({ ...message, when: momentWords(message.at, this.now) })),
  );

  protected async send(): Promise<void> {
    const text = this.text.value.trim();
    if (text === '') return;
    const answered = await this.call.run((key) => this.api.answer(this.question().id, text, key));
    if (answered === undefined) return;
    this.text.reset();
    this.done.emit();
  }
}
