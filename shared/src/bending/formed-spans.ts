import { loopReach } from '../geometry/loop';
import type { Point } from '../geometry/point';
import { dot, scale } from '../geometry/vector';
import type { BendZone, Panel } from './development';

/** An end of a span at a bend. */
export interface SpanEnd {
  readonly zone: BendZone;
  /** "B1", "B2", ... */
  readonly name: string;
  /** Out of the panel, across the bend. */
  readonly outwards: Point;
}

/** A length that callipers can find on the formed part: across one panel, from outside of a bend to an edge or the bend opposite. */
export interface FormedSpan {
  readonly label: string;
  readonly panelIndex: number;
  /** One bend when the span runs to an edge, two when it runs from bend to bend. */
  readonly ends: readonly SpanEnd[];
  /** Flat part of it, between tangent lines or from tangent line to edge, mm. */
  readonly flatMm: number;
}

/** Bends whose directions differ by less than this count as parallel: sine of 0.06 degrees. */
const PARALLEL_SINE = 0.001;

/**
 * Every panel across its bends. Bends side by side on one line make one span.
 * @param nameOf name of a bend by its id
 */
export function formedSpans(
  panels: readonly Panel[],
  zones: readonly BendZone[],
  nameOf: (bendId: string) => string,
): readonly FormedSpan[] {
  return panels.flatMap((panel) => {
    const own = zones.flatMap((zone): readonly SpanEnd[] => {
      const name = nameOf(zone.bendId);
      if (zone.parentIndex === panel.index) return [{ zone, name, outwards: zone.towardsChild }];
      if (zone.childIndex === panel.index) return [{ zone, name, outwards: scale(zone.towardsChild, -1) }];
      return [];
    });
    const used = new Set<SpanEnd>();
    const spans: FormedSpan[] = [];
    for (const first of own) {
      if (used.has(first)) continue;
      for (const other of own) if (isSameSide(first, other)) used.add(other);
      const opposite = own.find((other) => isOpposite(first, other));
      for (const other of own) if (opposite !== undefined && isSameSide(opposite, other)) used.add(other);
      spans.push(spanOf(panel, first, opposite ?? null));
    }
    return spans;
  });
}

/** Place of the panel's tangent line along a direction, mm. */
function edgeAt({ zone, outwards }: SpanEnd, direction: Point): number {
  const isParentSide = dot(outwards, zone.towardsChild) > 0;
  const at = dot(zone.origin, direction);
  return isParentSide ? at : at + dot(zone.towardsChild, direction) * zone.bendAllowanceMm;
}

function isSameSide(a: SpanEnd, b: SpanEnd): boolean {
  return (
    isParallel(a, b) &&
    dot(a.outwards, b.outwards) > 0 &&
    Math.abs(edgeAt(a, a.outwards) - edgeAt(b, a.outwards)) < PARALLEL_SINE
  );
}

function isOpposite(a: SpanEnd, b: SpanEnd): boolean {
  return isParallel(a, b) && dot(a.outwards, b.outwards) < 0;
}

function isParallel(a: SpanEnd, b: SpanEnd): boolean {
  return Math.abs(a.outwards.x * b.outwards.y - a.outwards.y * b.outwards.x) < PARALLEL_SINE;
}

function spanOf(panel: Panel, first: SpanEnd, opposite: SpanEnd | null): FormedSpan {
  const start = edgeAt(first, first.outwards);
  const far = opposite === null ? -loopReach(panel.outer, scale(first.outwards, -1)) : edgeAt(opposite, first.outwards);
  const isBase = panel.parentIndex === null;
  const label =
    opposite === null
      ? `${isBase ? 'Base' : `Flange at ${first.name}`}, outside of ${first.name} to edge`
      : `${isBase ? 'Base' : 'Web'}, outside of ${first.name} to outside of ${opposite.name}`;
  return {
    label,
    panelIndex: panel.index,
    ends: opposite === null ? [first] : [first, opposite],
    flatMm: start - far,
  };
}
