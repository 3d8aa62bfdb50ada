import { DestroyRef, Injectable, computed, inject, linkedSignal, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import type { Photo } from '@foldwright/shared/contracts/photos';
import type { TemplateKind } from '@foldwright/shared/part/part-document';
import { isSameJson } from '@foldwright/shared/part/canonical-json';
import { documentFromTrace } from '@foldwright/shared/part/document-from-trace';
import { type Subscription, filter, merge, timer } from 'rxjs';
import { type ApiProblem, problemFromError } from '../../api/api-problem';
import { LiveEvents } from '../../api/live-events';
import { type PhotoFacts, PhotosApi } from '../../api/photos-api';
import { PartStore } from '../part-store';
import { type TemplateAnswers, answersOf, completeAnswers, openQuestions, traceAnswers } from './template-answers';

export interface UploadState {
  readonly fileName: string;
  /** 0 to 1. */
  readonly share: number;
}

const BUSY_STATES: readonly string[] = ['waiting', 'running'];
/** Events come live; this only catches one that was lost on the way. */
const LOOK_AGAIN_MS = 4000;

/** One mock-up: its newest photo, the reading of it, and what the person says about the template. */
@Injectable()
export class MockUpStore {
  private readonly photosApi = inject(PhotosApi);
  private readonly live = inject(LiveEvents);
  private readonly part = inject(PartStore);

  private readonly photoId = linkedSignal(() => newestOf(this.part.detail()?.photos ?? [])?.id);
  private readonly photoRead = this.photosApi.photo(this.photoId);
  private readonly uploadState = signal<UploadState | null>(null);
  private readonly problemState = signal<ApiProblem | null>(null);
  private readonly answersState = linkedSignal<TemplateAnswers>(() => answersOf(this.takenTemplate()));
  private readonly isChanged = signal(false);
  private uploading: Subscription | null = null;

  /** Whether the outline that is shown is the one that was taken, as far as this visit knows. */
  readonly isTaken = computed(() => this.part.hasOutline() && !this.isChanged());
  readonly photo = computed(() => this.photoRead.value() ?? null);
  readonly upload = this.uploadState.asReadonly();
  readonly problem = computed(() => this.problemState() ?? this.photoRead.problem());
  readonly answers = this.answersState.asReadonly();
  readonly openQuestions = computed(() => openQuestions(this.answersState()));
  readonly isReading = computed(() => BUSY_STATES.includes(this.photo()?.job?.state ?? ''));
  readonly trace = computed(() => (this.isReading() ? null : (this.photo()?.trace ?? null)));
  readonly imageUrl = computed(() => {
    const photo = this.photo();
    return photo?.rectified ? this.photosApi.imageUrl(photo.id, 'rectified') : null;
  });
  readonly canAccept = computed(() => this.trace() !== null && this.openQuestions() === 0 && this.part.canEdit());

  private readonly takenTemplate = computed(
    () => (this.part.hasOutline() ? (this.part.document()?.template ?? null) : null),
    { equal: isSameJson },
  );

  constructor() {
    const jobEvents = this.live.events.pipe(
      filter((event) => event.kind === 'job-changed' && event.photoId === this.photoId()),
    );
    const whileReading = timer(LOOK_AGAIN_MS, LOOK_AGAIN_MS).pipe(filter(() => this.isReading()));
    merge(jobEvents, whileReading, this.live.resumed)
      .pipe(takeUntilDestroyed())
      .subscribe(() => this.photoRead.reload());
    inject(DestroyRef).onDestroy(() => this.uploading?.unsubscribe());
  }

  scaleSheetUrl(paper: 'A4' | 'Letter'): string {
    return this.photosApi.scaleSheetUrl(paper, 'light');
  }

  /** Sends a photo; a second one while the first is still on its way takes its place. */
  send(facts: PhotoFacts, file: File): void {
    const partId = this.part.detail()?.id;
    if (partId === undefined) return;
    this.uploading?.unsubscribe();
    this.problemState.set(null);
    this.uploadState.set({ fileName: file.name, share: 0 });
    this.uploading = this.photosApi.upload(partId, facts, file).subscribe({
      next: (progress) => {
        if (progress.kind === 'sending') {
          this.uploadState.set({ fileName: file.name, share: progress.sentBytes / progress.totalBytes });
          return;
        }
        this.uploadState.set(null);
        this.isChanged.set(true);
        this.photoId.set(progress.value.id);
        this.photoRead.set(progress.value);
      },
      error: (error: unknown) => {
        this.uploadState.set(null);
        this.problemState.set(problemFromError(error));
      },
    });
  }

  stopUpload(): void {
    this.uploading?.unsubscribe();
    this.uploadState.set(null);
  }

  stopReading(): Promise<void> {
    return this.onJob((jobId) => this.photosApi.stopJob(jobId));
  }

  readAgain(): Promise<void> {
    return this.onJob((jobId) => this.photosApi.retryJob(jobId));
  }

  /** Reads the same photo with another kind or thickness of template. */
  async rereadAs(templateKind: TemplateKind, templateThicknessMm: number): Promise<void> {
    const photo = this.photo();
    if (photo === null) return;
    await this.guarded(async () => {
      this.isChanged.set(true);
      this.photoRead.set(await this.photosApi.reread(photo.id, { templateKind, templateThicknessMm }));
    });
  }

  answer(change: Partial<TemplateAnswers>): void {
    this.isChanged.set(true);
    this.answersState.update((answers) => ({ ...answers, ...change }));
  }

  /** Takes the outline into the draft; answers whether it stands there. */
  accept(): boolean {
    const trace = this.trace();
    const photo = this.photo();
    const answers = completeAnswers(this.answersState());
    if (trace === null || photo === null || answers === null) return false;
    const document = documentFromTrace(
      trace,
      traceAnswers(answers, photo.templateKind, photo.templateThicknessMm),
      (prefix) => `${prefix}-${crypto.randomUUID().slice(0, 8)}`,
    );
    return this.part.apply(
      [
        { kind: 'setTemplate', template: document.template },
        { kind: 'replaceLayout', layout: document.layout, origin: 'trace' },
      ],
      { label: 'Take the outline from the photo' },
    );
  }

  dismissProblem(): void {
    this.problemState.set(null);
  }

  private async onJob(act: (jobId: string) => Promise<unknown>): Promise<void> {
    const jobId = this.photo()?.job?.id;
    if (jobId === undefined) return;
    await this.guarded(async () => {
      await act(jobId);
      this.photoRead.reload();
    });
  }

  private async guarded(act: () => Promise<void>): Promise<void> {
    this.problemState.set(null);
    try {
      await act();
    } catch (error) {
      // What the server refused is told on the page; the photo and its last reading stay as they were.
      this.problemState.set(problemFromError(error));
    }
  }
}

function newestOf(photos: readonly Photo[]): Photo | undefined {
  return photos.reduce<Photo | undefined>(
    (newest, photo) => (newest === undefined || photo.uploadedAt > newest.uploadedAt ? photo : newest),
    undefined,
  );
}
