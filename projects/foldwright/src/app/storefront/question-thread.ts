import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Question } from '@foldwright/shared/contracts/questions';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { newIdempotencyKey } from '../api/api-client';
import { Notices } from '../api/notices';

/** A thread about fit: what was asked, what was answered, and a field to ask more. */
@Component({
  selector: 'fw-question-thread',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    @if (thread()) {
      <p class="state" role="status">{{ isAnswered() ? 'Answered' : 'Not answered yet; you get a mail.' }}</p>
    }
    <ol>
      @for (message of messages(); track message.id) {
        <li [class.ours]="message.side === 'workshop'">
          <span class="fw-note">{{ message.by }}, {{ message.when }}</span>
          <p>{{ message.text }}</p>
        </li>
      }
    </ol>
    <form (submit)="$event.preventDefault(); ask()">
      <label>
        <span class="fw-hidden">{{ thread() ? 'Ask something more' : 'Ask about fit' }}</span>
        <textarea
          rows="3"
          maxlength="3000"
          [placeholder]="thread() ? 'Ask something more' : 'Sizes of your machine help: what did the tape say?'"
          [formControl]="text"
        ></textarea>
      </label>
      @if (isEmpty()) {
        <p class="wrong" role="alert">Write your question first.</p>
      }
      <button matButton="outlined" type="submit" [disabled]="isBusy()">Send</button>
    </form>
  `,
  styleUrl: './question-thread.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuestionThread {
  private readonly notices = inject(Notices);

  readonly thread = input.required<Question | null>();
  /** Sends a message, once under its key; throws what the request threw. */
  readonly send = input.required<(text: string, key: string) => Promise<void>>();

  protected readonly text = new FormControl('', { nonNullable: true, validators: Validators.required });
  protected readonly isBusy = signal(false);
  protected readonly isEmpty = signal(false);
  protected readonly isAnswered = computed(() => this.thread()?.isAnswered === true);
  private readonly now = new Date();
  protected readonly messages = computed(() =>
    (this.thread()?.messages ?? []).map((message) => ({ ...message, when: momentWords(message.at, this.now) })),
  );
  private key = newIdempotencyKey();

  protected async ask(): Promise<void> {
    const text = this.text.value.trim();
    this.isEmpty.set(text === '');
    if (text === '' || this.isBusy()) return;
    this.isBusy.set(true);
    try {
      await this.send()(text, this.key);
      this.text.reset();
      this.key = newIdempotencyKey();
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isBusy.set(false);
    }
  }
}
