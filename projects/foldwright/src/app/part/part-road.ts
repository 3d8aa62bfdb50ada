import { Injectable, computed, inject, signal } from '@angular/core';
import { PART_STEPS } from '@foldwright/shared/contracts/parts';
import type { RouteMark, RouteStep } from '@foldwright/ui/route-strip/route-strip';
import { ComputedParts } from './computed-parts';
import { PartStore } from './part-store';
import { type PartStep, STEP_WORDS, hasReached, stepAfter } from './part-steps';

/** The one call to act of a step: a link to the next step, or something that the step's page does. */
export interface StepAction {
  readonly label: string;
  readonly link: readonly unknown[] | null;
  readonly act: (() => void) | null;
  readonly isDisabled: boolean;
}

/** Where the part stands on its road: marks and words of the route strip, and the one call to act. */
@Injectable()
export class PartRoad {
  private readonly store = inject(PartStore);
  private readonly parts = inject(ComputedParts);
  private readonly stepState = signal<PartStep>('mock-up');
  /** A page may put its own call to act in the place of "Go on to …". */
  private readonly ownAction = signal<StepAction | null>(null);

  readonly step = this.stepState.asReadonly();
  readonly steps = computed<readonly RouteStep[]>(() => {
    const partId = this.store.detail()?.id ?? '';
    const hasOutline = this.store.hasOutline();
    const hasRelease = (this.store.detail()?.revisions.length ?? 0) > 0;
    return PART_STEPS.map((step) => ({
      id: step,
      label: STEP_WORDS[step],
      sub: this.words(step),
      mark: this.mark(step),
      link: ['/parts', partId, step],
      disabled: !hasOutline && step !== 'mock-up' && !(step === 'release' && hasRelease),
    }));
  });
  readonly action = computed<StepAction | null>(() => {
    const own = this.ownAction();
    if (own !== null) return own;
    const next = stepAfter(this.stepState());
    const partId = this.store.detail()?.id;
    if (next === null || partId === undefined || !this.store.hasOutline()) return null;
    return { label: `Go on to ${STEP_WORDS[next]}`, link: ['/parts', partId, next], act: null, isDisabled: false };
  });

  /** A step's page came into view. */
  enter(step: PartStep): void {
    this.stepState.set(step);
    this.ownAction.set(null);
    this.store.reach(step);
  }

  /** Puts a page's own call to act in view; null gives the place back. */
  offer(action: StepAction | null): void {
    this.ownAction.set(action);
  }

  private mark(step: PartStep): RouteMark {
    const current = this.stepState();
    if (step === current) return 'ring';
    const isBefore = PART_STEPS.indexOf(step) < PART_STEPS.indexOf(current);
    const isDone = this.store.hasOutline() && hasReached(this.store.furthestStep(), step);
    return isBefore || isDone ? 'punched' : 'tick';
  }

  private words(step: PartStep): string | null {
    const document = this.store.hasOutline() ? this.store.document() : null;
    switch (step) {
      case 'mock-up': {
        const trace = this.store.detail()?.photos.find((photo) => photo.trace !== null)?.trace;
        if (trace !== undefined && trace !== null) return `good to ${trace.uncertaintyMm.toFixed(1)} mm`;
        return document === null ? null : 'typed sizes';
      }
      case 'bends':
        return document === null ? null : String(document.layout.bends.length);
      case 'checks':
        return this.findingWords();
      case 'release': {
        const letter = this.store.letter() ?? this.store.detail()?.revisions[0]?.letter;
        return letter === undefined ? null : `revision ${letter}`;
      }
      default:
        return null;
    }
  }

  private findingWords(): string | null {
    if (!this.store.hasOutline()) return null;
    const all = [...(this.parts.trial()?.findings ?? []), ...(this.parts.production()?.findings ?? [])];
    const count = (severity: string): number =>
      new Set(all.filter((finding) => finding.severity === severity).map(({ id }) => id)).size;
    const blockers = count('blocker');
    if (blockers > 0) return `${blockers} can’t be made`;
    const cautions = count('caution');
    return cautions > 0 ? `${cautions} to check` : null;
  }
}
