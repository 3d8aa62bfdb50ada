import type { RigidMotion } from '../geometry/transform';

/**
 * Bolts and the openings that they are to enter, pairwise, in one plane, as flat arrays for speed; all lengths mm. An opening is a
 * circle (`half` 0) or an obround along the unit vector (`ux`, `uy`) with `half` the distance of its end centres; `play` is half of
 * what it is wider than its bolt.
 */
export interface BoltFit {
  readonly count: number;
  readonly boltX: Float64Array;
  readonly boltY: Float64Array;
  readonly holeX: Float64Array;
  readonly holeY: Float64Array;
  readonly ux: Float64Array;
  readonly uy: Float64Array;
  readonly half: Float64Array;
  readonly play: Float64Array;
}

/**
 * Whether a rigid motion takes all bolts into their openings. `enters` comes with a motion that does; `none` is proven;
 * `touching`: whatever motion there is leaves less than a tenth of a micrometre of play, or arithmetic couldn't tell.
 */
export type Placement =
  | { readonly answer: 'enters'; readonly motion: RigidMotion }
  | { readonly answer: 'none' }
  | { readonly answer: 'touching' };

const NONE: Placement = { answer: 'none' };
const TOUCHING: Placement = { answer: 'touching' };

/** Play below this is none, mm. */
const NO_PLAY_MM = 0.0001;
/** Cuts of an ellipsoid of three dimensions shrink it by a sixth at least: far more than it takes from millimetres to `NO_PLAY_MM`. */
const MOST_CUTS = 400;
const DIMENSIONS = 3;
/** Shallower than -1/3 a cut doesn't shrink an ellipsoid of three dimensions. */
const SHALLOWEST_CUT = -0.3;
/** Half a turn halved so often is a twentieth of a degree. */
const MOST_HALVINGS = 12;

/**
 * Finds a rigid motion of the bolts into the part, the best placement and no fixed one.
 * Bolt i, turned by psi and shifted by s, lies `distance to its opening's middle line - play` outside. The largest of these over all
 * bolts is a convex function of (s, psi) but for a bend of -r/2 * psi^2, r the farthest bolt from the middle: chords of the circles
 * the bolts run on. The ellipsoid method with deep cuts, each set back by that term over the ellipsoid at hand, therefore never cuts
 * off a motion that fits: it ends with one, or with an empty ellipsoid, which proves there is none.
 * Where turns are so wide that the term hides the cut, the range of turns is halved. The start holds every motion that fits: the pair of bolts farthest apart leaves only so much turn, its openings only so much shift.
 * Source: N. Z. Shor 1977; R. G. Bland, D. Goldfarb, M. J. Todd 1981 (deep cuts).
 */
export function findPlacement(fit: BoltFit): Placement {
  const { count, boltX, boltY, holeX, holeY, play } = fit;
  if (count === 0) return { answer: 'enters', motion: { turnDeg: 0, shift: { x: 0, y: 0 } } };
  for (let i = 0; i < count; i += 1) if (!((play[i] ?? -1) >= 0)) return NONE;
  const middle = centreOf(boltX, boltY, count);
  const target = centreOf(holeX, holeY, count);

  const quick = alignedMotion(fit, middle, target);
  if (worstBolt(fit, middle, quick.x, quick.y, quick.psi).outsideMm <= 0) {
    return entering(middle, quick.x, quick.y, quick.psi);
  }
  if (count === 1) return TOUCHING;

  const turn = turnRange(fit);
  return turn === null ? NONE : searchTurns(fit, middle, radiusOf(fit, middle), turn, MOST_HALVINGS);
}

/** Turns from `middle - reach` to `middle + reach`, radians. */
interface TurnRange {
  readonly middle: number;
  readonly reach: number;
}

/** A range of turns as a whole, or, where its bend hides what a cut would show, one half after the other. */
function searchTurns(fit: BoltFit, middle: Spot, radius: number, turn: TurnRange, halvings: number): Placement {
  const found = cutDown(fit, middle, radius, turn);
  if (found !== 'bent') return found;
  if (halvings === 0) return TOUCHING;
  const reach = turn.reach / 2;
  const first = searchTurns(fit, middle, radius, { middle: turn.middle - reach, reach }, halvings - 1);
  if (first.answer === 'enters') return first;
  const second = searchTurns(fit, middle, radius, { middle: turn.middle + reach, reach }, halvings - 1);
  return second.answer === 'none' ? first : second;
}

/** The ellipsoid method over a range of turns; `bent` when a cut would be too shallow to shrink what is left. */
function cutDown(fit: BoltFit, middle: Spot, radius: number, turn: TurnRange): Placement | 'bent' {
  const shift = shiftRange(fit, middle, turn);
  // State in (x, y, radius * psi): all in mm, so that the start is nearly round.
  let [x, y, z] = [shift.x, shift.y, radius * turn.middle];
  const first = DIMENSIONS * shift.reach ** 2;
  let [pxx, pyy, pzz] = [first, first, DIMENSIONS * (radius * turn.reach) ** 2];
  let [pxy, pxz, pyz] = [0, 0, 0];
  for (let cut = 0; cut < MOST_CUTS; cut += 1) {
    const worst = worstBolt(fit, middle, x, y, z / radius);
    if (worst.outsideMm <= 0) return entering(middle, x, y, z / radius);
    const gz = worst.perTurnMm / radius;
    const bx = pxx * worst.ex + pxy * worst.ey + pxz * gz;
    const by = pxy * worst.ex + pyy * worst.ey + pyz * gz;
    const bz = pxz * worst.ex + pyz * worst.ey + pzz * gz;
    const width = Math.sqrt(worst.ex * bx + worst.ey * by + gz * bz);
    const bendMm = pzz / (2 * radius);
    if (!(width > 0) || !Number.isFinite(width)) return TOUCHING;
    const depth = (worst.outsideMm - bendMm) / width;
    if (depth >= 1) return NONE;
    if (width + bendMm < NO_PLAY_MM) return TOUCHING;
    if (depth < SHALLOWEST_CUT) return 'bent';
    const step = (1 + DIMENSIONS * depth) / (DIMENSIONS + 1) / width;
    x -= step * bx;
    y -= step * by;
    z -= step * bz;
    const grow = (DIMENSIONS ** 2 * (1 - depth * depth)) / (DIMENSIONS ** 2 - 1);
    const take = (2 * (1 + DIMENSIONS * depth)) / ((DIMENSIONS + 1) * (1 + depth)) / (width * width);
    pxx = grow * (pxx - take * bx * bx);
    pyy = grow * (pyy - take * by * by);
    pzz = grow * (pzz - take * bz * bz);
    pxy = grow * (pxy - take * bx * by);
    pxz = grow * (pxz - take * bx * bz);
    pyz = grow * (pyz - take * by * bz);
  }
  return TOUCHING;
}

/** Distance of the farthest bolt from the middle, mm; bolts in one place count as 1 mm apart, since no turn moves them. */
function radiusOf(fit: BoltFit, middle: Spot): number {
  let radius = 0;
  for (let i = 0; i < fit.count; i += 1) {
    radius = Math.max(radius, Math.hypot((fit.boltX[i] ?? 0) - middle.x, (fit.boltY[i] ?? 0) - middle.y));
  }
  return radius > 0 ? radius : 1;
}

interface Spot {
  readonly x: number;
  readonly y: number;
}

/** A motion about the bolts' middle: turn by psi (radians), then put the middle at (x, y). */
function entering(middle: Spot, x: number, y: number, psi: number): Placement {
  const [cosine, sine] = [Math.cos(psi), Math.sin(psi)];
  return {
    answer: 'enters',
    motion: {
      turnDeg: (psi * 180) / Math.PI,
      shift: { x: x - (cosine * middle.x - sine * middle.y), y: y - (sine * middle.x + cosine * middle.y) },
    },
  };
}

function centreOf(xs: Float64Array, ys: Float64Array, count: number): Spot {
  let [x, y] = [0, 0];
  for (let i = 0; i < count; i += 1) {
    x += xs[i] ?? 0;
    y += ys[i] ?? 0;
  }
  return { x: x / count, y: y / count };
}

/** The motion of least squares, which most parts fit with. Source: plane Procrustes problem, closed form. */
function alignedMotion(fit: BoltFit, middle: Spot, target: Spot): Spot & { readonly psi: number } {
  let [along, across] = [0, 0];
  for (let i = 0; i < fit.count; i += 1) {
    const [bx, by] = [(fit.boltX[i] ?? 0) - middle.x, (fit.boltY[i] ?? 0) - middle.y];
    const [hx, hy] = [(fit.holeX[i] ?? 0) - target.x, (fit.holeY[i] ?? 0) - target.y];
    along += bx * hx + by * hy;
    across += bx * hy - by * hx;
  }
  return { ...target, psi: Math.atan2(across, along) };
}

/** Turns, radians, that the pair of bolts farthest apart allows; null when it allows none. */
function turnRange(fit: BoltFit): TurnRange | null {
  const { count, boltX, boltY, holeX, holeY, half, play } = fit;
  let [first, second, farthest] = [0, 0, -1];
  for (let i = 0; i < count; i += 1) {
    for (let j = i + 1; j < count; j += 1) {
      const apart = Math.hypot((boltX[i] ?? 0) - (boltX[j] ?? 0), (boltY[i] ?? 0) - (boltY[j] ?? 0));
      if (apart > farthest) [first, second, farthest] = [i, j, apart];
    }
  }
  const [vx, vy] = [(boltX[second] ?? 0) - (boltX[first] ?? 0), (boltY[second] ?? 0) - (boltY[first] ?? 0)];
  const [wx, wy] = [(holeX[second] ?? 0) - (holeX[first] ?? 0), (holeY[second] ?? 0) - (holeY[first] ?? 0)];
  const [v, w] = [Math.hypot(vx, vy), Math.hypot(wx, wy)];
  const roomMm = (half[first] ?? 0) + (play[first] ?? 0) + (half[second] ?? 0) + (play[second] ?? 0);
  // |turned v - w|^2 = (|v| - |w|)^2 + 4 |v| |w| sin^2(psi / 2), and it must not exceed the room of both openings.
  const left = roomMm ** 2 - (v - w) ** 2;
  if (left < 0) return null;
  if (!(v > 0) || !(w > 0)) return { middle: 0, reach: Math.PI };
  const halfSine = Math.sqrt(left / (4 * v * w));
  return {
    middle: Math.atan2(vx * wy - vy * wx, vx * wx + vy * wy),
    reach: halfSine >= 1 ? Math.PI : 2 * Math.asin(halfSine),
  };
}

/** Places of the bolts' middle, mm, that the opening which leaves least allows over all turns. */
function shiftRange(fit: BoltFit, middle: Spot, turn: TurnRange): Spot & { readonly reach: number } {
  const [cosine, sine] = [Math.cos(turn.middle), Math.sin(turn.middle)];
  let best = { x: 0, y: 0, reach: Infinity };
  for (let i = 0; i < fit.count; i += 1) {
    const [bx, by] = [(fit.boltX[i] ?? 0) - middle.x, (fit.boltY[i] ?? 0) - middle.y];
    const reach = (fit.half[i] ?? 0) + (fit.play[i] ?? 0) + Math.hypot(bx, by) * turn.reach;
    if (reach >= best.reach) continue;
    best = {
      x: (fit.holeX[i] ?? 0) - (cosine * bx - sine * by),
      y: (fit.holeY[i] ?? 0) - (sine * bx + cosine * by),
      reach,
    };
  }
  return best;
}

/**
 * The bolt that lies farthest outside its opening after a motion: by how much (mm, negative inside), the direction that leads
 * farther out, and how that grows with a turn, mm per radian.
 */
function worstBolt(
  fit: BoltFit,
  middle: Spot,
  x: number,
  y: number,
  psi: number,
): { readonly outsideMm: number; readonly ex: number; readonly ey: number; readonly perTurnMm: number } {
  const [cosine, sine] = [Math.cos(psi), Math.sin(psi)];
  let [outsideMm, ex, ey, perTurnMm] = [-Infinity, 1, 0, 0];
  for (let i = 0; i < fit.count; i += 1) {
    const [bx, by] = [(fit.boltX[i] ?? 0) - middle.x, (fit.boltY[i] ?? 0) - middle.y];
    const [rx, ry] = [cosine * bx - sine * by, sine * bx + cosine * by];
    let [dx, dy] = [rx + x - (fit.holeX[i] ?? 0), ry + y - (fit.holeY[i] ?? 0)];
    const half = fit.half[i] ?? 0;
    if (half > 0) {
      const [ux, uy] = [fit.ux[i] ?? 1, fit.uy[i] ?? 0];
      const along = Math.min(half, Math.max(-half, dx * ux + dy * uy));
      dx -= along * ux;
      dy -= along * uy;
    }
    const distance = Math.sqrt(dx * dx + dy * dy);
    const outside = distance - (fit.play[i] ?? 0);
    if (outside <= outsideMm) continue;
    outsideMm = outside;
    ex = distance > 0 ? dx / distance : 1;
    ey = distance > 0 ? dy / distance : 0;
    perTurnMm = ey * rx - ex * ry;
  }
  return { outsideMm, ex, ey, perTurnMm };
}
