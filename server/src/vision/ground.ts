import type { PageRaster } from './rectify';
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

/** Writes `value` into every cell whose centre lies in the box. */
function paint(
  mask: Uint8Array,
  raster: PageRaster,
  box: PageBox,
  scale: readonly [number, number],
  value: 0 | 1,
): void {
  const { columns, rows, perMm, heightMm } = raster;
  const firstColumn = Math.max(0, Math.ceil(box.x * scale[0] * perMm - 0.5));
  const lastColumn = Math.min(columns - 1, Math.floor((box.x + box.widthMm) * scale[0] * perMm - 0.5));
  const firstRow = Math.max(0, Math.ceil((heightMm - (box.y + box.heightMm) * scale[1]) * perMm - 0.5));
  const lastRow = Math.min(rows - 1, Math.floor((heightMm - box.y * scale[1]) * perMm - 0.5));
  for (let row = firstRow; row <= lastRow; row++) {
    mask.fill(value, row * columns + firstColumn, row * columns + Math.max(lastColumn + 1, firstColumn));
  }
}

function plan(
  raster: PageRaster,
  area: PageBox,
  bare: readonly PageBox[],
  print: readonly PageBox[],
  scale: readonly [number, number],
): GroundPlan {
  const cells = raster.columns * raster.rows;
  const region = new Uint8Array(cells);
  const seeds = new Uint8Array(cells);
  const printed = new Uint8Array(cells);
  paint(region, raster, area, scale, 1);
  paint(seeds, raster, area, scale, 1);
  paint(seeds, raster, inset(area, SEED_BAND_MM), scale, 0);
  for (const box of bare) paint(seeds, raster, box, scale, 1);
  for (const box of print) paint(printed, raster, box, scale, 1);
  for (let cell = 0; cell < cells; cell++) {
    if (raster.isSeen[cell] !== 1) region[cell] = 0;
    if (region[cell] !== 1) printed[cell] = 0;
    if (region[cell] !== 1 || printed[cell] === 1) seeds[cell] = 0;
  }
  return { region, seeds, printed };
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
    bare.map(({ x, y }) => inset({ x, y, widthMm: MARKER_SIDE_MM, heightMm: MARKER_SIDE_MM }, -inflateMm));
  const words = sheet.wordBoxes.filter((box) => {
    const left = bare.some((m) => m.x < box.x && box.x - m.x < 2 * MARKER_SIDE_MM && Math.abs(m.y - box.y) < 1);
    const right = bare.some((m) => m.x > box.x && m.x - box.x < 4 * MARKER_SIDE_MM && Math.abs(m.y - box.y) < 1);
    return left && right;
  });
  const rulers = sheet.rulers.map((ruler) => inset(ruler, -0.8));
  return plan(
    raster,
    inset(page, RIM_INSET_MM),
    square(QUIET_ZONE_MM),
    [...square(0.6), ...words, ...rulers],
    printScale,
  );
}

/** The ground of anything else that is flat and even: bare along its rim. */
export function groundOfPlainArea(raster: PageRaster, widthMm: number, heightMm: number): GroundPlan {
  return plan(raster, inset({ x: 0, y: 0, widthMm, heightMm }, RIM_INSET_MM), [], [], [1, 1]);
}
