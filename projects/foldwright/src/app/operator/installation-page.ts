import { ChangeDetectionStrategy, Component, computed, inject, viewChild } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { OfficeApi } from '../api/office-api';
import { TroublesSection } from './troubles-section';

/** What the operator of an installation looks after: its health, workshops, queues, mail and webhooks. */
@Component({
  selector: 'fw-installation-page',
  imports: [FindingSign, MatButtonModule, Pictogram, TroublesSection],
  templateUrl: './installation-page.html',
  styleUrl: './installation-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class InstallationPage {
  private readonly troubles = viewChild.required(TroublesSection);
  private readonly office = inject(OfficeApi);
  protected readonly installation = this.office.installation();
  protected readonly health = this.office.health();

  private readonly now = new Date();
  protected readonly failedJobs = computed(() =>
    (this.installation.value()?.failedJobs ?? []).map((job) => ({ job, when: momentWords(job.updatedAt, this.now) })),
  );

  protected readAgain(): void {
    this.installation.reload();
    this.health.reload();
    this.troubles().reload();
  }
}
