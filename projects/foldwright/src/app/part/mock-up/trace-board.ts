import { ChangeDetectionStrategy, Component, computed, input, linkedSignal } from '@angular/core';
import type { Trace } from '@foldwright/shared/fitting/trace';
import { type OutlineStretch, tracePaths, worstStretch } from './trace-paths';

/** Side of the square that the loupe shows, mm. */
const LOUPE_MM = 12;
/** A tick every millimetre round the loupe. */
const LOUPE_TICKS = Array.from({ length: LOUPE_MM - 1 }, (_, index) => index + 1);

interface Spot {
  readonly x: number;
  readonly y: number;
}

/**
 * The outline over the photo, squared up to the scale sheet: how far the photo's edge lies off the line is told by colour
 * and by width, and a square loupe looks closer. The loupe starts where the edge is furthest off; it follows a click, a
 * drag, or the arrow keys.
 */
@Component({
  selector: 'fw-trace-board',
  templateUrl: './trace-board.html',
  styleUrl: './trace-board.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TraceBoard {
  readonly trace = input.required<Trace>();
  readonly imageUrl = input.required<string>();
  readonly sheet = input.required<{ readonly widthMm: number; readonly heightMm: number }>();

  protected readonly paths = computed(() => tracePaths(this.trace(), this.sheet().heightMm));
  protected readonly spot = linkedSignal<Spot>(() => {
    const worst = worstStretch(this.paths());
    return worst === null
      ? { x: this.sheet().widthMm / 2, y: this.sheet().heightMm / 2 }
      : { x: worst.middle[0], y: worst.middle[1] };
  });
  protected readonly loupeMm = LOUPE_MM;
  protected readonly loupeTicks = LOUPE_TICKS;
  protected readonly viewBox = computed(() => `0 0 ${this.sheet().widthMm} ${this.sheet().heightMm}`);
  protected readonly loupeBox = computed(
    () => `${this.spot().x - LOUPE_MM / 2} ${this.spot().y - LOUPE_MM / 2} ${LOUPE_MM} ${LOUPE_MM}`,
  );
  /** The stretch nearest to the loupe: its doubt is what the loupe says. */
  protected readonly nearest = computed(() => {
    const { x, y } = this.spot();
    const off = ({ middle }: OutlineStretch): number => Math.hypot(middle[0] - x, middle[1] - y);
    return this.paths().stretches.reduce<OutlineStretch | null>(
      (best, stretch) => (best === null || off(stretch) < off(best) ? stretch : best),
      null,
    );
  });
  protected readonly words = computed(() => {
    const { holes, slots, cutouts, outer } = this.trace();
    const parts = [
      `${outer.length} edges`,
      `${holes.length} holes`,
      `${slots.length} slots`,
      `${cutouts.length} cut-outs`,
    ];
    return `Outline over the photo: ${parts.join(', ')}. Arrow keys move the loupe.`;
  });

  protected look(event: PointerEvent, board: Element): void {
    if (event.type === 'pointermove' && event.buttons === 0) return;
    const frame = board.getBoundingClientRect();
    const { widthMm, heightMm } = this.sheet();
    this.moveTo({
      x: ((event.clientX - frame.left) / frame.width) * widthMm,
      y: ((event.clientY - frame.top) / frame.height) * heightMm,
    });
  }

  protected step(event: KeyboardEvent): void {
    const by = event.shiftKey ? 10 : 1;
    const move = { ArrowLeft: [-by, 0], ArrowRight: [by, 0], ArrowUp: [0, -by], ArrowDown: [0, by] }[event.key];
    if (move === undefined) return;
    event.preventDefault();
    this.moveTo({ x: this.spot().x + (move[0] ?? 0), y: this.spot().y + (move[1] ?? 0) });
  }

  /** Looks at the next stretch that lies further off than the rest, round and round. */
  lookCloser(): void {
    const doubtful = [...this.paths().stretches].sort((a, b) => b.residualMm - a.residualMm).slice(0, 6);
    const at = doubtful.findIndex(({ middle }) => middle[0] === this.spot().x && middle[1] === this.spot().y);
    const next = doubtful[(at + 1) % doubtful.length];
    if (next !== undefined) this.moveTo({ x: next.middle[0], y: next.middle[1] });
  }

  private moveTo({ x, y }: Spot): void {
    const { widthMm, heightMm } = this.sheet();
    this.spot.set({ x: Math.min(widthMm, Math.max(0, x)), y: Math.min(heightMm, Math.max(0, y)) });
  }
}
