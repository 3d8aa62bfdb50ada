import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  ElementRef,
  computed,
  effect,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import { TEMPLATE_KINDS } from '@foldwright/shared/stock/template-kinds';
import { LengthInput } from '@foldwright/ui/length-input/length-input';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { PartRoad, type StepAction } from '../part-road';
import { PartStore } from '../part-store';
import { MockUpStore } from './mock-up-store';
import { PhotoIntake } from './photo-intake';
import { ReadingProgress } from './reading-progress';
import { TemplateQuestions } from './template-questions';
import { TraceBoard } from './trace-board';

/** From a photo of the template to an outline that a person takes: send it, watch it read, answer three questions. */
@Component({
  selector: 'fw-mock-up-page',
  imports: [
    LengthInput,
    MatButtonModule,
    PartCardFrame,
    PhotoIntake,
    ReactiveFormsModule,
    ReadingProgress,
    TemplateQuestions,
    TraceBoard,
  ],
  providers: [MockUpStore],
  templateUrl: './mock-up-page.html',
  styleUrl: './mock-up-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MockUpPage {
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  private readonly router = inject(Router);
  private readonly road = inject(PartRoad);
  protected readonly part = inject(PartStore);
  protected readonly store = inject(MockUpStore);
  protected readonly board = viewChild(TraceBoard);

  /** Whether another photo is to be taken although there is one. */
  protected readonly isTakingAgain = signal(false);
  protected readonly isSending = computed(() => this.store.upload() !== null);
  protected readonly showsIntake = computed(
    () => this.store.photo() === null || this.isTakingAgain() || this.isSending(),
  );
  protected readonly thickness = new FormControl<number | null>(null);
  protected readonly kindName = computed(
    () => TEMPLATE_KINDS.find(({ id }) => id === this.store.photo()?.templateKind)?.name ?? '',
  );
  protected readonly foundWords = computed(() => {
    const trace = this.store.trace();
    if (trace === null) return '';
    const count = (number: number, word: string): string => `${number} ${word}${number === 1 ? '' : 's'}`;
    const found = [
      count(trace.outer.length, 'edge'),
      count(trace.holes.length, 'hole'),
      count(trace.slots.length, 'slot'),
      count(trace.cutouts.length, 'cut-out'),
    ];
    return `${found.join(', ')}, from ${count(trace.markersUsed, 'marker')}.`;
  });
  protected readonly replaces = this.part.hasOutline;

  private readonly action = computed<StepAction | null>(() => {
    if (this.store.trace() === null || this.store.isTaken() || !this.part.canEdit() || this.showsIntake()) return null;
    const open = this.store.openQuestions();
    const label =
      open === 0 ? 'Use this outline' : open === 1 ? 'Answer the last question' : `Answer the ${open} questions`;
    return { label, link: null, act: () => void this.act(), isDisabled: false };
  });

  constructor() {
    // The place of the call to act belongs to the frame around this page; it is not a signal of ours.
    effect(() => this.road.offer(this.action()));
    inject(DestroyRef).onDestroy(() => this.road.offer(null));
    effect(() => this.thickness.setValue(this.store.photo()?.templateThicknessMm ?? null, { emitEvent: false }));
  }

  protected reread(thicknessMm: number): void {
    const photo = this.store.photo();
    if (photo !== null) void this.store.rereadAs(photo.templateKind, thicknessMm);
  }

  protected takeAgain(isWanted: boolean): void {
    this.isTakingAgain.set(isWanted);
  }

  private async act(): Promise<void> {
    if (!this.store.canAccept()) {
      this.host.querySelector<HTMLElement>('fw-template-questions fieldset:has(em) input')?.focus();
      return;
    }
    const partId = this.part.detail()?.id;
    if (partId === undefined || !this.store.accept()) return;
    this.part.reach('outline');
    // Without a connection the outline is kept here and sent later; the person goes on all the same.
    await this.part.settle();
    await this.router.navigate(['/parts', partId, 'outline']);
  }
}
