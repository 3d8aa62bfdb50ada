import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  ElementRef,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { Pictogram } from '../pictogram/pictogram';
import type { PictogramName } from '../pictogram/pictogram-paths';
import { graduate } from './graduations';

/** Something that can be done with what is selected. */
export interface RuleVerb {
  readonly id: string;
  readonly label: string;
  readonly icon: PictogramName;
  /** Letter of the key that does it; whoever owns the drawing listens for it. */
  readonly key?: string | null;
  /** The one that is under way or next to do: it wears chalk. */
  readonly primary?: boolean;
  readonly disabled?: boolean;
}

/** Tools at the rule's end that need no word: undo, redo, fit. `label` names them for readers. */
export interface RuleTool {
  readonly id: string;
  readonly label: string;
  readonly icon: PictogramName;
  readonly disabled?: boolean;
}

const UNIT_ROOM_PX = 84;

/**
 * A steel rule under the drawing: graduated to its scale with zero at the selection, and holding the verbs of what is
 * selected. One tab stop; arrow keys, Home and End walk along it.
 */
@Component({
  selector: 'fw-steel-rule',
  imports: [Pictogram],
  templateUrl: './steel-rule.html',
  styleUrl: './steel-rule.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown)': 'walk($event)' },
})
export class SteelRule {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  /** Scale of the drawing above. */
  readonly pxPerMm = input.required<number>();
  /** Where 0 lies, px from the rule's left end. */
  readonly zeroPx = input.required<number>();
  /** Extent of the selection along the rule, mm from zero; null when nothing is selected. */
  readonly selection = input<{ readonly fromMm: number; readonly toMm: number } | null>(null);
  /** What is selected, in up to two short lines. */
  readonly what = input<readonly string[]>([]);
  readonly verbs = input<readonly RuleVerb[]>([]);
  readonly tools = input<readonly RuleTool[]>([]);
  readonly label = input('What you can do with the selection');

  /** Id of the verb or tool that was chosen. */
  readonly verb = output<string>();

  private readonly widthPx = signal(0);
  private readonly walkedTo = signal<string | null>(null);

  protected readonly graduations = computed(() => graduate(this.widthPx() - 62, this.pxPerMm(), this.zeroPx()));
  /** The last figure makes room for the unit at the rule's end. */
  protected readonly labels = computed(() =>
    this.graduations().labels.filter((label) => label.xPx < this.widthPx() - UNIT_ROOM_PX),
  );
  protected readonly ticks = computed(() =>
    this.graduations()
      .ticks.map((tick) => `M${tick.xPx} 0v${tick.heightPx}`)
      .join(''),
  );
  protected readonly span = computed(() => {
    const selection = this.selection();
    if (selection === null) return null;
    const from = this.zeroPx() + selection.fromMm * this.pxPerMm();
    const to = this.zeroPx() + selection.toMm * this.pxPerMm();
    return { ends: `M${from} 0v11M${to} 0v11`, bar: `M${from} 1.5H${to}` };
  });
  protected readonly endPx = computed(() => this.widthPx());
  /** The button that Tab reaches: the one walked to last while it is there, else the first that can be used. */
  protected readonly tabStop = computed(() => {
    const usable = [...this.verbs(), ...this.tools()].filter((action) => action.disabled !== true);
    return usable.find((action) => action.id === this.walkedTo())?.id ?? usable[0]?.id ?? null;
  });

  constructor() {
    const destroyed = inject(DestroyRef);
    afterNextRender(() => {
      this.widthPx.set(this.host.clientWidth);
      if (typeof ResizeObserver === 'undefined') return;
      const observer = new ResizeObserver(() => this.widthPx.set(this.host.clientWidth));
      observer.observe(this.host);
      destroyed.onDestroy(() => observer.disconnect());
    });
  }

  protected walk(event: KeyboardEvent): void {
    const stops = [...this.host.querySelectorAll<HTMLButtonElement>('button:not(:disabled)')];
    const at = stops.findIndex((stop) => stop === event.target);
    const target = { ArrowRight: at + 1, ArrowLeft: at - 1, Home: 0, End: stops.length - 1 }[event.key];
    if (at < 0 || target === undefined) return;
    event.preventDefault();
    const stop = stops[Math.max(0, Math.min(stops.length - 1, target))];
    this.walkedTo.set(stop?.dataset['action'] ?? null);
    stop?.focus();
  }

  protected choose(id: string): void {
    this.walkedTo.set(id);
    this.verb.emit(id);
  }
}
