import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { SessionApi } from '../api/session-api';

/** Where somebody lands whose role opens no area yet: says plainly what there is for them now. */
@Component({
  selector: 'fw-welcome',
  imports: [MatButtonModule, RouterLink],
  templateUrl: './welcome.html',
  styleUrl: './welcome.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Welcome {
  private readonly session = inject(SessionApi);

  protected readonly user = this.session.user;
  protected readonly current = this.session.current;
  protected readonly isCustomer = computed(() => this.session.role() === 'customer');
}
