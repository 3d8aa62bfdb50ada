import type { Point } from '@foldwright/shared/geometry/point';
import { type Picture, sampleLinear } from './picture';
import type { View } from './view';

/** The page squared up: a raster over it, row 0 at the top of the page. Cell (c, r) is centred at
 * x = (c + 0.5) / perMm, y = heightMm - (r + 0.5) / perMm. */
export interface PageRaster {
  readonly columns: number;
  readonly rows: number;
  readonly perMm: number;
  readonly heightMm: number;
  /** Natural logarithms of linear red, green and blue, three a cell. */
  readonly logRgb: Float32Array;
  /** One where the photo shows the cell. */
  readonly isSeen: Uint8Array;
}

/** Added before the logarithm: keeps the noise of dark print from counting as contrast. */
const DARK_FLOOR = 0.015;
const BLOCK = 8;

export function cellCentre(raster: PageRaster, column: number, row: number): Point {
  return { x: (column + 0.5) / raster.perMm, y: raster.heightMm - (row + 0.5) / raster.perMm };
}

/** Squares up the page at `perMm` cells a millimetre, each cell the mean of two samples across its diagonal. */
export function rectify(picture: Picture, view: View, widthMm: number, heightMm: number, perMm: number): PageRaster {
  const columns = Math.max(1, Math.round(widthMm * perMm));
  const rows = Math.max(1, Math.round(heightMm * perMm));
  const logRgb = new Float32Array(columns * rows * 3);
  const isSeen = new Uint8Array(columns * rows);
  const sample = new Float32Array(3);
  const at = (c: number, r: number): { x: number; y: number } =>
    view.toPixel((c + 0.5) / perMm, heightMm - (r + 0.5) / perMm);
  for (let blockRow = 0; blockRow < rows; blockRow += BLOCK) {
    for (let blockColumn = 0; blockColumn < columns; blockColumn += BLOCK) {
      // Over eight cells a bilinear map misses the true one by less than a tenth of a cell.
      const p00 = at(blockColumn, blockRow);
      const p10 = at(blockColumn + BLOCK, blockRow);
      const p01 = at(blockColumn, blockRow + BLOCK);
      const p11 = at(blockColumn + BLOCK, blockRow + BLOCK);
      for (let r = blockRow; r < Math.min(blockRow + BLOCK, rows); r++) {
        for (let c = blockColumn; c < Math.min(blockColumn + BLOCK, columns); c++) {
          let red = 0;
          let green = 0;
          let blue = 0;
          let isInside = true;
          for (let k = 0; k < 2; k++) {
            const u = (c - blockColumn + k * 0.5 - 0.25) / BLOCK;
            const v = (r - blockRow + k * 0.5 - 0.25) / BLOCK;
            const x = (p00.x * (1 - u) + p10.x * u) * (1 - v) + (p01.x * (1 - u) + p11.x * u) * v;
            const y = (p00.y * (1 - u) + p10.y * u) * (1 - v) + (p01.y * (1 - u) + p11.y * u) * v;
            isInside &&= x >= 0 && y >= 0 && x <= picture.widthPx - 1 && y <= picture.heightPx - 1;
            sampleLinear(picture, x, y, sample, 0);
            red += sample[0] ?? 0;
            green += sample[1] ?? 0;
            blue += sample[2] ?? 0;
          }
          const cell = r * columns + c;
          logRgb[cell * 3] = Math.log(red / 2 + DARK_FLOOR);
          logRgb[cell * 3 + 1] = Math.log(green / 2 + DARK_FLOOR);
          logRgb[cell * 3 + 2] = Math.log(blue / 2 + DARK_FLOOR);
          isSeen[cell] = isInside ? 1 : 0;
        }
      }
    }
  }
  return { columns, rows, perMm, heightMm, logRgb, isSeen };
}

/** The page squared up for the eye: sRGB bytes, bilinear. */
export function rectifyForDisplay(
  picture: Picture,
  view: View,
  widthMm: number,
  heightMm: number,
  perMm: number,
): Picture {
  const widthPx = Math.max(1, Math.round(widthMm * perMm));
  const heightPx = Math.max(1, Math.round(heightMm * perMm));
  const rgb = new Uint8Array(widthPx * heightPx * 3);
  const stride = picture.widthPx * 3;
  for (let blockRow = 0; blockRow < heightPx; blockRow += BLOCK) {
    for (let blockColumn = 0; blockColumn < widthPx; blockColumn += BLOCK) {
      const x0 = (blockColumn + 0.5) / perMm;
      const x1 = (blockColumn + BLOCK + 0.5) / perMm;
      const y0 = heightMm - (blockRow + 0.5) / perMm;
      const y1 = heightMm - (blockRow + BLOCK + 0.5) / perMm;
      const [p00, p10, p01, p11] = [
        view.toPixel(x0, y0),
        view.toPixel(x1, y0),
        view.toPixel(x0, y1),
        view.toPixel(x1, y1),
      ];
      for (let r = blockRow; r < Math.min(blockRow + BLOCK, heightPx); r++) {
        const v = (r - blockRow) / BLOCK;
        for (let c = blockColumn; c < Math.min(blockColumn + BLOCK, widthPx); c++) {
          const u = (c - blockColumn) / BLOCK;
          const x = (p00.x * (1 - u) + p10.x * u) * (1 - v) + (p01.x * (1 - u) + p11.x * u) * v;
          const y = (p00.y * (1 - u) + p10.y * u) * (1 - v) + (p01.y * (1 - u) + p11.y * u) * v;
          if (!(x >= 0 && y >= 0 && x < picture.widthPx - 1 && y < picture.heightPx - 1)) continue;
          const column = Math.floor(x);
          const row = Math.floor(y);
          const fx = x - column;
          const fy = y - row;
          const from = row * stride + column * 3;
          const to = (r * widthPx + c) * 3;
          for (let k = from; k < from + 3; k++) {
            const upper = (picture.rgb[k] ?? 0) * (1 - fx) + (picture.rgb[k + 3] ?? 0) * fx;
            const lower = (picture.rgb[k + stride] ?? 0) * (1 - fx) + (picture.rgb[k + stride + 3] ?? 0) * fx;
            rgb[to + k - from] = upper * (1 - fy) + lower * fy + 0.5;
          }
        }
      }
    }
  }
  return { widthPx, heightPx, rgb };
}
