import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { SessionApi } from '../api/session-api';

/** A page that somebody's role doesn't open. */
@Component({
  selector: 'fw-not-yours',
  imports: [MatButtonModule, RouterLink],
  template: `
    <section>
      <h1>Your role doesn’t open this page</h1>
      <p>
        @if (role()) {
          You are here as {{ role() }}.
        }
        An owner of the workshop can give you another role.
      </p>
      <div class="go"><a matButton="filled" routerLink="/">Go to the start</a></div>
    </section>
  `,
  styleUrl: './plain-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotYours {
  private readonly session = inject(SessionApi);

  protected readonly role = this.session.role;
}
