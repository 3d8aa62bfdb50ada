import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import type { Development } from '@foldwright/shared/bending/development';
import { type ScreenPoint, TO_LIGHT, project } from '@foldwright/shared/drawing/axonometry';
import { paintSolid } from '@foldwright/shared/drawing/solid-view';
import type { Point } from '@foldwright/shared/geometry/point';
import { dot3 } from '@foldwright/shared/geometry/vector3';
import type { PdfSheet } from './pdf-sheet';

/** Room for a picture on a sheet, mm. */
export interface PictureRoom {
  readonly centre: Point;
  readonly widthMm: number;
  readonly heightMm: number;
  /** Never drawn larger than this. */
  readonly largestScale: number;
}

/** Channels of the lightest a face gets, 0 to 255: the metal's own, or its coat. */
type Tint = readonly [number, number, number];

const BARE: Tint = [245, 245, 245];
/** How much of its light a face keeps that is turned away from it: never so little that edges drown. */
const LEAST_LIGHT = 0.74;

/** The tint of a coat. @param colourHex sRGB such as #4F5F3A; null for bare metal */
export function tintOf(colourHex: string | null): Tint {
  const parts = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(colourHex ?? '');
  if (parts === null) return BARE;
  // Half way to white: print swallows dark colours, and scribed edges have to be seen.
  const channel = (at: number): number => Math.round((Number.parseInt(parts[at] ?? 'ff', 16) + 255) / 2);
  return [channel(1), channel(2), channel(3)];
}

/** A formed part as it stands, face A up in its base panel, as large as the room allows. */
export function drawFormedPicture(
  sheet: PdfSheet,
  development: Development,
  room: PictureRoom,
  tint: Tint = BARE,
): void {
  const items = paintSolid(poseFormed(layOutMesh(development), 1));
  const seen = items.flatMap((item) => (item.kind === 'face' ? item.points.map(project) : []));
  if (seen.length === 0) return;
  const [minX, minY] = [Math.min(...seen.map(({ x }) => x)), Math.min(...seen.map(({ y }) => y))];
  const [maxX, maxY] = [Math.max(...seen.map(({ x }) => x)), Math.max(...seen.map(({ y }) => y))];
  const scale = Math.min(room.widthMm / (maxX - minX), room.heightMm / (maxY - minY), room.largestScale);
  // The projection counts y down, as screens do; the sheet counts it up.
  const place = ({ x, y }: ScreenPoint): Point => ({
    x: room.centre.x + (x - (minX + maxX) / 2) * scale,
    y: room.centre.y - (y - (minY + maxY) / 2) * scale,
  });
  for (const item of items) {
    if (item.kind === 'line') sheet.line(place(project(item.from)), place(project(item.to)), { widthMm: 0.2 });
    else {
      sheet.polygon(
        item.points.map((point) => place(project(point))),
        shade(tint, dot3(item.normal, TO_LIGHT)),
      );
    }
  }
}

/** Printed colour of a face: light where it looks at the light. */
function shade(tint: Tint, light: number): string {
  const share = LEAST_LIGHT + (1 - LEAST_LIGHT) * Math.max(0, Math.min(1, light));
  return `#${tint
    .map((channel) =>
      Math.round(channel * share)
        .toString(16)
        .padStart(2, '0'),
    )
    .join('')}`;
}
