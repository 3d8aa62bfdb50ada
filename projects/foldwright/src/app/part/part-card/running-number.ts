import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  afterRenderEffect,
  inject,
  input,
  signal,
} from '@angular/core';

/** Source of the motion tokens: a number takes 180 ms to its new value. */
const RUN_MS = 180;

/** A figure that runs to its new value while its row stays where it is. With reduced motion it jumps. */
@Component({
  selector: 'fw-running-number',
  template: '{{ shown() }}',
  styles: ':host { font-variant-numeric: tabular-nums; white-space: nowrap; }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RunningNumber {
  readonly value = input.required<number>();
  readonly decimals = input(1);

  protected readonly shown = signal('');
  private from = Number.NaN;
  private frame = 0;

  constructor() {
    afterRenderEffect(() => this.runTo(this.value(), this.decimals()));
    inject(DestroyRef).onDestroy(() => cancelAnimationFrame(this.frame));
  }

  private runTo(to: number, decimals: number): void {
    cancelAnimationFrame(this.frame);
    const start = this.from;
    if (Number.isNaN(start) || start === to || isMotionReduced()) {
      this.show(to, decimals);
      return;
    }
    const began = performance.now();
    const step = (now: number): void => {
      const t = Math.min(1, (now - began) / RUN_MS);
      this.show(start + (to - start) * (1 - (1 - t) ** 3), decimals);
      if (t < 1) this.frame = requestAnimationFrame(step);
    };
    this.frame = requestAnimationFrame(step);
  }

  private show(value: number, decimals: number): void {
    this.from = value;
    this.shown.set(value.toFixed(decimals));
  }
}

function isMotionReduced(): boolean {
  return typeof matchMedia !== 'function' || matchMedia('(prefers-reduced-motion: reduce)').matches;
}
