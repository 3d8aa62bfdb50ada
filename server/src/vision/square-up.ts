import type { Point } from '@foldwright/shared/geometry/point';
import type { Quad } from './dark-quads';
import { type MarkerSearch } from './find-markers';
import type { Picture } from './picture';
import { type RefinedMarker, refineMarker } from './refine-corners';
import { MARKER_SIDE_MM, type ScaleSheetLayout, sheetOfMarker } from './scale-sheet-layout';
import { solveCamera, type SolvedCamera } from './solve-camera';
import { TraceRefusal } from './trace-refusal';

/** The camera over a scale sheet. */
export interface SquaredUp extends SolvedCamera {
  readonly sheet: ScaleSheetLayout;
  /** Ids of the markers the camera was solved from. */
  readonly markerIds: ReadonlySet<number>;
  /** Blur of sharp edges, pixels (standard deviation). */
  readonly blurPx: number;
}

const MIN_MARKERS = 4;

/** Corners of a printed marker in the page frame, from its top left clockwise as printed. */
function cornersOnPage(x: number, y: number, scale: readonly [number, number]): readonly Point[] {
  return [
    { x: x * scale[0], y: (y + MARKER_SIDE_MM) * scale[1] },
    { x: (x + MARKER_SIDE_MM) * scale[0], y: (y + MARKER_SIDE_MM) * scale[1] },
    { x: (x + MARKER_SIDE_MM) * scale[0], y: y * scale[1] },
    { x: x * scale[0], y: y * scale[1] },
  ];
}

/** The sheet most markers belong to. */
function sheetOf(search: MarkerSearch): ScaleSheetLayout | null {
  const counts = new Map<ScaleSheetLayout, number>();
  for (const { id } of search.markers) {
    const sheet = sheetOfMarker(id);
    if (sheet) counts.set(sheet, (counts.get(sheet) ?? 0) + 1);
  }
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? null;
}

function scaleUp(quad: Quad, factor: number): Quad {
  // The middle of a block of pixels is not the middle of its first pixel.
  const up = (p: { x: number; y: number }): { x: number; y: number } => ({
    x: p.x * factor + (factor - 1) / 2,
    y: p.y * factor + (factor - 1) / 2,
  });
  return [up(quad[0]), up(quad[1]), up(quad[2]), up(quad[3])];
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? 0;
}

/**
 * Solves the camera from the markers found in a picture shrunk by `factor`.
 *
 * @throws TraceRefusal noMarkers, mirroredPrint, tooFewMarkers, blurred
 */
export function squareUp(
  picture: Picture,
  search: MarkerSearch,
  factor: number,
  focal35Mm: number | null,
  printScale: readonly [number, number],
): SquaredUp {
  const sheet = sheetOf(search);
  if (search.mirroredCount > search.markers.length) {
    throw new TraceRefusal('mirroredPrint', 'The sheet is mirrored: a flipped photo, or a mirrored print.');
  }
  if (!sheet) throw new TraceRefusal('noMarkers', 'No scale sheet can be seen in the photo.');
  const refined = search.markers
    .filter(({ id }) => sheetOfMarker(id) === sheet)
    .map(({ id, corners }) => refineMarker(picture, id, scaleUp(corners, factor)))
    .filter((marker): marker is RefinedMarker => marker !== null);
  if (refined.length < MIN_MARKERS) {
    throw new TraceRefusal(
      'tooFewMarkers',
      `Only ${refined.length} of the sheet's markers can be read; four are needed.`,
    );
  }
  const sightings = refined.flatMap(({ id, corners }) => {
    const marker = sheet.markers.find((candidate) => candidate.id === id);
    const onPage = marker ? cornersOnPage(marker.x, marker.y, printScale) : [];
    return onPage.map((page, k) => ({ page, seen: corners[k as 0 | 1 | 2 | 3], group: id }));
  });
  const solved = solveCamera(sightings, {
    widthPx: picture.widthPx,
    heightPx: picture.heightPx,
    focal35Mm,
    solvesLens: refined.length >= 6,
  });
  if (!solved) throw new TraceRefusal('tooFewMarkers', "The markers that can be read do not settle the sheet's place.");
  const kept = refined.filter(({ id }) => !solved.droppedGroups.has(id));
  return {
    ...solved,
    sheet,
    markerIds: new Set(kept.map(({ id }) => id)),
    blurPx: median(kept.map((marker) => marker.blurPx)),
  };
}
