import { ChangeDetectionStrategy, Component, ElementRef, computed, inject, input, output, signal } from '@angular/core';
import { restingFold } from './fold-motion';

/** The arc's middle and radius in its own drawing, px. */
const HUB = { x: 12, y: 98 } as const;
const RADIUS = 74;
const STEPS: Readonly<Record<string, number>> = {
  ArrowUp: 0.05,
  ArrowRight: -0.05,
  ArrowDown: -0.05,
  ArrowLeft: 0.05,
  PageUp: 0.25,
  PageDown: -0.25,
};

/** What the arc says: the fold, and whether a hand still holds it. */
export interface FoldChange {
  readonly fold: number;
  readonly isHeld: boolean;
}

/** A slider in the shape of what it does: a quarter arc from flat to formed. */
@Component({
  selector: 'fw-fold-arc',
  templateUrl: './fold-arc.html',
  styleUrl: './fold-arc.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FoldArc {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  /** 0 flat, 1 formed. */
  readonly fold = input.required<number>();
  readonly changed = output<FoldChange>();

  private readonly isHeld = signal(false);
  protected readonly percent = computed(() => Math.round(this.fold() * 100));
  protected readonly words = computed(() => {
    const percent = this.percent();
    return percent === 0 ? 'flat' : percent === 100 ? 'formed' : `${percent} % folded`;
  });
  protected readonly knob = computed(() => onArc(this.fold()));
  protected readonly arm = computed(() => {
    const end = onArc(this.fold(), RADIUS - 9);
    return `M${HUB.x} ${HUB.y}L${end.x} ${end.y}`;
  });
  protected readonly travelled = computed(() => {
    const { x, y } = this.knob();
    return `M${HUB.x + RADIUS} ${HUB.y}A${RADIUS} ${RADIUS} 0 0 0 ${x} ${y}`;
  });
  protected readonly ticks = TICKS;

  protected press(event: PointerEvent): void {
    if (event.target instanceof Element) event.target.setPointerCapture(event.pointerId);
    this.isHeld.set(true);
    this.tell(event);
  }

  protected move(event: PointerEvent): void {
    if (this.isHeld()) this.tell(event);
  }

  protected release(): void {
    if (!this.isHeld()) return;
    this.isHeld.set(false);
    this.changed.emit({ fold: restingFold(this.fold()), isHeld: false });
  }

  protected pressKey(event: KeyboardEvent): void {
    const step = STEPS[event.key];
    if (event.key === 'Home') this.goTo(0);
    else if (event.key === 'End') this.goTo(1);
    else if (step !== undefined) this.goTo(Math.min(1, Math.max(0, this.fold() + step)));
    else return;
    event.preventDefault();
  }

  protected goTo(fold: number): void {
    this.changed.emit({ fold: Math.round(fold * 1000) / 1000, isHeld: false });
  }

  private tell(event: PointerEvent): void {
    const box = this.host.querySelector('svg')?.getBoundingClientRect();
    if (box === undefined) return;
    const angle = Math.atan2(box.top + HUB.y - event.clientY, event.clientX - box.left - HUB.x);
    this.changed.emit({ fold: Math.min(1, Math.max(0, angle / (Math.PI / 2))), isHeld: true });
  }
}

function onArc(fold: number, radius: number = RADIUS): { readonly x: number; readonly y: number } {
  const angle = (fold * Math.PI) / 2;
  const rounded = (value: number): number => Math.round(value * 100) / 100;
  return { x: rounded(HUB.x + radius * Math.cos(angle)), y: rounded(HUB.y - radius * Math.sin(angle)) };
}

const TICKS = Array.from({ length: 21 }, (_, index) => {
  const isLong = index % 10 === 0;
  const outer = onArc(index / 20);
  const inner = onArc(index / 20, RADIUS - (isLong ? 13 : index % 5 === 0 ? 9 : 6));
  return `M${outer.x} ${outer.y}L${inner.x} ${inner.y}`;
}).join('');
