import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { Notices } from '../api/notices';
import { OperatorApi } from '../api/operator-api';

/** Work, messages and mail that did not go through, each with the way to try it again. */
@Component({
  selector: 'fw-troubles-section',
  imports: [FindingSign, MatButtonModule],
  templateUrl: './troubles-section.html',
  styles: `
    h2 {
      margin: 28px 0 8px;
    }

    li {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 14px;
      align-items: center;
      padding: 8px 0;
      border-top: 1px solid color-mix(in oklab, var(--fw-line), transparent 45%);
      font: 400 14px/20px var(--fw-sans);
      overflow-wrap: anywhere;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TroublesSection {
  private readonly api = inject(OperatorApi);
  private readonly notices = inject(Notices);

  protected readonly read = this.api.troubles();
  private readonly now = new Date();
  protected readonly work = computed(() => this.dated(this.read.value()?.work ?? []));
  protected readonly messages = computed(() => this.dated(this.read.value()?.messages ?? []));
  protected readonly mails = computed(() => this.dated(this.read.value()?.mails ?? []));
  protected readonly isBusy = signal(false);

  reload(): void {
    this.read.reload();
  }

  protected retry(queue: string, workId: string): Promise<void> {
    return this.run(() => this.api.retryWork(queue, workId), 'It is tried again now.');
  }

  protected replay(messageId: string): Promise<void> {
    return this.run(() => this.api.replay(messageId), 'The message is handled.');
  }

  protected sendAgain(mailId: string): Promise<void> {
    return this.run(() => this.api.sendAgain(mailId), 'The mail is tried again now.');
  }

  private dated<T extends { readonly at: string }>(rows: readonly T[]): readonly (T & { readonly when: string })[] {
    return rows.map((row) => ({ ...row, when: momentWords(row.at, this.now) }));
  }

  private async run(call: () => Promise<void>, done: string): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      await call();
      this.notices.showNews('Done', done);
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isBusy.set(false);
      this.read.reload();
    }
  }
}
