import { pointNumbers } from '../geometry/chain';
import type { Point, Point3 } from '../geometry/point';
import { CHORD_MM, COINCIDENT_MM } from '../geometry/tolerance';
import { triangulate } from '../geometry/triangulate';
import { dot, subtract } from '../geometry/vector';
import { cross3, dot3, subtract3, unit3 } from '../geometry/vector3';
import type { Development, Mesh } from './development';
import { panelPoses, placeIn, placeInZone } from './fold';
import type { Place } from './fold';
import { cutMeshCells, stripCount } from './mesh-cells';
import type { MeshCell } from './mesh-cells';

/** A mesh laid out once, that can be put into any fold fraction quickly. */
export interface FoldableMesh {
  readonly development: Development;
  readonly cells: readonly FoldableCell[];
}

interface FoldableCell {
  readonly of: MeshCell['of'];
  readonly points: readonly Point[];
  readonly triangles: readonly number[];
  /** Edges on the boundary of the sheet, by index into `points`, the sheet on the left. */
  readonly rim: readonly (readonly [number, number])[];
}

/** Where neighbouring edges of the rim turn by more than this the side edge is drawn: cosine of 20 degrees. */
const SHARP_COSINE = 0.94;

/** Lays a development out for folding. Arcs and bends are within `chordErrorMm` of their exact form when formed. */
export function layOutMesh(development: Development, chordErrorMm: number = CHORD_MM): FoldableMesh {
  const cells = cutMeshCells(development, chordErrorMm);
  const numberOf = pointNumbers(4 * COINCIDENT_MM);
  const loopsOf = (cell: MeshCell): readonly (readonly number[])[] =>
    [cell.outer, ...cell.openings].map((loop) => loop.map(numberOf));
  const numbered = cells.map(loopsOf);
  const travelled = new Set<string>();
  for (const loops of numbered) {
    for (const loop of loops)
      loop.forEach((from, index) => travelled.add(`${String(from)} ${String(loop[(index + 1) % loop.length])}`));
  }
  return {
    development,
    cells: cells.map((cell, index) => {
      const loops = [cell.outer, ...cell.openings];
      const rim: (readonly [number, number])[] = [];
      let first = 0;
      loops.forEach((loop, at) => {
        const ids = numbered[index]?.[at] ?? [];
        loop.forEach((from, corner) => {
          const next = (corner + 1) % loop.length;
          const to = loop[next] ?? from;
          const isShared =
            travelled.has(`${String(ids[next])} ${String(ids[corner])}`) && isSeam(development, from, to, chordErrorMm);
          if (!isShared) rim.push([first + corner, first + next]);
        });
        first += loop.length;
      });
      return { of: cell.of, points: loops.flat(), triangles: triangulate(cell.outer, cell.openings), rim };
    }),
  };
}

/** Whether an edge runs along a line at which cells meet: a tangent line or a line between strips of a zone. */
function isSeam(development: Development, from: Point, to: Point, chordErrorMm: number): boolean {
  return development.zones.some((zone) => {
    const level = dot(subtract(from, zone.origin), zone.towardsChild);
    if (Math.abs(level - dot(subtract(to, zone.origin), zone.towardsChild)) > 4 * COINCIDENT_MM) return false;
    const strip = zone.bendAllowanceMm / stripCount(zone, development.stock.thicknessMm, chordErrorMm);
    const nearest = Math.round(level / strip) * strip;
    return (
      Math.abs(level - nearest) <= 4 * COINCIDENT_MM && level > -strip / 2 && level < zone.bendAllowanceMm + strip / 2
    );
  });
}

/**
 * The part at a fold fraction, 0 flat to 1 formed, as a closed mesh whose triangles run counter-clockwise seen from outside.
 * The base panel stays with face B on z = 0 and face A on z = T.
 * @throws RangeError for a fraction outside 0..1.
 */
export function poseFormed(foldable: FoldableMesh, foldFraction: number): Mesh {
  const { development, cells } = foldable;
  const thicknessMm = development.stock.thicknessMm;
  const poses = panelPoses(development.panels, development.zones, thicknessMm, foldFraction);
  const positions: number[] = [];
  const normals: number[] = [];
  const indices: number[] = [];
  const edges: number[] = [];
  const push = (at: Point3, normal: Point3): number => {
    positions.push(at.x, at.y, at.z);
    normals.push(normal.x, normal.y, normal.z);
    return positions.length / 3 - 1;
  };
  const place = (cell: FoldableCell, point: Point, heightMm: number): Place => {
    if (cell.of.kind === 'panel') {
      const pose = poses[cell.of.index];
      return pose === undefined
        ? { at: { ...point, z: heightMm }, faceA: { x: 0, y: 0, z: 1 } }
        : placeIn(pose, point, heightMm);
    }
    const zone = development.zones[cell.of.index];
    const parent = zone === undefined ? undefined : poses[zone.parentIndex];
    if (zone === undefined || parent === undefined)
      return { at: { ...point, z: heightMm }, faceA: { x: 0, y: 0, z: 1 } };
    return placeInZone(zone, parent, thicknessMm, foldFraction, point, heightMm);
  };
  for (const cell of cells) {
    const faceA = cell.points.map((point) => place(cell, point, thicknessMm));
    const faceB = cell.points.map((point) => place(cell, point, 0));
    const startA = positions.length / 3;
    for (const { at, faceA: normal } of faceA) push(at, normal);
    const startB = positions.length / 3;
    for (const { at, faceA: normal } of faceB) push(at, { x: -normal.x, y: -normal.y, z: -normal.z });
    for (let index = 0; index + 2 < cell.triangles.length; index += 3) {
      const [a, b, c] = [cell.triangles[index] ?? 0, cell.triangles[index + 1] ?? 0, cell.triangles[index + 2] ?? 0];
      indices.push(startA + a, startA + b, startA + c, startB + a, startB + c, startB + b);
    }
    pushRim(cell, faceA, faceB, { push, indices, edges });
  }
  return { positions, normals, indices, edges };
}

function pushRim(
  cell: FoldableCell,
  faceA: readonly Place[],
  faceB: readonly Place[],
  out: { readonly push: (at: Point3, normal: Point3) => number; readonly indices: number[]; readonly edges: number[] },
): void {
  const outwardAt = new Map<number, Point3>();
  for (const [from, to] of cell.rim) {
    const [fromA, toA, fromB, toB] = [faceA[from], faceA[to], faceB[from], faceB[to]];
    if (fromA === undefined || toA === undefined || fromB === undefined || toB === undefined) continue;
    const outward = unit3(cross3(subtract3(toB.at, fromB.at), subtract3(fromA.at, fromB.at)));
    const corners = [fromB, toB, toA, fromA].map(({ at }) => out.push(at, outward));
    const [a, b, c, d] = corners;
    if (a !== undefined && b !== undefined && c !== undefined && d !== undefined) out.indices.push(a, b, c, a, c, d);
    for (const [start, end] of [
      [fromA, toA],
      [fromB, toB],
    ] as const) {
      out.edges.push(start.at.x, start.at.y, start.at.z, end.at.x, end.at.y, end.at.z);
    }
    const before = outwardAt.get(from);
    if (before !== undefined && dot3(before, outward) < SHARP_COSINE) {
      out.edges.push(fromA.at.x, fromA.at.y, fromA.at.z, fromB.at.x, fromB.at.y, fromB.at.z);
    }
    outwardAt.set(to, outward);
  }
}
