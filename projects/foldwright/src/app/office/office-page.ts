import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import type { Mail } from '@foldwright/shared/contracts/office';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { OfficeApi } from '../api/office-api';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { MembersSection } from './members/members-section';

const MAIL_STATE_WORDS: Readonly<Record<Mail['state'], string>> = {
  waiting: 'waiting to be sent',
  sent: 'sent',
  failed: 'could not be sent',
};

/** The office: who belongs to the workshop, what mail went out, who did what. Each is shown to the roles it is for. */
@Component({
  selector: 'fw-office-page',
  imports: [MembersSection, Pictogram],
  templateUrl: './office-page.html',
  styleUrl: './office-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class OfficePage {
  private readonly office = inject(OfficeApi);
  private readonly session = inject(SessionApi);

  protected readonly seesMails = this.session.canMake;
  protected readonly seesAudit = computed(() => this.session.role() === 'owner');
  protected readonly mails = this.office.mails(this.seesMails);
  protected readonly audit = this.office.auditTrail(this.seesAudit);

  private readonly now = new Date();
  protected readonly mailRows = computed(() =>
    (this.mails.value()?.mails ?? []).map((mail) => ({
      mail,
      state: MAIL_STATE_WORDS[mail.state],
      when: momentWords(mail.sentAt ?? mail.createdAt, this.now),
    })),
  );
  protected readonly auditRows = computed(() =>
    (this.audit.value()?.entries ?? []).map((entry) => ({ entry, when: momentWords(entry.at, this.now) })),
  );

  constructor() {
    rereadOn(['mail-changed'], () => this.mails.reload());
    rereadOn(['members-changed'], () => this.audit.reload());
  }
}
