import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  ElementRef,
  afterNextRender,
  afterRenderEffect,
  computed,
  inject,
  input,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { type FoldableMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { foldAt, FOLD_MS } from './fold-motion';
import { readColours } from './turntable-colours';
import type { TurntableScene } from './turntable-scene';

const TURN_PER_PX_DEG = 0.45;
const TURN_PER_KEY_DEG = 15;
const FIRST_TURN_DEG = -32;

/**
 * A part on a disc on the bench: drag or arrow keys turn the disc, `fold` folds the part. Without WebGL it says so by
 * `unavailable` and shows what was projected into it.
 */
@Component({
  selector: 'fw-part-viewer',
  templateUrl: './part-viewer.html',
  styleUrl: './part-viewer.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PartViewer {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  readonly mesh = input.required<FoldableMesh>();
  /** 0 flat, 1 formed. */
  readonly fold = input.required<number>();
  /** While a hand holds the slider the part follows at once; let go, it settles. */
  readonly isHeld = input(false);
  readonly label = input.required<string>();

  /** The browser draws no solids; something else should stand in. */
  readonly unavailable = output<void>();

  private readonly canvas = viewChild.required<ElementRef<HTMLCanvasElement>>('canvas');
  private readonly probes = viewChild.required<ElementRef<HTMLElement>>('probes');
  private readonly scene = signal<TurntableScene | null>(null);
  private readonly turnDeg = signal(FIRST_TURN_DEG);
  protected readonly isMissing = signal(false);
  protected readonly turnWords = computed(() => `turned ${((Math.round(this.turnDeg()) % 360) + 360) % 360} degrees`);

  private shownFold = 1;
  private settling = 0;
  private grip: { readonly pointerId: number; readonly xPx: number; readonly turnDeg: number } | null = null;
  /** Farthest any state of folding reaches from the disc's middle, mm. */
  private readonly reachMm = computed(() => reachOf(this.mesh()));
  private readonly middle = computed(() => middleOf(this.mesh()));

  constructor() {
    const destroyed = inject(DestroyRef);
    afterNextRender(() => void this.start(destroyed));
    afterRenderEffect(() => {
      const scene = this.scene();
      this.mesh();
      if (scene !== null) this.foldTo(this.fold(), this.isHeld());
    });
    afterRenderEffect(() => this.scene()?.turn(this.turnDeg()));
  }

  protected press(event: PointerEvent): void {
    if (event.button !== 0) return;
    this.canvas().nativeElement.setPointerCapture(event.pointerId);
    this.grip = { pointerId: event.pointerId, xPx: event.clientX, turnDeg: this.turnDeg() };
  }

  protected move(event: PointerEvent): void {
    if (this.grip?.pointerId !== event.pointerId) return;
    this.turnDeg.set(this.grip.turnDeg + (event.clientX - this.grip.xPx) * TURN_PER_PX_DEG);
  }

  protected release(): void {
    this.grip = null;
  }

  protected pressKey(event: KeyboardEvent): void {
    const step = { ArrowLeft: -TURN_PER_KEY_DEG, ArrowRight: TURN_PER_KEY_DEG }[event.key];
    if (event.key === 'Home') this.turnDeg.set(FIRST_TURN_DEG);
    else if (step === undefined) return;
    else this.turnDeg.update((angle) => angle + step);
    event.preventDefault();
  }

  private async start(destroyed: DestroyRef): Promise<void> {
    try {
      const { TurntableScene: Scene } = await import('./turntable-scene');
      if (destroyed.destroyed) return;
      const scene = new Scene(this.canvas().nativeElement);
      destroyed.onDestroy(() => {
        cancelAnimationFrame(this.settling);
        scene.dispose();
      });
      scene.paint(readColours(this.probes().nativeElement));
      this.watchTheme(scene, destroyed);
      this.watchSize(scene, destroyed);
      this.shownFold = this.fold();
      this.scene.set(scene);
    } catch {
      // No WebGL here, or it was switched off: the drawing that stands in shows the same part.
      this.isMissing.set(true);
      this.unavailable.emit();
    }
  }

  private watchSize(scene: TurntableScene, destroyed: DestroyRef): void {
    const measure = (): void => {
      const { clientWidth, clientHeight } = this.host;
      if (clientWidth > 0 && clientHeight > 0) scene.resize(clientWidth, clientHeight, Math.min(devicePixelRatio, 2));
    };
    measure();
    if (typeof ResizeObserver === 'undefined') return;
    const observer = new ResizeObserver(measure);
    observer.observe(this.host);
    destroyed.onDestroy(() => observer.disconnect());
  }

  /** Colours follow the theme, by the system or by the switch. */
  private watchTheme(scene: TurntableScene, destroyed: DestroyRef): void {
    const repaint = (): void => scene.paint(readColours(this.probes().nativeElement));
    const dark = matchMedia('(prefers-color-scheme: dark)');
    dark.addEventListener('change', repaint);
    const observer = new MutationObserver(repaint);
    observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
    destroyed.onDestroy(() => {
      dark.removeEventListener('change', repaint);
      observer.disconnect();
    });
  }

  private foldTo(fold: number, isHeld: boolean): void {
    cancelAnimationFrame(this.settling);
    const from = this.shownFold;
    if (isHeld || from === fold || matchMedia('(prefers-reduced-motion: reduce)').matches) {
      this.showFold(fold);
      return;
    }
    const began = performance.now();
    const step = (now: number): void => {
      this.showFold(foldAt(from, fold, now - began));
      if (now - began < FOLD_MS) this.settling = requestAnimationFrame(step);
    };
    this.settling = requestAnimationFrame(step);
  }

  private showFold(fold: number): void {
    this.shownFold = fold;
    const scene = this.scene();
    if (scene === null) return;
    const mesh = poseFormed(this.mesh(), Math.min(1, Math.max(0, fold)));
    const { x, y } = this.middle();
    scene.show({ ...mesh, positions: shifted(mesh.positions, x, y), edges: shifted(mesh.edges, x, y) }, this.reachMm());
  }
}

/** The disc turns about the middle of the base panel's side of the part, halfway between flat and formed. */
function middleOf(mesh: FoldableMesh): { readonly x: number; readonly y: number } {
  const { min, max } = boundsOf(poseFormed(mesh, 1).positions);
  return { x: (min.x + max.x) / 2, y: (min.y + max.y) / 2 };
}

function reachOf(mesh: FoldableMesh): number {
  const { x, y } = middleOf(mesh);
  let reach = 1;
  for (const fold of [0, 0.5, 1]) {
    const { positions } = poseFormed(mesh, fold);
    // A flat blank may lie over the disc's edge a little; the formed part decides.
    const weight = fold === 1 ? 1 : 0.8;
    for (let at = 0; at < positions.length; at += 3) {
      reach = Math.max(reach, weight * Math.hypot((positions[at] ?? 0) - x, (positions[at + 1] ?? 0) - y));
    }
  }
  return reach;
}

function boundsOf(positions: readonly number[]): {
  readonly min: { x: number; y: number };
  readonly max: { x: number; y: number };
} {
  const min = { x: Infinity, y: Infinity };
  const max = { x: -Infinity, y: -Infinity };
  for (let at = 0; at < positions.length; at += 3) {
    min.x = Math.min(min.x, positions[at] ?? 0);
    max.x = Math.max(max.x, positions[at] ?? 0);
    min.y = Math.min(min.y, positions[at + 1] ?? 0);
    max.y = Math.max(max.y, positions[at + 1] ?? 0);
  }
  return { min, max };
}

function shifted(positions: readonly number[], x: number, y: number): number[] {
  return positions.map((value, index) => (index % 3 === 0 ? value - x : index % 3 === 1 ? value - y : value));
}
