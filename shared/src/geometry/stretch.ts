import { intersectSegments } from './intersect';
import { pointInLoop } from './loop';
import type { LineSegment, Loop } from './path';
import type { Point } from './point';
import { fractionOf, line } from './segment';
import { COINCIDENT_MM } from './tolerance';
import { between, distance } from './vector';

/** A straight stretch from one point to another. */
export interface Stretch {
  readonly from: Point;
  readonly to: Point;
}

/** What is left of a straight stretch outside of openings, in its direction. Left-overs shorter than the tolerance are dropped. */
export function outsideOpenings(stretch: Stretch, openings: readonly Loop[]): readonly Stretch[] {
  const whole: LineSegment = line(stretch.from, stretch.to);
  if (distance(stretch.from, stretch.to) <= COINCIDENT_MM) return [];
  const cuts = [0, 1];
  for (const segment of openings.flat()) {
    const met = intersectSegments(whole, segment, COINCIDENT_MM);
    if (met.kind === 'point') cuts.push(...met.points.map((point) => fractionOf(whole, point)));
    if (met.kind === 'overlap')
      cuts.push(...met.stretches.flatMap(({ from, to }) => [fractionOf(whole, from), fractionOf(whole, to)]));
  }
  cuts.sort((a, b) => a - b);
  const left: Stretch[] = [];
  for (let index = 1; index < cuts.length; index += 1) {
    const [t0, t1] = [cuts[index - 1] ?? 0, cuts[index] ?? 1];
    const piece = { from: between(stretch.from, stretch.to, t0), to: between(stretch.from, stretch.to, t1) };
    if (distance(piece.from, piece.to) <= COINCIDENT_MM) continue;
    const middle = between(piece.from, piece.to, 0.5);
    if (openings.some((opening) => pointInLoop(middle, opening, 0) === 'inside')) continue;
    const last = left.at(-1);
    if (last !== undefined && distance(last.to, piece.from) <= COINCIDENT_MM)
      left[left.length - 1] = { from: last.from, to: piece.to };
    else left.push(piece);
  }
  return left;
}
