import type { Mesh } from '../bending/development';
import type { Point3 } from '../geometry/point';
import { cross3, dot3, subtract3, unit3 } from '../geometry/vector3';
import { TO_EYE } from './axonometry';
import { type PaintFace, type PaintItem, type PaintLine, paintOrder } from './paint-order';

/** Faces seen this edge-on cover less than a line's width. */
const EDGE_ON = 0.002;

/** The triangles of a mesh as faces with unit normals; collapsed ones are left out. */
export function meshFaces(mesh: Mesh): readonly PaintFace[] {
  const faces: PaintFace[] = [];
  for (let index = 0; index + 2 < mesh.indices.length; index += 3) {
    const [a, b, c] = [0, 1, 2].map((corner) => vertex(mesh.positions, mesh.indices[index + corner] ?? 0));
    if (a === undefined || b === undefined || c === undefined) continue;
    const normal = unit3(cross3(subtract3(b, a), subtract3(c, a)));
    if (dot3(normal, normal) > 0.5) faces.push({ kind: 'face', points: [a, b, c], normal });
  }
  return faces;
}

/** Whether a face turns towards a direction (unit vector) by more than a line's width. */
export function faces(face: PaintFace, direction: Point3): boolean {
  return dot3(face.normal, direction) > EDGE_ON;
}

/** What the eye sees of a closed mesh with its scribed edges, in the order in which it is painted: the farthest first. */
export function paintSolid(mesh: Mesh): readonly PaintItem[] {
  return paintOrder([...meshFaces(mesh).filter((face) => faces(face, TO_EYE)), ...meshLines(mesh)]);
}

function meshLines(mesh: Mesh): readonly PaintLine[] {
  const lines: PaintLine[] = [];
  for (let index = 0; index + 5 < mesh.edges.length; index += 6) {
    lines.push({ kind: 'line', from: vertex(mesh.edges, index / 3), to: vertex(mesh.edges, index / 3 + 1) });
  }
  return lines;
}

function vertex(values: readonly number[], at: number): Point3 {
  return { x: values[at * 3] ?? 0, y: values[at * 3 + 1] ?? 0, z: values[at * 3 + 2] ?? 0 };
}
