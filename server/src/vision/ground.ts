import { cellCentre, type PageRaster } from './rectify';
import { MARKER_SIDE_MM, type PageBox, QUIET_ZONE_MM, type ScaleSheetLayout } from './scale-sheet-layout';

/** What is known about the ground before anything is looked at. */
export interface GroundPlan {
  /** One where the template may lie and the photo shows the page. */
  readonly region: Uint8Array;
  /** One where bare ground is expected. */
  readonly seeds: Uint8Array;
  /** One where something is printed that must not be taken for a template. */
  readonly printed: Uint8Array;
}

/** Paper edges are never quite where they should be. */
const RIM_INSET_MM = 1.5;
const SEED_BAND_MM = 2;

function covers(box: PageBox, x: number, y: number, marginMm: number): boolean {
  return (
    x >= box.x - marginMm && x <= box.x + box.widthMm + marginMm && y >= box.y - marginMm && y <= box.y + box.heightMm + marginMm
  );
}

function plan(
  raster: PageRaster,
  region: PageBox,
  seeds: readonly PageBox[],
  printed: readonly PageBox[],
  scale: readonly [number, number],
): GroundPlan {
  const result = {
    region: new Uint8Array(raster.columns * raster.rows),
    seeds: new Uint8Array(raster.columns * raster.rows),
    printed: new Uint8Array(raster.columns * raster.rows),
  };
  for (let row = 0; row < raster.rows; row++) {
    for (let column = 0; column < raster.columns; column++) {
      const cell = row * raster.columns + column;
      const centre = cellCentre(raster, column, row);
      const x = centre.x / scale[0];
      const y = centre.y / scale[1];
      if (raster.isSeen[cell] !== 1 || !covers(region, x, y, 0)) continue;
      result.region[cell] = 1;
      if (printed.some((box) => covers(box, x, y, 0))) result.printed[cell] = 1;
      else if (!covers(region, x, y, -SEED_BAND_MM) || seeds.some((box) => covers(box, x, y, 0))) result.seeds[cell] = 1;
    }
  }
  return result;
}

function inset(box: PageBox, by: number): PageBox {
  return { x: box.x + by, y: box.y + by, widthMm: box.widthMm - 2 * by, heightMm: box.heightMm - 2 * by };
}

/** The ground of a scale sheet. `seenMarkers` are the ids found bare: what is printed round them is bare too. */
export function groundOfScaleSheet(
  raster: PageRaster,
  sheet: ScaleSheetLayout,
  seenMarkers: ReadonlySet<number>,
  printScale: readonly [number, number],
): GroundPlan {
  const page = { x: 0, y: 0, widthMm: sheet.widthMm, heightMm: sheet.heightMm };
  if (sheet.variant === 'dark') {
    // The dark ground begins a millimetre inside the work area.
    return plan(raster, inset(sheet.workArea, 1 + RIM_INSET_MM), [], [], printScale);
  }
  const bare = sheet.markers.filter((marker) => seenMarkers.has(marker.id));
  const square = (inflateMm: number): readonly PageBox[] =>
    bare.map(({ x, y }) =>
      inset({ x, y, widthMm: MARKER_SIDE_MM, heightMm: MARKER_SIDE_MM }, -inflateMm),
    );
  const words = sheet.wordBoxes.filter((box) => {
    const left = bare.some((m) => m.x < box.x && box.x - m.x < 2 * MARKER_SIDE_MM && Math.abs(m.y - box.y) < 1);
    const right = bare.some((m) => m.x > box.x && m.x - box.x < 4 * MARKER_SIDE_MM && Math.abs(m.y - box.y) < 1);
    return left && right;
  });
  const rulers = sheet.rulers.map((ruler) => inset(ruler, -0.8));
  return plan(raster, inset(page, RIM_INSET_MM), square(QUIET_ZONE_MM), [...square(0.6), ...words, ...rulers], printScale);
}

/** The ground of anything else that is flat and even: bare along its rim. */
export function groundOfPlainArea(raster: PageRaster, widthMm: number, heightMm: number): GroundPlan {
  return plan(raster, inset({ x: 0, y: 0, widthMm, heightMm }, RIM_INSET_MM), [], [], [1, 1]);
}
