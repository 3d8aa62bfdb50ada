import type { Mesh } from '@foldwright/shared/bending/development';
import type { Point3 } from '@foldwright/shared/geometry/point';
import { dot3 } from '@foldwright/shared/geometry/vector3';
import { type ScreenPoint, TO_LIGHT, project, throwOnGround } from '@foldwright/shared/drawing/axonometry';
import type { PaintFace, PaintItem } from '@foldwright/shared/drawing/paint-order';
import { faces, meshFaces, paintSolid } from '@foldwright/shared/drawing/solid-view';
import { type PaintedPiece, type PartDrawing, SHADE_COUNT } from './part-drawing';

/** Shade of a face turned away from the light, and how much the light adds. */
const DARKEST = 3.2;
const LIT = 7.6;

/** Draws a closed mesh as the list shows it: faces that look at the eye, their scribed edges, its shadow. */
export function drawSolid(mesh: Mesh): PartDrawing {
  const triangles = meshFaces(mesh);
  const points = triangles.flatMap((face) => face.points);
  return {
    pieces: pieces(paintSolid(mesh)),
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
function shadowOf(triangles: readonly PaintFace[]): string {
  const groundMm = Math.min(...triangles.flatMap((face) => face.points.map((point) => point.z)));
  return triangles
    .filter((face) => faces(face, TO_LIGHT))
    .map((face) => polygonPath(face.points.map((point) => project(throwOnGround(point, groundMm)))))
    .join('');
}
