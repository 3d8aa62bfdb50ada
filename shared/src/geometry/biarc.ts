import type { Segment } from './path';
import type { Point } from './point';
import { line, segmentFromBulge } from './segment';
import { COINCIDENT_MM } from './tolerance';
import { add, cross, distance, dot, scale, subtract } from './vector';

/**
 * Two arcs (or lines) that leave `from` in direction `leaving` and reach `to` in direction `arriving` without a kink.
 * Of the family of such pairs the one with equal handle lengths is taken, which runs evenly.
 * Degenerate: when the directions admit no such pair, a straight line with kinks at both ends.
 * Source: the usual construction of biarcs, K. M. Bolton, Biarc curves, Computer-Aided Design 7 (1975), from memory.
 * @param leaving unit vector. @param arriving unit vector.
 */
export function biarc(from: Point, leaving: Point, to: Point, arriving: Point): readonly Segment[] {
  const chord = subtract(to, from);
  if (distance(from, to) <= COINCIDENT_MM) return [];
  const handle = handleLength(chord, leaving, arriving);
  if (handle === null) return [line(from, to)];
  const first = add(from, scale(leaving, handle));
  const second = subtract(to, scale(arriving, handle));
  const joint = { x: (first.x + second.x) / 2, y: (first.y + second.y) / 2 };
  return [arcFrom(from, leaving, joint), arcInto(joint, to, arriving)].filter(
    (one) => distance(one.from, one.to) > COINCIDENT_MM,
  );
}

function handleLength(chord: Point, leaving: Point, arriving: Point): number | null {
  const sum = add(leaving, arriving);
  const along = dot(chord, sum);
  const spread = 2 * (1 - dot(leaving, arriving));
  const squared = dot(chord, chord);
  if (spread <= COINCIDENT_MM) {
    const pace = dot(chord, arriving);
    return pace > COINCIDENT_MM ? squared / (4 * pace) : null;
  }
  const root = along * along + spread * squared;
  const handle = (Math.sqrt(root) - along) / spread;
  return handle > COINCIDENT_MM ? handle : null;
}

/** Arc that leaves a point in a direction and ends at another. */
function arcFrom(from: Point, leaving: Point, to: Point): Segment {
  const chord = subtract(to, from);
  // Half the sweep is the angle from the tangent to the chord.
  const halfSweep = Math.atan2(cross(leaving, chord), dot(leaving, chord));
  return gentle(from, to, Math.tan(halfSweep / 2));
}

function arcInto(from: Point, to: Point, arriving: Point): Segment {
  const chord = subtract(to, from);
  const halfSweep = Math.atan2(cross(chord, arriving), dot(chord, arriving));
  return gentle(from, to, Math.tan(halfSweep / 2));
}

/** An arc that bulges less than noise is a line. */
function gentle(from: Point, to: Point, bulge: number): Segment {
  return Math.abs(bulge) * distance(from, to) <= COINCIDENT_MM ? line(from, to) : segmentFromBulge(from, to, bulge);
}
