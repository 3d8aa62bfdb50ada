import { cameraCentre, cameraTiltDeg, projectPoint } from './camera';
import { groundOfPlainArea } from './ground';
import type { Picture } from './picture';
import type { ScaleSource } from './reading-options';
import type { Scene } from './scene';
import { solveCamera } from './solve-camera';
import { TraceRefusal } from './trace-refusal';
import { pixelsPerMmAt, type View } from './view';

type PlainScale = Exclude<ScaleSource, { readonly kind: 'markers' }>;

const MM_PER_INCH = 25.4;
const USUAL_BLUR_PX = 1;

/** Pixels of a picture taken square from above: origin at its lower-left corner. */
function squareView(picture: Picture, perMm: number): View {
  return { toPixel: (x, y) => ({ x: x * perMm - 0.5, y: picture.heightPx - y * perMm - 0.5 }), eye: null };
}

function sceneFromAbove(picture: Picture, perMm: number): Pick<Scene, 'view' | 'widthMm' | 'heightMm' | 'ground'> {
  const widthMm = picture.widthPx / perMm;
  const heightMm = picture.heightPx / perMm;
  return {
    view: squareView(picture, perMm),
    widthMm,
    heightMm,
    ground: (raster) => groundOfPlainArea(raster, widthMm, heightMm),
  };
}

/**
 * The scene of a photo whose scale does not come from a scale sheet.
 *
 * @throws TraceRefusal when four corners do not make a rectangle seen from anywhere.
 */
export function plainView(picture: Picture, focal35Mm: number | null, scale: PlainScale): Scene {
  const common = { markersUsed: 0, blurPx: USUAL_BLUR_PX };
  if (scale.kind === 'scan') {
    return {
      ...common,
      ...sceneFromAbove(picture, scale.dpi / MM_PER_INCH),
      method: 'scan',
      tiltDeg: 0,
      warnings: [`The scale is the scanner's: ${scale.dpi} dpi as typed. Check one length.`],
      doubt: { cameraMm: 0.05, printShare: 0.001 },
    };
  }
  if (scale.kind === 'two-points') {
    const distancePx = Math.hypot(scale.to.x - scale.from.x, scale.to.y - scale.from.y);
    return {
      ...common,
      ...sceneFromAbove(picture, distancePx / scale.distanceMm),
      method: 'two-points',
      tiltDeg: 0,
      warnings: [
        'Rough: two points cannot tell how far the camera leaned. Three degrees already cost half a millimetre.',
      ],
      doubt: { cameraMm: 0.5, printShare: 0.01 },
    };
  }
  const { widthMm, heightMm, corners } = scale;
  const onPage = [
    { x: 0, y: 0 },
    { x: widthMm, y: 0 },
    { x: widthMm, y: heightMm },
    { x: 0, y: heightMm },
  ];
  const sightings = onPage.map((page, k) => ({ page, seen: corners[k as 0 | 1 | 2 | 3], group: k }));
  const solved = solveCamera(sightings, {
    widthPx: picture.widthPx,
    heightPx: picture.heightPx,
    focal35Mm,
    solvesLens: false,
  });
  if (!solved) throw new TraceRefusal('tooFewMarkers', 'The four corners do not make a rectangle.');
  const { camera } = solved;
  const view: View = { toPixel: (x, y) => projectPoint(camera, x, y, 0), eye: cameraCentre(camera) };
  const missMm = solved.rmsPx / pixelsPerMmAt(view, { x: widthMm / 2, y: heightMm / 2 });
  return {
    ...common,
    view,
    widthMm,
    heightMm,
    ground: (raster) => groundOfPlainArea(raster, widthMm, heightMm),
    method: 'rectangle',
    tiltDeg: cameraTiltDeg(camera),
    warnings: ["Four corners say nothing about the lens: expect 0.5 to 1.5 mm with a telephone's camera."],
    doubt: { cameraMm: 0.4 + missMm, printShare: 0.002 },
  };
}
