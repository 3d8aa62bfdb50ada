import type { Mesh } from '@foldwright/shared/bending/development';
import { type ScreenPoint, TO_EYE, TO_LIGHT, project } from '@foldwright/shared/drawing/axonometry';
import { meshFaces } from '@foldwright/shared/drawing/solid-view';
import { dot3 } from '@foldwright/shared/geometry/vector3';

/** Quarter turns about the upright axis, counter-clockwise seen from above. */
export type QuarterTurns = 0 | 1 | 2 | 3;

const TURNS: readonly QuarterTurns[] = [0, 1, 2, 3];
/** Cells along the longer side of the picture that a part is judged by. */
const GRID = 56;
/** Share of light that even a face turned away from it gives back. */
const AMBIENT = 0.35;
/** How much better another turn must show a part before it is turned at all. */
const WORTH_TURNING = 1.04;

interface SeenFace {
  readonly corners: readonly [ScreenPoint, ScreenPoint, ScreenPoint];
  /** Nearness of the corners to the eye, mm. */
  readonly near: readonly [number, number, number];
  readonly brightness: number;
}

/** The turn that shows most of a part, and in the best light: a bracket is shown from the side its holes are seen from. */
export function bestFacing(mesh: Mesh): QuarterTurns {
  let best: QuarterTurns = 0;
  let bestShown = shownBy(mesh) * WORTH_TURNING;
  for (const turns of TURNS.slice(1)) {
    const shown = shownBy(turned(mesh, turns));
    if (shown > bestShown) [best, bestShown] = [turns, shown];
  }
  return best;
}

/** The mesh turned about the upright axis. */
export function turned(mesh: Mesh, turns: QuarterTurns): Mesh {
  if (turns === 0) return mesh;
  const [cos, sin] = [[1, 0, -1, 0][turns] ?? 1, [0, 1, 0, -1][turns] ?? 0];
  const turn = (values: readonly number[]): number[] => {
    const result = new Array<number>(values.length);
    for (let index = 0; index + 2 < values.length; index += 3) {
      const [x, y] = [values[index] ?? 0, values[index + 1] ?? 0];
      result[index] = x * cos - y * sin;
      result[index + 1] = x * sin + y * cos;
      result[index + 2] = values[index + 2] ?? 0;
    }
    return result;
  };
  return { ...mesh, positions: turn(mesh.positions), normals: turn(mesh.normals), edges: turn(mesh.edges) };
}

/** Light that reaches the eye from what isn't hidden: a coarse picture with a depth for every cell, summed up, in mm2. */
function shownBy(mesh: Mesh): number {
  const faces = seenFaces(mesh);
  const xs = faces.flatMap((face) => face.corners.map((corner) => corner.x));
  const ys = faces.flatMap((face) => face.corners.map((corner) => corner.y));
  const [minX, minY] = [Math.min(...xs), Math.min(...ys)];
  const cell = Math.max(Math.max(...xs) - minX, Math.max(...ys) - minY) / GRID;
  if (!(cell > 0) || !Number.isFinite(cell)) return 0;
  const depth = new Float64Array((GRID + 1) ** 2).fill(-Infinity);
  const light = new Float64Array((GRID + 1) ** 2);
  for (const { corners, near, brightness } of faces) {
    const [a, b, c] = corners.map((corner) => ({ x: (corner.x - minX) / cell, y: (corner.y - minY) / cell }));
    if (a === undefined || b === undefined || c === undefined) continue;
    const area = (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
    if (area === 0) continue;
    const [left, right] = [Math.floor(Math.min(a.x, b.x, c.x)), Math.min(GRID, Math.ceil(Math.max(a.x, b.x, c.x)))];
    const [top, bottom] = [Math.floor(Math.min(a.y, b.y, c.y)), Math.min(GRID, Math.ceil(Math.max(a.y, b.y, c.y)))];
    for (let y = top; y <= bottom; y++) {
      for (let x = left; x <= right; x++) {
        const [px, py] = [x + 0.5, y + 0.5];
        const toB = ((px - a.x) * (c.y - a.y) - (py - a.y) * (c.x - a.x)) / area;
        const toC = ((b.x - a.x) * (py - a.y) - (b.y - a.y) * (px - a.x)) / area;
        if (toB < 0 || toC < 0 || toB + toC > 1) continue;
        const at = near[0] + toB * (near[1] - near[0]) + toC * (near[2] - near[0]);
        const index = y * (GRID + 1) + x;
        if (at <= (depth[index] ?? Infinity)) continue;
        depth[index] = at;
        light[index] = brightness;
      }
    }
  }
  return light.reduce((sum, value) => sum + value, 0) * cell * cell;
}

function seenFaces(mesh: Mesh): readonly SeenFace[] {
  return meshFaces(mesh).flatMap(({ points: [a, b, c], normal }) => {
    if (a === undefined || b === undefined || c === undefined || dot3(normal, TO_EYE) <= 0) return [];
    return [
      {
        corners: [project(a), project(b), project(c)],
        near: [dot3(a, TO_EYE), dot3(b, TO_EYE), dot3(c, TO_EYE)],
        brightness: AMBIENT + (1 - AMBIENT) * Math.max(0, dot3(normal, TO_LIGHT)),
      } as const,
    ];
  });
}
