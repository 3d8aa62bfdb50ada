import { ChangeDetectionStrategy, Component, computed, input, output, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { momentWords } from '../date-text/date-words';
import { PlaceBoard, type PlaceMark } from '../place-board/place-board';

/** A comment, as far as it is shown. */
export interface TalkComment {
  readonly id: string;
  readonly place: Point | null;
  readonly text: string;
  readonly by: string;
  readonly isGuest: boolean;
  readonly at: string;
  readonly isResolved: boolean;
}

/** What somebody says of the revision, as far as it is shown. */
export interface TalkOpinion {
  readonly id: string;
  readonly verdict: 'agreed' | 'changes-wanted';
  readonly note: string;
  readonly by: string;
  readonly isGuest: boolean;
  readonly at: string;
}

/** Something somebody wants to say; `key` stays the same until it was said. */
export interface NewTalk {
  readonly place: Point | null;
  readonly text: string;
}

/**
 * Talk about a part: comments with numbered places on its drawing, agreeing or asking for changes. What is said goes out by
 * outputs; who shows this sends it and hands in the new lists.
 */
@Component({
  selector: 'fw-review-talk',
  imports: [MatButtonModule, PlaceBoard, ReactiveFormsModule],
  templateUrl: './review-talk.html',
  styleUrl: './review-talk.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReviewTalk {
  readonly layout = input.required<Layout>();
  readonly comments = input.required<readonly TalkComment[]>();
  readonly opinions = input.required<readonly TalkOpinion[]>();
  readonly isBusy = input(false);
  readonly canResolve = input(false);

  readonly commented = output<NewTalk>();
  readonly judged = output<{ readonly verdict: TalkOpinion['verdict']; readonly note: string }>();
  readonly resolved = output<{ readonly id: string; readonly isResolved: boolean }>();

  protected readonly place = signal<Point | null>(null);
  protected readonly text = new FormControl('', { nonNullable: true });
  protected readonly note = new FormControl('', { nonNullable: true });
  protected readonly isEmpty = signal(false);
  private readonly now = new Date();

  protected readonly rows = computed(() =>
    this.comments().map((comment, at) => ({
      ...comment,
      number: at + 1,
      who: comment.isGuest ? `${comment.by} (guest)` : comment.by,
      when: momentWords(comment.at, this.now),
    })),
  );
  protected readonly marks = computed((): readonly PlaceMark[] => [
    ...this.rows().flatMap(({ id, number, place, isResolved }) =>
      place === null || isResolved ? [] : [{ key: id, number, at: place }],
    ),
    ...this.newMark(),
  ]);
  protected readonly said = computed(() =>
    this.opinions().map((opinion) => ({
      ...opinion,
      who: opinion.isGuest ? `${opinion.by} (guest)` : opinion.by,
      words: opinion.verdict === 'agreed' ? 'agrees to this revision' : 'asks for changes',
      when: momentWords(opinion.at, this.now),
    })),
  );

  protected setPlace(axis: 'x' | 'y', event: Event): void {
    if (!(event.target instanceof HTMLInputElement)) return;
    const value = event.target.valueAsNumber;
    if (!Number.isFinite(value)) return;
    this.place.update((place) => ({ x: place?.x ?? 0, y: place?.y ?? 0, [axis]: value }));
  }

  protected comment(): void {
    const text = this.text.value.trim();
    this.isEmpty.set(text === '');
    if (text === '' || this.isBusy()) return;
    this.commented.emit({ place: this.place(), text });
    this.text.reset();
    this.place.set(null);
  }

  protected judge(verdict: TalkOpinion['verdict']): void {
    if (this.isBusy()) return;
    this.judged.emit({ verdict, note: this.note.value.trim() });
    this.note.reset();
  }

  private newMark(): readonly PlaceMark[] {
    const at = this.place();
    return at === null ? [] : [{ key: 'new', number: this.comments().length + 1, at }];
  }
}
