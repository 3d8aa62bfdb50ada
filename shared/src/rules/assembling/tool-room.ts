import type { Pose } from '../../bending/fold';
import { convexHull, shadowOf } from '../../brake/prism';
import type { Prism } from '../../brake/prism';
import { pointToLoop, segmentClearance } from '../../geometry/clearance';
import { pointInLoop, polygonLoop } from '../../geometry/loop';
import type { Loop } from '../../geometry/path';
import type { Point } from '../../geometry/point';
import { line } from '../../geometry/segment';
import { COINCIDENT_MM } from '../../geometry/tolerance';
import { turn } from '../../geometry/vector';

const ORIGIN: Point = { x: 0, y: 0 };

/** The nearest thing beside an axis: how far off, mm (0 where the axis runs through it), and where, in the pose's x and y. */
export interface RoomAround {
  readonly radiusMm: number;
  readonly place: Point | null;
}

/** Room around a pose's z axis between two heights: the largest cylinder that meets no prism there. */
export function roomAround(pose: Pose, prisms: readonly Prism[], low: number, high: number): RoomAround {
  let room: RoomAround = { radiusMm: Infinity, place: null };
  for (const loop of shadows(pose, prisms, low, high)) {
    if (pointInLoop(ORIGIN, loop, COINCIDENT_MM) !== 'outside') return { radiusMm: 0, place: null };
    const way = pointToLoop(ORIGIN, loop);
    if (way !== null && way.distanceMm < room.radiusMm) room = { radiusMm: way.distanceMm, place: way.to };
  }
  return room;
}

const STEP_DEG = 5;

/**
 * Widest run of directions in which an arm from the axis, so long and so wide to either side, meets no prism between two heights,
 * degrees: 360 when it goes all the way round. Looked for every 5 degrees.
 */
export function swingDeg(
  pose: Pose,
  prisms: readonly Prism[],
  arm: { readonly lengthMm: number; readonly halfWidthMm: number; readonly low: number; readonly high: number },
): number {
  const loops = shadows(pose, prisms, arm.low, arm.high);
  const count = 360 / STEP_DEG;
  const isFree = Array.from({ length: count }, (_, step) => {
    const end = turn({ x: arm.lengthMm, y: 0 }, step * STEP_DEG);
    const middle = line(ORIGIN, end);
    return loops.every(
      (loop) =>
        pointInLoop(end, loop, 0) !== 'inside' &&
        loop.every((edge) => segmentClearance(middle, edge).distanceMm >= arm.halfWidthMm),
    );
  });
  if (isFree.every((free) => free)) return 360;
  let [run, longest] = [0, 0];
  // Twice round, so that a run across the start counts whole.
  for (let step = 0; step < 2 * count; step += 1) {
    run = isFree[step % count] === true ? run + 1 : 0;
    longest = Math.max(longest, run);
  }
  return Math.max(0, longest - 1) * STEP_DEG;
}

function shadows(pose: Pose, prisms: readonly Prism[], low: number, high: number): readonly Loop[] {
  return prisms.flatMap((one) => {
    const hull = convexHull(shadowOf(pose, one, low, high));
    return hull.length < 2 ? [] : [polygonLoop(hull)];
  });
}
