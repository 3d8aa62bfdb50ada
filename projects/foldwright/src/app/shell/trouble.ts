import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import { ApiProblem } from '../api/api-problem';
import { SessionApi } from '../api/session-api';
import { localAddress } from '../api/local-address';

/** The server can't be reached or is not ready: says so, keeps the address, tries again. */
@Component({
  selector: 'fw-trouble',
  imports: [MatButtonModule],
  template: `
    <section>
      <h1>{{ problem()?.details?.title ?? 'The server doesn’t answer' }}</h1>
      <p>
        {{ problem()?.details?.detail ?? 'Foldwright could not find out who is signed in.' }} What was stored before is
        kept.
      </p>
      <p>{{ problem()?.details?.next ?? 'Wait a moment, then try again.' }}</p>
      <div class="go">
        <button matButton="filled" type="button" [disabled]="isTrying()" (click)="tryAgain()">Try again</button>
      </div>
    </section>
  `,
  styleUrl: './plain-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Trouble {
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);

  /** Where the person wanted to go. */
  readonly to = input<string>();

  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isTrying = signal(false);

  protected async tryAgain(): Promise<void> {
    this.isTrying.set(true);
    try {
      await this.session.refresh();
      await this.router.navigateByUrl(localAddress(this.to()), { replaceUrl: true });
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      this.problem.set(error);
    } finally {
      this.isTrying.set(false);
    }
  }
}
