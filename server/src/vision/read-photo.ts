import type { Trace, TraceStage } from '@foldwright/shared/fitting/trace';
import { cameraCentre, cameraTiltDeg, projectPoint } from './camera';
import { traceContours } from './contours';
import { decodePhoto, encodeForDisplay } from './decode-photo';
import { findMarkers } from './find-markers';
import { findTemplate } from './find-template';
import { groundOfScaleSheet } from './ground';
import type { PhotoReading } from './photo-reading';
import { type Picture, shrinkToGrey } from './picture';
import type { ReadingOptions } from './reading-options';
import { rectify, rectifyForDisplay } from './rectify';
import { BOUNDARY_STEP_MM, type BoundaryPoint, refineBoundary } from './refine-boundary';
import { plainView } from './plain-view';
import type { Scene } from './scene';
import { squareUp } from './square-up';
import { TraceRefusal } from './trace-refusal';
import { fitShapes, primitiveLengthMm } from './trace-shapes';
import { type View, pixelsPerMmAt, viewAtHeight } from './view';

export type StageListener = (stage: TraceStage) => void;

/** Fine enough for the smallest hole; edges are found on the photo itself. */
const RASTER_PER_MM = 3;
const DISPLAY_PER_MM = 6;
const DISPLAY_SIDE_PX = 2400;
const MAX_RASTER_SIDE = 2400;
/** Long side of the picture in which markers are looked for, pixels. */
const SEARCH_SIDE_PX = 1340;
const MAX_BLUR_PX = 3;
const MAX_TILT_DEG = 50;
/** Edges of markers that miss the flat sheet by more than this mean that it is not flat, mm. */
const MAX_SHEET_MISS_MM = 0.3;
const DARK_GREY = 22;
const FAINT_WORTH_SAYING_MM = 15;
const FAINT_WORTH_SAYING = 0.12;
const STAIN_SHARE = 0.12;
const LEAST_OPENING_POINTS = 20;

function meanGrey(grey: Uint8Array): number {
  let sum = 0;
  for (let k = 0; k < grey.length; k += 7) sum += grey[k] ?? 0;
  return sum / Math.max(1, Math.floor(grey.length / 7));
}

function sceneOfScaleSheet(picture: Picture, focal35Mm: number | null, options: ReadingOptions): Scene {
  const printScale = options.printScale ?? [1, 1];
  const factor = Math.max(1, Math.round(Math.max(picture.widthPx, picture.heightPx) / SEARCH_SIDE_PX));
  const grey = shrinkToGrey(picture, factor);
  const search = findMarkers(grey);
  if (search.markers.length === 0 && meanGrey(grey.grey) < DARK_GREY) {
    throw new TraceRefusal('tooDark', 'The photo is too dark to see the sheet.');
  }
  const found = squareUp(picture, search, factor, focal35Mm, printScale);
  const { camera, sheet } = found;
  const view: View = { toPixel: (x, y) => projectPoint(camera, x, y, 0), eye: cameraCentre(camera) };
  const perMm = pixelsPerMmAt(view, { x: sheet.widthMm / 2, y: sheet.heightMm / 2 });
  const tiltDeg = cameraTiltDeg(camera);
  if (tiltDeg > MAX_TILT_DEG) {
    throw new TraceRefusal(
      'tiltTooSteep',
      `The photo was taken ${Math.round(tiltDeg)}° off the square; keep under 35°.`,
    );
  }
  if (found.blurPx > MAX_BLUR_PX)
    throw new TraceRefusal('blurred', 'The photo is blurred. Hold still, or step back a little.');
  const missMm = found.rmsPx / perMm;
  if (missMm > MAX_SHEET_MISS_MM)
    throw new TraceRefusal('sheetNotFlat', 'The sheet does not lie flat: its markers do not agree.');
  const warnings: string[] = [];
  if (found.markerIds.size < 10)
    warnings.push(`Only ${found.markerIds.size} of ${sheet.markers.length} markers could be used.`);
  if (tiltDeg > 35) warnings.push(`The photo was taken ${Math.round(tiltDeg)}° off the square; under 35° is better.`);
  return {
    view,
    widthMm: sheet.widthMm * printScale[0],
    heightMm: sheet.heightMm * printScale[1],
    method: 'markers',
    markersUsed: found.markerIds.size,
    tiltDeg,
    blurPx: found.blurPx,
    warnings,
    doubt: { cameraMm: 0.01 + 0.5 * missMm, printShare: options.printScale ? 0.0005 : 0.001 },
    ground: (raster) => groundOfScaleSheet(raster, sheet, found.markerIds, printScale),
  };
}

function isStopped(signal: AbortSignal | undefined): void {
  signal?.throwIfAborted();
}

/**
 * Reads one photo: decodes, finds the scale, squares up, finds the template and fits its outline.
 *
 * @throws TraceRefusal with the reason in words; the signal's reason when it is aborted.
 */
export async function readPhoto(
  bytes: Buffer,
  options: ReadingOptions,
  onStage: StageListener = () => undefined,
  signal?: AbortSignal,
): Promise<PhotoReading> {
  const timingsMs: Record<string, number> = {};
  const began = performance.now();
  let lap = began;
  const enter = async (stage: TraceStage): Promise<void> => {
    onStage(stage);
    // A breath between stages: the message goes out, and a stop comes in.
    await new Promise((resolve) => setImmediate(resolve));
    isStopped(signal);
    lap = performance.now();
  };
  const leave = (stage: TraceStage): void => {
    timingsMs[stage] = Math.round(performance.now() - lap);
  };
  await enter('decode');
  const { picture, focal35Mm } = await decodePhoto(bytes);
  leave('decode');
  await enter('markers');
  const scale = options.scale ?? { kind: 'markers' };
  const scene =
    scale.kind === 'markers' ? sceneOfScaleSheet(picture, focal35Mm, options) : plainView(picture, focal35Mm, scale);
  leave('markers');
  await enter('square-up');
  const longMm = Math.max(scene.widthMm, scene.heightMm);
  const raster = rectify(
    picture,
    scene.view,
    scene.widthMm,
    scene.heightMm,
    Math.min(RASTER_PER_MM, MAX_RASTER_SIDE / longMm),
  );
  const displayPerMm = Math.min(DISPLAY_PER_MM, DISPLAY_SIDE_PX / longMm);
  leave('square-up');
  await enter('template');
  const template = findTemplate(raster, scene.ground(raster));
  const contours = traceContours(template.mask, raster);
  leave('template');
  await enter('outline');
  const followed = contours.map((contour, index) =>
    refineBoundary(picture, scene.view, contour, {
      thicknessMm: scene.view.eye ? options.thicknessMm : 0,
      blurPx: scene.blurPx,
      isOpening: index > 0,
    }),
  );
  const boundaries = withoutStains(followed);
  leave('outline');
  await enter('holes');
  const sizeMm = Math.hypot(...spanMm(boundaries[0] ?? []));
  const shapes = fitShapes(boundaries, {
    ...scene.doubt,
    thicknessMm: options.thicknessDoubtMm ?? Math.max(0.05, 0.04 * options.thicknessMm),
    sizeMm,
    shadowMm: 0.04,
  });
  if (!shapes) throw new TraceRefusal('noTemplate', "The template's edge cannot be followed all round.");
  leave('holes');
  const display = await encodeForDisplay(picture, DISPLAY_SIDE_PX);
  const rectified = await encodeForDisplay(
    rectifyForDisplay(
      picture,
      viewAtHeight(scene.view, options.thicknessMm),
      scene.widthMm,
      scene.heightMm,
      displayPerMm,
    ),
    DISPLAY_SIDE_PX,
  );
  isStopped(signal);
  timingsMs['total'] = Math.round(performance.now() - began);
  const toDisplay = display.widthPx / picture.widthPx;
  return {
    trace: {
      units: 'mm',
      frame: 'scale-sheet',
      ...shapes,
      method: scene.method,
      pixelsPerMm: pixelsPerMmAt(scene.view, { x: scene.widthMm / 2, y: scene.heightMm / 2 }),
      markersUsed: scene.markersUsed,
      tiltDeg: scene.tiltDeg,
      warnings: [...scene.warnings, ...faintWarning(boundaries[0] ?? [], shapes.outer)],
      timingsMs,
    },
    rectified: {
      jpeg: rectified.jpeg,
      pixelsPerMm: rectified.widthPx / scene.widthMm,
      widthMm: scene.widthMm,
      heightMm: scene.heightMm,
    },
    display,
    photoOutline: boundaries.map((points) =>
      points.map(({ seen }) => {
        const at = scene.view.toPixel(seen.x, seen.y);
        return { x: (at.x + 0.5) * toDisplay - 0.5, y: (at.y + 0.5) * toDisplay - 0.5 };
      }),
    ),
  };
}

/** Says so where a good part of the outline shows no clear edge. */
function faintWarning(outline: readonly BoundaryPoint[], primitives: Trace['outer']): readonly string[] {
  const clear = outline.filter(({ isFaint }) => !isFaint).length * BOUNDARY_STEP_MM;
  const length = primitives.reduce((sum, primitive) => sum + primitiveLengthMm(primitive), 0);
  const faint = Math.round(length - clear);
  return faint > Math.max(FAINT_WORTH_SAYING_MM, FAINT_WORTH_SAYING * length)
    ? [`About ${faint} mm of the outline show no clear edge. Light from more than one side helps.`]
    : [];
}

/** The boundaries without openings that are only marks on the face: their edge is far fainter than the outline's. */
function withoutStains(boundaries: readonly (readonly BoundaryPoint[])[]): readonly (readonly BoundaryPoint[])[] {
  const [outer = []] = boundaries;
  return boundaries.filter(
    (points, index) =>
      index === 0 || (points.length >= LEAST_OPENING_POINTS && medianStep(points) > STAIN_SHARE * medianStep(outer)),
  );
}

function medianStep(points: readonly BoundaryPoint[]): number {
  const steps = points.map(({ step }) => step).sort((a, b) => a - b);
  return steps[steps.length >> 1] ?? 0;
}

function spanMm(points: readonly { readonly x: number; readonly y: number }[]): [number, number] {
  let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x, y } of points) {
    minX = Math.min(minX, x);
    maxX = Math.max(maxX, x);
    minY = Math.min(minY, y);
    maxY = Math.max(maxY, y);
  }
  return points.length === 0 ? [0, 0] : [maxX - minX, maxY - minY];
}
