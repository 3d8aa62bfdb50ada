import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  afterRenderEffect,
  computed,
  inject,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import { NgTemplateOutlet } from '@angular/common';
import { RouterLink } from '@angular/router';

/** Punched = done, chalk ring = now, scribe tick = to come. */
export type RouteMark = 'punched' | 'ring' | 'tick';

/** One step along the strip. With `link` it is a link; `disabled` steps can't be gone to yet. */
export interface RouteStep {
  readonly id: string;
  readonly label: string;
  /** A few words beside the label ("good to 0.3 mm"). */
  readonly sub?: string | null;
  readonly mark: RouteMark;
  readonly link?: string | readonly unknown[] | null;
  readonly disabled?: boolean;
}

const MARK_WORDS: Readonly<Record<RouteMark, string>> = { punched: 'done', ring: 'now', tick: 'to come' };

/**
 * A length of blued flat bar with one scribed line and a mark per step: the steps of a part, or the timeline of an order.
 * Steps with a link are links, other steps are buttons when `canChoose` is set and plain text when not. Arrow keys, Home
 * and End walk along it. On a phone it scrolls, and the step that is now is brought into view.
 */
@Component({
  selector: 'fw-route-strip',
  imports: [NgTemplateOutlet, RouterLink],
  templateUrl: './route-strip.html',
  styleUrl: './route-strip.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown)': 'walk($event)' },
})
export class RouteStrip {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  readonly steps = input.required<readonly RouteStep[]>();
  readonly label = input.required<string>();
  readonly canChoose = input(false);

  /** Id of the step that was clicked or entered. */
  readonly chosen = output<string>();

  /** Steps whose mark was punched just now: only those are seen being struck. */
  protected readonly struck = linkedSignal<readonly RouteStep[], ReadonlySet<string>>({
    source: this.steps,
    computation: (steps, previous) => {
      if (previous === undefined) return new Set();
      const before = new Map(previous.source.map((step) => [step.id, step.mark]));
      return new Set(
        steps
          .filter((step) => step.mark === 'punched' && before.has(step.id) && before.get(step.id) !== 'punched')
          .map((step) => step.id),
      );
    },
  });

  /** Without steps to go to, the strip itself takes the focus, so that a keyboard can scroll it. */
  protected readonly isPlain = computed(() => !this.canChoose() && !this.steps().some((step) => step.link));

  constructor() {
    afterRenderEffect(() => {
      const index = this.steps().findIndex((step) => step.mark === 'ring');
      if (index >= 0) this.bringIntoView(index);
    });
  }

  protected markWord(step: RouteStep): string {
    return MARK_WORDS[step.mark];
  }

  protected walk(event: KeyboardEvent): void {
    const stops = [...this.host.querySelectorAll<HTMLElement>('a[href], button:not(:disabled)')];
    const at = stops.findIndex((stop) => stop === event.target);
    const target = { ArrowRight: at + 1, ArrowLeft: at - 1, Home: 0, End: stops.length - 1 }[event.key];
    if (at < 0 || target === undefined) return;
    event.preventDefault();
    stops[Math.max(0, Math.min(stops.length - 1, target))]?.focus();
  }

  private bringIntoView(index: number): void {
    const bar = this.host.querySelector('ol');
    // The step before stays in view with it: where one comes from says where one is.
    const step = bar?.children.item(Math.max(0, index - 1));
    if (!(bar instanceof HTMLElement) || !(step instanceof HTMLElement)) return;
    // Only the strip scrolls, never the page around it.
    if (bar.scrollWidth > bar.clientWidth) bar.scrollLeft = step.offsetLeft;
  }
}
