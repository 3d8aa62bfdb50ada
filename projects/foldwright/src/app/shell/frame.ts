import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import { MatMenuModule } from '@angular/material/menu';
import { NavigationStart, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { auditTime, filter, map, merge, startWith } from 'rxjs';
import { ApiProblem } from '../api/api-problem';
import { LiveEvents } from '../api/live-events';
import { Notices } from '../api/notices';
import { SessionApi } from '../api/session-api';
import { SignedOutWatch } from '../api/signed-out-watch';
import { areasFor } from './areas';
import { initialsOf } from './initials-of';
import { membershipNews } from './membership-news';
import { NoticeCard } from '@foldwright/ui/notice-card/notice-card';
import { ThemeChoice } from './theme-choice';

const RECHECK_AFTER_MS = 300;

/** The frame around every page of somebody signed in: mark, areas, workshop, theme, the person, and notices. */
@Component({
  selector: 'fw-frame',
  imports: [
    BrandMark,
    MatButtonModule,
    MatMenuModule,
    NoticeCard,
    Pictogram,
    RouterLink,
    RouterLinkActive,
    RouterOutlet,
  ],
  templateUrl: './frame.html',
  styleUrl: './frame.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Frame {
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);
  private readonly live = inject(LiveEvents);
  private readonly signedOut = inject(SignedOutWatch);
  private readonly themeChoice = inject(ThemeChoice);
  protected readonly notices = inject(Notices);

  protected readonly user = this.session.user;
  protected readonly current = this.session.current;
  protected readonly areas = computed(() => areasFor(this.session.role()));
  protected readonly initials = computed(() => initialsOf(this.user()?.name ?? ''));
  protected readonly roleWord = computed(() => this.session.role() ?? '');
  /** Holds the initials too, so that somebody who speaks what they see is understood. */
  protected readonly personLabel = computed(() =>
    [this.initials(), this.user()?.name ?? '', this.roleWord()].filter((word) => word !== '').join(', '),
  );
  protected readonly otherWorkshops = computed(() =>
    this.session.memberships().filter((membership) => membership.workshopId !== this.current()?.workshopId),
  );
  protected readonly themeLabel = computed(() =>
    this.themeChoice.theme() === 'dark' ? 'Switch to light' : 'Switch to dark',
  );
  protected readonly themeIcon = computed(() => (this.themeChoice.theme() === 'dark' ? 'sun' : 'moon'));
  protected readonly isLeaving = signal(false);

  private readonly address = toSignal(
    this.router.events.pipe(
      map(() => this.router.url),
      startWith(this.router.url),
    ),
    { requireSync: true },
  );
  protected readonly currentArea = computed(
    () => this.areas().find((area) => this.address().startsWith(area.path))?.label ?? 'Areas',
  );

  constructor() {
    // One listener for the whole frame, so that the stream lasts from page to page.
    merge(this.live.events.pipe(filter(({ kind }) => kind === 'members-changed')), this.live.resumed)
      .pipe(auditTime(RECHECK_AFTER_MS), takeUntilDestroyed())
      .subscribe(() => void this.recheckSession());
    this.router.events
      .pipe(
        filter((event) => event instanceof NavigationStart),
        takeUntilDestroyed(),
      )
      .subscribe(() => this.notices.dismiss());
  }

  protected switchTheme(): void {
    this.themeChoice.switch();
  }

  protected async switchWorkshop(workshopId: string): Promise<void> {
    await this.session.switchWorkshop(workshopId);
    await this.enterWorkshop();
  }

  /** An owner may have given the person another role or removed them: the page follows at once. */
  private async recheckSession(): Promise<void> {
    if (this.isLeaving()) return;
    const before = this.current();
    try {
      if ((await this.session.refresh()).user === null) return this.signedOut.report();
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      // Whatever the person does next tells them that the server is away.
      return;
    }
    const now = this.current();
    if (now?.workshopId !== before?.workshopId) await this.enterWorkshop();
    const news = membershipNews(before, now, this.session.memberships());
    if (news !== null) this.notices.showNews(news.title, news.detail);
  }

  private async enterWorkshop(): Promise<void> {
    this.live.restart();
    // By way of the account page, so that the area's page is made anew and reads the other workshop.
    await this.router.navigateByUrl('/account', { skipLocationChange: true });
    await this.router.navigateByUrl('/');
  }

  protected async signOut(): Promise<void> {
    this.isLeaving.set(true);
    try {
      await this.session.signOut();
      await this.router.navigateByUrl('/sign-in');
    } finally {
      this.isLeaving.set(false);
    }
  }

  /** Moves to the page's content past the bar; a plain anchor would change the address. */
  protected skip(event: Event, main: HTMLElement): void {
    event.preventDefault();
    main.focus();
  }
}
