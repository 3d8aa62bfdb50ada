import type { Development } from '../bending/development';
import { areJoined, bodiesOverlap, bodiesWhen, layOutPlates, posesWhen } from './plates';
import type { PieceName } from './plates';

/** Two pieces of the formed part that would have to be in the same place. */
export interface Interference {
  readonly first: PieceName;
  readonly second: PieceName;
}

/**
 * Pieces of the fully folded part that overlap in space. Two panels joined by one bend and that bend itself are not compared.
 * Plates and openings are exact but for arcs (0.05 mm); bends stand for their arcs by straight pieces of 15 degrees (0.9 % of the
 * radius at most), their ends by their longest extent along the bend, openings in them not taken out. Pieces that dip into each
 * other by no more than `TOUCHING_MM` (0.02 mm) only touch.
 */
export function findSelfInterference(development: Development): readonly Interference[] {
  const plates = layOutPlates(development);
  const poses = posesWhen(plates, () => true);
  const bodies = bodiesWhen(plates, poses, () => true);
  const budget = { left: Number.POSITIVE_INFINITY };
  return bodies.flatMap((first, index) =>
    bodies
      .slice(index + 1)
      .filter((second) => !areJoined(development, first, second) && bodiesOverlap(first, second, budget))
      .map((second) => ({ first: first.of, second: second.of })),
  );
}
