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
  model,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { ScaleBar } from '@foldwright/ui/scale-bar/scale-bar';
import type { DrawnDimension } from '../drawing/dimensions';
import type { DrawnNote } from '../drawing/note-room';
import type { SheetDrawing } from '../drawing/sheet-drawing';
import type { EditorEvent, Modifiers, PointerKind } from '../tools/tool';
import { type Insets, type Viewport, fitBounds, panBy, roundStepMm, zoomAt } from '../viewport';
import { BoardPointers, type PointerAction, type PointerInput } from './board-pointers';
import type { BoardMark, BoardOverlay } from './board-overlay';

const WHEEL_ZOOM = 0.0016;
const KEY_ZOOM = 1.25;
const KEY_PAN_PX = 60;
const NARROW_PX = 800;
const NARROW_INSETS: Insets = { top: 40, right: 24, bottom: 64, left: 62 };
let nextId = 0;

/**
 * The board with a sheet on it: blued metal, scribed lines, dimensions as a person would write them. It draws what it is
 * given and tells what hands do to it; it changes nothing but the view. Wheel and pinch zoom, space or two fingers pan.
 */
@Component({
  selector: 'fw-drawing-board',
  imports: [ScaleBar],
  templateUrl: './drawing-board.html',
  styleUrl: './drawing-board.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.crosshair]': 'isPlacing()', '[class.panning]': 'isSpaceDown()', '[class.still]': '!isInteractive()' },
})
export class DrawingBoard {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  readonly drawing = input.required<SheetDrawing>();
  /** Says to readers what is drawn. */
  readonly label = input.required<string>();
  readonly dimensions = input<readonly DrawnDimension[]>([]);
  readonly notes = input<readonly DrawnNote[]>([]);
  readonly overlay = input<BoardOverlay | null>(null);
  readonly marks = input<readonly BoardMark[]>([]);
  readonly isInteractive = input(true);
  /** Whether a press puts something down. */
  readonly isPlacing = input(false);
  /** Room to keep free around the drawing on a wide board. */
  readonly insets = input<Insets>({ top: 40, right: 40, bottom: 70, left: 70 });
  /** Another value fits the drawing anew. */
  readonly fitKey = input('');
  readonly viewport = model<Viewport>({ pxPerMm: 2, origin: { xPx: 0, yPx: 0 } });

  readonly acted = output<EditorEvent>();
  readonly markChosen = output<string>();

  private readonly surface = viewChild.required<ElementRef<SVGSVGElement>>('surface');
  private readonly pointers = new BoardPointers();
  private isFitted = false;

  protected readonly id = `fw-board-${nextId++}`;
  protected readonly isSpaceDown = signal(false);
  private readonly size = signal<{ readonly widthPx: number; readonly heightPx: number } | null>(null);
  protected readonly transform = computed(() => {
    const { pxPerMm, origin } = this.viewport();
    return `matrix(${pxPerMm} 0 0 ${-pxPerMm} ${origin.xPx} ${origin.yPx})`;
  });
  protected readonly shadowTransform = computed(() => {
    const { pxPerMm, origin } = this.viewport();
    return `matrix(${pxPerMm} 0 0 ${-pxPerMm} ${origin.xPx + 2} ${origin.yPx + 4})`;
  });
  protected readonly scaleStepMm = computed(() => roundStepMm(this.viewport().pxPerMm, 56));

  constructor() {
    const destroyed = inject(DestroyRef);
    afterRenderEffect(() => {
      if (this.fitKey() !== '') untracked(() => this.fit());
    });
    afterNextRender(() => {
      const measure = (): void => this.measure(this.host.clientWidth, this.host.clientHeight);
      measure();
      if (typeof ResizeObserver === 'undefined') return;
      const observer = new ResizeObserver(measure);
      observer.observe(this.host);
      destroyed.onDestroy(() => observer.disconnect());
    });
  }

  /** Shows all of the drawing as large as it goes. */
  fit(): void {
    const size = this.size();
    if (size === null) return;
    // A narrow board has no room beside the drawing for anything but its dimensions.
    this.isFitted = true;
    const insets = size.widthPx < NARROW_PX ? NARROW_INSETS : this.insets();
    this.viewport.set(fitBounds(this.drawing().bounds, size.widthPx, size.heightPx, insets));
  }

  /** Zooms about the middle of the board. */
  zoom(factor: number): void {
    const size = this.size();
    if (size === null) return;
    this.isFitted = false;
    this.viewport.update((view) => zoomAt(view, factor, { xPx: size.widthPx / 2, yPx: size.heightPx / 2 }));
  }

  focus(): void {
    this.surface().nativeElement.focus({ preventScroll: true });
  }

  protected press(event: PointerEvent): void {
    if (event.button > 1 || this.isOnControl(event)) return;
    this.surface().nativeElement.setPointerCapture(event.pointerId);
    if (event.pointerType === 'mouse') event.preventDefault();
    this.focus();
    this.act(this.pointers.press(this.read(event), this.viewport()));
  }

  protected move(event: PointerEvent): void {
    this.act(this.pointers.move(this.read(event), this.viewport()));
  }

  protected release(event: PointerEvent): void {
    this.act(this.pointers.release(this.read(event), this.viewport()));
  }

  protected lose(event: PointerEvent): void {
    this.act(this.pointers.lose(event.pointerId));
  }

  protected turnWheel(event: WheelEvent): void {
    event.preventDefault();
    this.isFitted = false;
    const { atPx } = this.read(event);
    if (event.shiftKey) {
      this.viewport.update((view) => panBy(view, -event.deltaY - event.deltaX, 0));
      return;
    }
    // A pinch on a touchpad arrives as a wheel with Ctrl and small steps.
    const step = event.ctrlKey ? WHEEL_ZOOM * 6 : WHEEL_ZOOM;
    this.viewport.update((view) => zoomAt(view, Math.exp(-event.deltaY * step), atPx));
  }

  protected pressKey(event: KeyboardEvent): void {
    if (event.target !== this.surface().nativeElement) return;
    if (event.key === ' ') {
      event.preventDefault();
      this.isSpaceDown.set(true);
      return;
    }
    if (this.moveView(event)) {
      event.preventDefault();
      return;
    }
    if (event.key === 'Escape') this.acted.emit({ kind: 'cancel' });
    else if (isToolKey(event.key) && !event.metaKey && !event.ctrlKey) {
      event.preventDefault();
      this.acted.emit({ kind: 'key', key: event.key, modifiers: modifiersOf(event) });
    }
  }

  protected releaseKey(event: KeyboardEvent): void {
    if (event.key === ' ') this.isSpaceDown.set(false);
  }

  /** Plus and minus zoom, 0 fits; Ctrl with arrows pans. */
  private moveView(event: KeyboardEvent): boolean {
    if (event.ctrlKey && event.key.startsWith('Arrow')) {
      const [x, y] = { ArrowLeft: [1, 0], ArrowRight: [-1, 0], ArrowUp: [0, 1], ArrowDown: [0, -1] }[event.key] ?? [
        0, 0,
      ];
      this.viewport.update((view) => panBy(view, (x ?? 0) * KEY_PAN_PX, (y ?? 0) * KEY_PAN_PX));
      return true;
    }
    if (event.ctrlKey || event.metaKey) return false;
    if (event.key === '+' || event.key === '=') this.zoom(KEY_ZOOM);
    else if (event.key === '-') this.zoom(1 / KEY_ZOOM);
    else if (event.key === '0') this.fit();
    else return false;
    return true;
  }

  private act(actions: readonly PointerAction[]): void {
    for (const action of actions) {
      if (action.kind !== 'event') this.isFitted = false;
      if (action.kind === 'pan') this.viewport.update((view) => panBy(view, action.xPx, action.yPx));
      else if (action.kind === 'zoom') this.viewport.update((view) => zoomAt(view, action.factor, action.at));
      else if (this.isInteractive()) this.acted.emit(action.event);
    }
  }

  private measure(widthPx: number, heightPx: number): void {
    if (widthPx === 0 || heightPx === 0) return;
    const before = this.size();
    this.size.set({ widthPx, heightPx });
    // What shows all goes on showing all; a view that a hand chose keeps its middle.
    if (before === null || this.isFitted) this.fit();
    else {
      this.viewport.update((view) => panBy(view, (widthPx - before.widthPx) / 2, (heightPx - before.heightPx) / 2));
    }
  }

  private isOnControl(event: Event): boolean {
    return event.target instanceof Element && event.target.closest('[data-mark]') !== null;
  }

  private read(event: MouseEvent): PointerInput {
    const box = this.host.getBoundingClientRect();
    const isPointer = event instanceof PointerEvent;
    return {
      pointerId: isPointer ? event.pointerId : 0,
      pointer: isPointer ? pointerKind(event.pointerType) : 'mouse',
      atPx: { xPx: event.clientX - box.left, yPx: event.clientY - box.top },
      modifiers: modifiersOf(event),
      isPanning:
        this.isSpaceDown() || (isPointer && (event.button === 1 || event.buttons === 4)) || !this.isInteractive(),
    };
  }
}

function pointerKind(type: string): PointerKind {
  return type === 'touch' || type === 'pen' ? type : 'mouse';
}

function modifiersOf(event: MouseEvent | KeyboardEvent): Modifiers {
  return { ctrl: event.ctrlKey || event.metaKey, shift: event.shiftKey, alt: event.altKey };
}

/** Keys that a tool or a verb may want; the rest stays the browser's. */
function isToolKey(key: string): boolean {
  return /^(?:Arrow|Delete$|Backspace$|Enter$|[a-z]$)/i.test(key) && key.length !== 0;
}
