import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Job } from '@foldwright/shared/contracts/photos';
import type { TraceStage } from '@foldwright/shared/fitting/trace';

const STAGE_WORDS: Readonly<Record<TraceStage, string>> = {
  decode: 'Photo opened',
  markers: 'Markers',
  'square-up': 'Squared up',
  template: 'Template found',
  outline: 'Outline',
  holes: 'Holes',
};

/** The stages of a reading as they happen, each with what it found; a reading that is under way can be stopped. */
@Component({
  selector: 'fw-reading-progress',
  imports: [MatButtonModule],
  template: `
    <h2>Reading the photo</h2>
    <ol aria-live="polite">
      @for (stage of stages(); track stage.id) {
        <li [class]="stage.state">
          <span>
            {{ stage.label }}
            @if (stage.state === 'running') {
              <span class="fw-hidden">, under way</span>
            }
            @if (stage.note !== '') {
              <small>{{ stage.note }}</small>
            }
          </span>
        </li>
      }
    </ol>
    @if (waits()) {
      <p class="fw-note">Waiting for its turn.</p>
    }
    @if (isBusy() && canStop()) {
      <button mat-stroked-button type="button" (click)="stopped.emit()">Stop here</button>
    }
  `,
  styleUrl: './reading-progress.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReadingProgress {
  readonly job = input.required<Job>();
  readonly canStop = input(true);
  readonly stopped = output<void>();

  protected readonly waits = computed(() => this.job().state === 'waiting');
  protected readonly isBusy = computed(() => this.waits() || this.job().state === 'running');
  protected readonly stages = computed(() =>
    this.job().stages.map(({ stage, state, note }) => ({ id: stage, label: STAGE_WORDS[stage], state, note })),
  );
}
