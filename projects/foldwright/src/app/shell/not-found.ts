import { ChangeDetectionStrategy, Component } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';

/** An address that leads nowhere. */
@Component({
  selector: 'fw-not-found',
  imports: [MatButtonModule, RouterLink],
  template: `
    <section>
      <h1>There is nothing here</h1>
      <p>The address may be mistyped, or what was here belongs to another workshop or is gone.</p>
      <div class="go"><a matButton="filled" routerLink="/">Go to the start</a></div>
    </section>
  `,
  styleUrl: './plain-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFound {}
