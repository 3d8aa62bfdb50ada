import type { Mesh } from '@foldwright/shared/bending/development';
import type { Point3 } from '@foldwright/shared/geometry/point';
import { cross3, dot3, subtract3, unit3 } from '@foldwright/shared/geometry/vector3';
import { type ScreenPoint, TO_EYE, TO_LIGHT, project, throwOnGround } from './axonometry';
import { type PaintFace, type PaintItem, paintOrder } from './paint-order';
import { type PaintedPiece, type PartDrawing, SHADE_COUNT } from './part-drawing';

/** Faces seen this edge-on cover less than a line's width. */
const EDGE_ON = 0.002;
/** Shade of a face turned away from the light, and how much the light adds. */
const DARKEST = 3.2;
const LIT = 7.6;

/** Draws a closed mesh as the list shows it: faces that look at the eye, their scribed edges, its shadow. */
export function drawSolid(mesh: Mesh): PartDrawing {
  const triangles = trianglesOf(mesh);
  const seen = triangles.filter((face) => dot3(face.normal, TO_EYE) > EDGE_ON);
  const points = triangles.flatMap((face) => face.points);
  return {
    pieces: pieces(paintOrder([...seen, ...linesOf(mesh)])),
    shadow: shadowOf(triangles),
    ...extent(points.map(project)),
  };
}

/** Extent of screen points. */
export function extent(points: readonly ScreenPoint[]): Pick<PartDrawing, 'minX' | 'minY' | 'widthPx' | 'heightPx'> {
  let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const { x, y } of points) {
    [minX, minY, maxX, maxY] = [Math.min(minX, x), Math.min(minY, y), Math.max(maxX, x), Math.max(maxY, y)];
  }
  if (minX > maxX) return { minX: 0, minY: 0, widthPx: 0, heightPx: 0 };
  return { minX, minY, widthPx: maxX - minX, heightPx: maxY - minY };
}

/** Shade of a face by how it faces the light, 0 darkest. */
export function shadeOf(normal: Point3): number {
  const light = Math.max(0, dot3(normal, TO_LIGHT));
  return Math.max(0, Math.min(SHADE_COUNT - 1, Math.round(DARKEST + LIT * light)));
}

/** Closed polygon as an SVG path. */
export function polygonPath(points: readonly ScreenPoint[]): string {
  return `M${points.map(({ x, y }) => `${rounded(x)} ${rounded(y)}`).join('L')}Z`;
}

/** To a tenth of a pixel at 2 px per mm; more figures only cost bytes. */
export function rounded(value: number): number {
  return Math.round(value * 20) / 20;
}

function trianglesOf(mesh: Mesh): readonly PaintFace[] {
  const faces: PaintFace[] = [];
  for (let index = 0; index + 2 < mesh.indices.length; index += 3) {
    const [a, b, c] = [0, 1, 2].map((corner) => vertex(mesh.positions, mesh.indices[index + corner] ?? 0));
    if (a === undefined || b === undefined || c === undefined) continue;
    const normal = unit3(cross3(subtract3(b, a), subtract3(c, a)));
    if (dot3(normal, normal) > 0.5) faces.push({ kind: 'face', points: [a, b, c], normal });
  }
  return faces;
}

function linesOf(mesh: Mesh): readonly PaintItem[] {
  const lines: PaintItem[] = [];
  for (let index = 0; index + 5 < mesh.edges.length; index += 6) {
    lines.push({ kind: 'line', from: vertex(mesh.edges, index / 3), to: vertex(mesh.edges, index / 3 + 1) });
  }
  return lines;
}

function vertex(values: readonly number[], at: number): Point3 {
  return { x: values[at * 3] ?? 0, y: values[at * 3 + 1] ?? 0, z: values[at * 3 + 2] ?? 0 };
}

/** Neighbours in order of the same kind and shade become one path: fewer elements, no seams between them. */
function pieces(items: readonly PaintItem[]): readonly PaintedPiece[] {
  const done: PaintedPiece[] = [];
  for (const item of items) {
    const last = done[done.length - 1];
    if (item.kind === 'face') {
      const d = polygonPath(item.points.map(project));
      const shade = shadeOf(item.normal);
      if (last?.kind === 'faces' && last.shade === shade) done[done.length - 1] = { ...last, d: last.d + d };
      else done.push({ kind: 'faces', shade, d });
    } else {
      const [from, to] = [project(item.from), project(item.to)];
      const d = `M${rounded(from.x)} ${rounded(from.y)}L${rounded(to.x)} ${rounded(to.y)}`;
      if (last?.kind === 'lines') done[done.length - 1] = { kind: 'lines', d: last.d + d };
      else done.push({ kind: 'lines', d });
    }
  }
  return done;
}

/** Every face turned to the light throws its own shadow; all wound the same way, so that overlaps don't cancel. */
function shadowOf(faces: readonly PaintFace[]): string {
  const groundMm = Math.min(...faces.flatMap((face) => face.points.map((point) => point.z)));
  return faces
    .filter((face) => dot3(face.normal, TO_LIGHT) > EDGE_ON)
    .map((face) => polygonPath(face.points.map((point) => project(throwOnGround(point, groundMm)))))
    .join('');
}
