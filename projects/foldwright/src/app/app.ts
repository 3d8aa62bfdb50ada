import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router, RouterOutlet } from '@angular/router';
import { exhaustMap } from 'rxjs';
import { SessionApi } from './api/session-api';
import { SignedOutWatch } from './api/signed-out-watch';
import { ThemeChoice } from './shell/theme-choice';

/** The root of the application: whatever area the address names. */
@Component({
  selector: 'fw-root',
  imports: [RouterOutlet],
  template: '<router-outlet />',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  private readonly router = inject(Router);
  private readonly session = inject(SessionApi);

  constructor() {
    // Sets the theme before the first page is drawn.
    inject(ThemeChoice);
    inject(SignedOutWatch)
      .signedOut.pipe(
        exhaustMap(() => this.signInAgain()),
        takeUntilDestroyed(),
      )
      .subscribe();
  }

  private async signInAgain(): Promise<void> {
    // A wrong password says "not signed in" too, but there the person is on the right page already.
    if (this.router.url.startsWith('/sign-in')) return;
    const to = this.router.url;
    await this.session.refresh();
    await this.router.navigate(['/sign-in'], { queryParams: { to } });
  }
}
