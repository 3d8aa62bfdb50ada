import type { Point3 } from '../geometry/point';
import { cross3, dot3, subtract3 } from '../geometry/vector3';

/** A flat convex face that looks towards the eye. */
export interface PaintFace {
  readonly kind: 'face';
  readonly points: readonly Point3[];
  /** Unit normal, towards the eye's side. */
  readonly normal: Point3;
}

/** A scribed line. */
export interface PaintLine {
  readonly kind: 'line';
  readonly from: Point3;
  readonly to: Point3;
}

export type PaintItem = PaintFace | PaintLine;

/** Nearer to a plane than this counts as lying in it: what a fold leaves of rounding, far below a pixel. */
const IN_PLANE_MM = 0.01;
const CANDIDATES = 5;

interface Plane {
  readonly normal: Point3;
  readonly distanceMm: number;
}

/**
 * Puts faces and lines in the order in which they are painted, the farthest first, cutting those that reach through one
 * another (a binary space partition). Every face must look towards the eye, which is infinitely far away: then whatever
 * lies behind a face's plane is painted before it. Lines in a face's plane are painted right after that face.
 */
export function paintOrder(items: readonly PaintItem[]): readonly PaintItem[] {
  const faces = items.filter((item) => item.kind === 'face').sort((a, b) => areaMm2(b) - areaMm2(a));
  const lines = items.filter((item) => item.kind === 'line');
  const painted: PaintItem[] = [];
  order(faces, lines, painted);
  return painted;
}

function order(faces: readonly PaintFace[], lines: readonly PaintLine[], painted: PaintItem[]): void {
  const divider = chooseDivider(faces);
  if (divider === null) {
    painted.push(...lines);
    return;
  }
  const plane = planeOf(divider);
  const behind: { faces: PaintFace[]; lines: PaintLine[] } = { faces: [], lines: [] };
  const before: { faces: PaintFace[]; lines: PaintLine[] } = { faces: [], lines: [] };
  const within: { faces: PaintFace[]; lines: PaintLine[] } = { faces: [], lines: [] };
  for (const face of faces) {
    if (face === divider) within.faces.push(face);
    else splitFace(face, plane, behind.faces, within.faces, before.faces);
  }
  for (const line of lines) splitLine(line, plane, behind.lines, within.lines, before.lines);
  order(behind.faces, behind.lines, painted);
  painted.push(...within.faces, ...within.lines);
  order(before.faces, before.lines, painted);
}

/** Of the few largest faces the one whose plane cuts the fewest others. Faces come sorted by size. */
function chooseDivider(faces: readonly PaintFace[]): PaintFace | null {
  let best: PaintFace | null = null;
  let fewestCuts = Infinity;
  for (const face of faces.slice(0, CANDIDATES)) {
    const plane = planeOf(face);
    let cuts = 0;
    for (const other of faces) {
      const heights = other.points.map((point) => heightOver(plane, point));
      if (Math.max(...heights) > IN_PLANE_MM && Math.min(...heights) < -IN_PLANE_MM) cuts++;
    }
    if (cuts < fewestCuts) [best, fewestCuts] = [face, cuts];
    if (cuts === 0) break;
  }
  return best;
}

function splitFace(face: PaintFace, plane: Plane, behind: PaintFace[], within: PaintFace[], before: PaintFace[]): void {
  const heights = face.points.map((point) => heightOver(plane, point));
  const [lowest, highest] = [Math.min(...heights), Math.max(...heights)];
  if (lowest >= -IN_PLANE_MM && highest <= IN_PLANE_MM) within.push(face);
  else if (lowest >= -IN_PLANE_MM) before.push(face);
  else if (highest <= IN_PLANE_MM) behind.push(face);
  else {
    const halves: { readonly low: Point3[]; readonly high: Point3[] } = { low: [], high: [] };
    face.points.forEach((point, index) => {
      const next = face.points[(index + 1) % face.points.length] ?? point;
      const [height, nextHeight] = [heights[index] ?? 0, heights[(index + 1) % heights.length] ?? 0];
      if (height <= 0) halves.low.push(point);
      if (height >= 0) halves.high.push(point);
      if (height * nextHeight < 0) {
        const crossing = towards(point, next, height / (height - nextHeight));
        halves.low.push(crossing);
        halves.high.push(crossing);
      }
    });
    if (halves.low.length > 2) behind.push({ ...face, points: halves.low });
    if (halves.high.length > 2) before.push({ ...face, points: halves.high });
  }
}

function splitLine(line: PaintLine, plane: Plane, behind: PaintLine[], within: PaintLine[], before: PaintLine[]): void {
  const [from, to] = [heightOver(plane, line.from), heightOver(plane, line.to)];
  if (Math.abs(from) <= IN_PLANE_MM && Math.abs(to) <= IN_PLANE_MM) within.push(line);
  else if (from >= -IN_PLANE_MM && to >= -IN_PLANE_MM) before.push(line);
  else if (from <= IN_PLANE_MM && to <= IN_PLANE_MM) behind.push(line);
  else {
    const crossing = towards(line.from, line.to, from / (from - to));
    const [first, second] = from < 0 ? [behind, before] : [before, behind];
    first.push({ kind: 'line', from: line.from, to: crossing });
    second.push({ kind: 'line', from: crossing, to: line.to });
  }
}

function planeOf(face: PaintFace): Plane {
  const point = face.points[0];
  return { normal: face.normal, distanceMm: point === undefined ? 0 : dot3(face.normal, point) };
}

function heightOver(plane: Plane, point: Point3): number {
  return dot3(plane.normal, point) - plane.distanceMm;
}

function towards(from: Point3, to: Point3, share: number): Point3 {
  return {
    x: from.x + (to.x - from.x) * share,
    y: from.y + (to.y - from.y) * share,
    z: from.z + (to.z - from.z) * share,
  };
}

function areaMm2(face: PaintFace): number {
  const [first, ...others] = face.points;
  if (first === undefined) return 0;
  let doubled = 0;
  for (let index = 0; index + 1 < others.length; index++) {
    const [a, b] = [others[index], others[index + 1]];
    if (a !== undefined && b !== undefined)
      doubled += dot3(face.normal, cross3(subtract3(a, first), subtract3(b, first)));
  }
  return Math.abs(doubled) / 2;
}
