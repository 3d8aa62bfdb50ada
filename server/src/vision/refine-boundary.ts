import type { Point, Point3 } from '@foldwright/shared/geometry/point';
import { liftPoint } from './camera';
import { type Contour, outwardNormals, resample, smoothContour } from './contours';
import { findProfileEdge, type ProfileEdge } from './edge-profile';
import type { Picture } from './picture';
import { pixelsPerMmAt, type View } from './view';

/** A point of the template's boundary. */
export interface BoundaryPoint extends Point {
  /** Where it is seen on the page at height zero, mm. */
  readonly seen: Point;
  /** Height at which it was seen, mm: 0 at the foot, the thickness at the upper edge. */
  readonly heightMm: number;
  /** How far one millimetre of height moves it outwards on the page, mm. */
  readonly slope: number;
  /** How much lighter or darker the ground is than what lies behind its edge, linear light. */
  readonly step: number;
  /** Whether only a faint edge was found here, as where a shadow is as light as the template. */
  readonly isFaint: boolean;
}

export interface BoundaryOptions {
  readonly thicknessMm: number;
  readonly blurPx: number;
  /** Whether the chain runs round an opening. */
  readonly isOpening: boolean;
}

/** From point to point along a boundary, mm; less round small openings. */
export const BOUNDARY_STEP_MM = 0.3;
const MIN_POINTS = 72;
const FIRST_REACH_MM = 0.7;
const SECOND_REACH_MM = 0.25;
const NORMAL_REACH_MM = 0.6;
const FAINT_NORMAL_REACH_MM = 2;
const MAX_UNEXPLAINED = 0.35;
/** A faint edge counts when it stands out this far from the unevenness around it. */
const LEAST_SIGNIFICANCE = 3.5;
/** Shorter gaps are bridged by their neighbours better than by faint edges. */
const LONG_GAP_MM = 6;
const GAP_SHARE = 0.8;
/** Normals this near to square with the view (as a sine) leave open whether foot or upper edge is seen. */
const UNDECIDED = 0.2;
const DRAWN_IN_MM = 0.16;

/** How far a wall of `thicknessMm` leans outwards (or inwards, negative) on the page as seen from the eye, mm. */
function lean(eye: Point3 | null, at: Point, normal: Point, thicknessMm: number): { along: number; total: number } {
  if (!eye || thicknessMm === 0) return { along: 0, total: 0 };
  const share = thicknessMm / (eye.z - thicknessMm);
  const dx = (at.x - eye.x) * share;
  const dy = (at.y - eye.y) * share;
  return { along: dx * normal.x + dy * normal.y, total: Math.hypot(dx, dy) };
}

interface Found {
  readonly seen: Point;
  readonly normal: Point;
  readonly isGood: boolean;
  readonly step: number;
  readonly isFaint: boolean;
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? 0;
}

/** Whether most of a stretch of `reach` places about a place has no clear edge. */
function isInLongGap(clear: readonly (ProfileEdge | null)[], index: number, reach: number): boolean {
  let missing = 0;
  for (let k = -reach; k <= reach; k++) {
    if (clear[(index + k + clear.length * (reach + 1)) % clear.length] === null) missing++;
  }
  return missing > GAP_SHARE * (2 * reach + 1);
}

/**
 * One round along the whole chain. A rough chain may follow the upper edge where the foot is meant: with `isRough` the
 * search goes out by the width of the wall as well.
 */
function refineOnce(
  picture: Picture,
  view: View,
  contour: Contour,
  options: BoundaryOptions,
  reachMm: number,
  isRough: boolean,
): readonly Found[] {
  const stepMm =
    Math.hypot((contour[1]?.x ?? 0) - (contour[0]?.x ?? 0), (contour[1]?.y ?? 0) - (contour[0]?.y ?? 0)) ||
    BOUNDARY_STEP_MM;
  const normals = outwardNormals(
    contour,
    Math.max(1, Math.min(Math.round(NORMAL_REACH_MM / stepMm), Math.floor(contour.length / 12))),
  );
  const broadNormals = outwardNormals(
    contour,
    Math.max(1, Math.min(Math.round(FAINT_NORMAL_REACH_MM / stepMm), Math.floor(contour.length / 12))),
  );
  const walls = contour.map((origin, index) => {
    const { along } = lean(view.eye, origin, normals[index] ?? { x: 1, y: 0 }, options.thicknessMm);
    return Math.max(0, -along);
  });
  const search = (index: number, isFaint: boolean): ProfileEdge | null => {
    const origin = contour[index] ?? { x: 0, y: 0 };
    const outwardMm = reachMm + (isRough ? (walls[index] ?? 0) : 0);
    const edge = findProfileEdge(picture, view, {
      origin,
      normal: (isFaint ? broadNormals : normals)[index] ?? { x: 1, y: 0 },
      wallMm: walls[index] ?? 0,
      blurMm: options.blurPx / pixelsPerMmAt(view, origin),
      inwardMm: reachMm,
      outwardMm,
      isFaint,
    });
    return edge !== null && edge.offsetMm > -0.97 * reachMm && edge.offsetMm < 0.97 * outwardMm ? edge : null;
  };
  const plain = contour.map((_, index) => search(index, false));
  const leastStep =
    0.2 * median(plain.flatMap((edge) => (edge && edge.unexplained < MAX_UNEXPLAINED ? [edge.step] : [])));
  const clear = plain.map((edge) =>
    edge && edge.unexplained < MAX_UNEXPLAINED && edge.step > leastStep ? edge : null,
  );
  const longGap = Math.round(LONG_GAP_MM / stepMm);
  const edges = clear.map((edge, index) => {
    if (edge || !isInLongGap(clear, index, longGap)) return edge;
    const faint = search(index, true);
    return faint && faint.significance > LEAST_SIGNIFICANCE ? faint : null;
  });
  return contour.map((origin, index) => {
    const normal = normals[index] ?? { x: 1, y: 0 };
    const edge = edges[index];
    const nearby: number[] = [];
    for (let k = -3; k <= 3; k++) {
      const other = edges[(index + k + contour.length) % contour.length];
      if (other) nearby.push(other.offsetMm);
    }
    const usual = median(nearby);
    const isGood = edge !== null && edge !== undefined && Math.abs(edge.offsetMm - usual) < DRAWN_IN_MM;
    const offset = isGood ? edge.offsetMm : usual;
    return {
      seen: { x: origin.x + normal.x * offset, y: origin.y + normal.y * offset },
      normal,
      isGood,
      step: edge?.step ?? 0,
      isFaint: clear[index] === null,
    };
  });
}

/** Height of each point from which side of the wall the camera sees; `null` where it cannot be told and is left out. */
function heightsOf(found: readonly Found[], eye: Point3 | null, options: BoundaryOptions): readonly (number | null)[] {
  const { thicknessMm, isOpening } = options;
  const count = found.length;
  const leans = found.map(({ seen, normal }) => lean(eye, seen, normal, thicknessMm));
  const sines = leans.map(({ along, total }) => (total > 1e-9 ? along / total : 0));
  const decided = sines.map((sine) => (Math.abs(sine) < UNDECIDED ? null : sine > 0 ? thicknessMm : 0));
  if (thicknessMm === 0 || !eye || decided.every((height) => height === null)) return found.map(() => 0);
  const heights: (number | null)[] = [...decided];
  const start = decided.findIndex((height) => height !== null);
  for (let k = 1; k <= count;) {
    const index = (start + k) % count;
    if (decided[index] !== null) {
      k++;
      continue;
    }
    let run = 0;
    while (decided[(index + run) % count] === null && run < count) run++;
    const before = decided[(index - 1 + count) % count] ?? 0;
    const after = decided[(index + run) % count] ?? 0;
    const first = found[index]?.seen;
    const last = found[(index + run - 1) % count]?.seen;
    const lengthMm = first && last ? Math.hypot(first.x - last.x, first.y - last.y) : 0;
    const isCornerOfWall = before !== after && lengthMm < 1.5 * (leans[index]?.total ?? 0) + 0.6;
    for (let j = 0; j < run; j++) {
      const at = (index + j) % count;
      if (!isCornerOfWall) heights[at] = (sines[at] ?? 0) > 0 ? thicknessMm : 0;
      else heights[at] = isOpening ? null : before + ((after - before) * (j + 1)) / (run + 1);
    }
    k += run;
  }
  return heights;
}

/**
 * The boundary along a rough outline, each point found on the full photograph across the outline and brought down to
 * the page from the height at which it was seen. Points without a clean edge are left out.
 */
export function refineBoundary(
  picture: Picture,
  view: View,
  rough: Contour,
  options: BoundaryOptions,
): readonly BoundaryPoint[] {
  let length = 0;
  rough.forEach((point, index) => {
    const next = rough[(index + 1) % rough.length] ?? point;
    length += Math.hypot(next.x - point.x, next.y - point.y);
  });
  const stepMm = Math.min(BOUNDARY_STEP_MM, length / MIN_POINTS);
  const start = smoothContour(resample(rough, stepMm), 2);
  const first = refineOnce(picture, view, start, options, FIRST_REACH_MM, true);
  const second = refineOnce(
    picture,
    view,
    smoothContour(
      resample(
        first.map((f) => f.seen),
        stepMm,
      ),
      1,
    ),
    options,
    SECOND_REACH_MM,
    false,
  );
  const heights = heightsOf(second, view.eye, options);
  return second.flatMap(({ seen, normal, isGood, step, isFaint }, index) => {
    const heightMm = heights[index];
    if (!isGood || heightMm === null || heightMm === undefined) return [];
    const at = view.eye ? liftPoint(view.eye, seen, heightMm) : seen;
    const slope = heightMm === 0 ? 0 : lean(view.eye, seen, normal, 1).along;
    return [{ ...at, seen, heightMm, slope, step, isFaint }];
  });
}
