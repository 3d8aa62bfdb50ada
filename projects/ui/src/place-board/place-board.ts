import { ChangeDetectionStrategy, Component, type ElementRef, computed, input, output, viewChild } from '@angular/core';
import type { Layout } from '@foldwright/shared/bending/layout';
import { flattenLoop } from '@foldwright/shared/geometry/flatten';
import { loopBounds, loopFromBulges } from '@foldwright/shared/geometry/loop';
import type { Point } from '@foldwright/shared/geometry/point';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';

/** A numbered mark on the drawing. */
export interface PlaceMark {
  readonly key: string;
  readonly number: number;
  readonly at: Point;
}

const CHORD_MM = 0.1;
const MARGIN_MM = 6;

/**
 * The laid-out part with numbered marks, for reading and for pointing at a place. Whoever can't point types the place
 * beside it: the drawing is one way of two.
 */
@Component({
  selector: 'fw-place-board',
  templateUrl: './place-board.html',
  styleUrl: './place-board.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(click)': 'point($event)' },
})
export class PlaceBoard {
  readonly layout = input.required<Layout>();
  readonly marks = input<readonly PlaceMark[]>([]);
  readonly label = input.required<string>();
  /** A place in the layout's coordinates, mm, that somebody pointed at. */
  readonly pointed = output<Point>();

  private readonly drawing = viewChild.required<ElementRef<SVGSVGElement>>('drawing');
  private readonly bounds = computed(() => {
    const bounds = loopBounds(loopFromBulges(this.layout().outer.edges));
    return bounds ?? { min: { x: 0, y: 0 }, max: { x: 1, y: 1 } };
  });
  protected readonly viewBox = computed(() => {
    const { min, max } = this.bounds();
    const [width, height] = [max.x - min.x + 2 * MARGIN_MM, max.y - min.y + 2 * MARGIN_MM];
    return `${min.x - MARGIN_MM} ${-max.y - MARGIN_MM} ${width} ${height}`;
  });
  /** Radius of a mark, mm, so that it is as large on a small part as on a large one. */
  protected readonly markMm = computed(() => {
    const { min, max } = this.bounds();
    return Math.max(max.x - min.x, max.y - min.y) / 40;
  });
  protected readonly outline = computed(() => {
    const { outer, cutouts } = this.layout();
    return [outer, ...cutouts].map((loop) => pathOf(flattenLoop(loopFromBulges(loop.edges), CHORD_MM))).join('');
  });
  protected readonly openings = computed(() =>
    this.layout().features.map((feature) =>
      feature.kind === 'hole'
        ? {
            id: feature.id,
            from: feature.centre,
            to: feature.centre,
            widthMm: findHoleDiameterMm(feature.purpose) ?? 0,
          }
        : { id: feature.id, from: feature.from, to: feature.to, widthMm: feature.widthMm },
    ),
  );

  protected point(event: MouseEvent): void {
    const matrix = this.drawing().nativeElement.getScreenCTM();
    if (matrix === null) return;
    const at = new DOMPoint(event.clientX, event.clientY).matrixTransform(matrix.inverse());
    this.pointed.emit({ x: tenth(at.x), y: tenth(-at.y) });
  }
}

const tenth = (value: number): number => Math.round(value * 10) / 10;

/** Closed polygon as an SVG path; the screen counts y down. */
function pathOf(points: readonly Point[]): string {
  return `M${points.map(({ x, y }) => `${x} ${-y}`).join('L')}Z`;
}
