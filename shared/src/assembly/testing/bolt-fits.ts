import type { BoltFit } from '../find-placement';

/** A bolt with its opening, as tests write them. Lengths mm. */
export interface FitRow {
  readonly bolt: readonly [number, number];
  readonly hole: readonly [number, number];
  readonly play: number;
  /** Distance of a slot's end centres and its direction; a hole when absent. */
  readonly slot?: { readonly lengthMm: number; readonly directionDeg: number };
}

/** Rows as the arrays that `findPlacement` takes. */
export function fitOf(rows: readonly FitRow[]): BoltFit {
  const column = (of: (row: FitRow) => number): Float64Array => Float64Array.from(rows, of);
  const slotRad = (row: FitRow): number => ((row.slot?.directionDeg ?? 0) * Math.PI) / 180;
  return {
    count: rows.length,
    boltX: column(({ bolt }) => bolt[0]),
    boltY: column(({ bolt }) => bolt[1]),
    holeX: column(({ hole }) => hole[0]),
    holeY: column(({ hole }) => hole[1]),
    ux: column((row) => Math.cos(slotRad(row))),
    uy: column((row) => Math.sin(slotRad(row))),
    half: column((row) => (row.slot?.lengthMm ?? 0) / 2),
    play: column(({ play }) => play),
  };
}

/** How far the worst bolt lies outside its opening after a motion of the bolts, mm; written apart from the code it checks. */
export function outsideAfter(
  rows: readonly FitRow[],
  motion: { readonly turnDeg: number; readonly shift: { readonly x: number; readonly y: number } },
): number {
  const turnRad = (motion.turnDeg * Math.PI) / 180;
  return Math.max(
    ...rows.map(({ bolt: [bx, by], hole: [hx, hy], play, slot }) => {
      const x = bx * Math.cos(turnRad) - by * Math.sin(turnRad) + motion.shift.x - hx;
      const y = bx * Math.sin(turnRad) + by * Math.cos(turnRad) + motion.shift.y - hy;
      const slotRad = ((slot?.directionDeg ?? 0) * Math.PI) / 180;
      const half = (slot?.lengthMm ?? 0) / 2;
      const along = x * Math.cos(slotRad) + y * Math.sin(slotRad);
      const across = y * Math.cos(slotRad) - x * Math.sin(slotRad);
      return Math.hypot(Math.max(0, Math.abs(along) - half), across) - play;
    }),
  );
}

/**
 * Whether bolts enter round holes, by brute force: turns in small steps, and for each turn the exact test whether the discs in which
 * the shift may lie have a point in common. If they do, one of their centres or of the crossings of two of their circles is such a
 * point.
 */
export function entersByBruteForce(rows: readonly FitRow[], turnStepDeg: number, turnReachDeg: number): boolean {
  for (let turnDeg = -turnReachDeg; turnDeg <= turnReachDeg; turnDeg += turnStepDeg) {
    const turnRad = (turnDeg * Math.PI) / 180;
    const discs = rows.map(({ bolt: [bx, by], hole: [hx, hy], play }) => ({
      x: hx - (bx * Math.cos(turnRad) - by * Math.sin(turnRad)),
      y: hy - (bx * Math.sin(turnRad) + by * Math.cos(turnRad)),
      radius: play,
    }));
    const isCommon = (x: number, y: number): boolean =>
      discs.every((disc) => Math.hypot(x - disc.x, y - disc.y) <= disc.radius + 1e-9);
    if (discs.some(({ x, y }) => isCommon(x, y))) return true;
    for (let i = 0; i < discs.length; i += 1) {
      for (let j = i + 1; j < discs.length; j += 1) {
        const [a, b] = [discs[i], discs[j]];
        if (a === undefined || b === undefined) continue;
        const apart = Math.hypot(b.x - a.x, b.y - a.y);
        if (apart > a.radius + b.radius || apart < Math.abs(a.radius - b.radius) || apart === 0) continue;
        const along = (apart ** 2 + a.radius ** 2 - b.radius ** 2) / (2 * apart);
        const across = Math.sqrt(Math.max(0, a.radius ** 2 - along ** 2));
        const [ex, ey] = [(b.x - a.x) / apart, (b.y - a.y) / apart];
        for (const side of [1, -1]) {
          if (isCommon(a.x + along * ex - side * across * ey, a.y + along * ey + side * across * ex)) return true;
        }
      }
    }
  }
  return false;
}
