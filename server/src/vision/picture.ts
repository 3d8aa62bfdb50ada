/** An upright photo as stored: sRGB bytes, three a pixel, rows from the top. (0, 0) is the middle of the first pixel. */
export interface Picture {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly rgb: Uint8Array;
}

/** One value a pixel, 0 to 255. */
export interface GreyPicture {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly grey: Uint8Array;
}

/** Linear light (0..1) of every sRGB code value. IEC 61966-2-1. */
export const LINEAR_OF_CODE: Float32Array = Float32Array.from({ length: 256 }, (_, code) => {
  const share = code / 255;
  return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
});

/** Weights of linear red, green and blue in luminance (ITU-R BT.709). */
const LUMINANCE: readonly [number, number, number] = [0.2126, 0.7152, 0.0722];

/** Whether a bilinear sample at this place lies inside the picture. */
export function isInside(picture: Picture, x: number, y: number): boolean {
  return x >= 0 && y >= 0 && x < picture.widthPx - 1 && y < picture.heightPx - 1;
}

/** Linear red, green and blue at a fractional pixel, bilinear, into `out` at `at`; beyond the rim, the rim's. */
export function sampleLinear(picture: Picture, x: number, y: number, out: Float32Array, at: number): void {
  const column = Math.min(Math.max(Math.floor(x), 0), picture.widthPx - 2);
  const row = Math.min(Math.max(Math.floor(y), 0), picture.heightPx - 2);
  const fx = Math.min(Math.max(x - column, 0), 1);
  const fy = Math.min(Math.max(y - row, 0), 1);
  const first = (row * picture.widthPx + column) * 3;
  const below = first + picture.widthPx * 3;
  const rgb = picture.rgb;
  for (let channel = 0; channel < 3; channel++) {
    const a = LINEAR_OF_CODE[rgb[first + channel] ?? 0] ?? 0;
    const b = LINEAR_OF_CODE[rgb[first + 3 + channel] ?? 0] ?? 0;
    const c = LINEAR_OF_CODE[rgb[below + channel] ?? 0] ?? 0;
    const d = LINEAR_OF_CODE[rgb[below + 3 + channel] ?? 0] ?? 0;
    out[at + channel] = (a * (1 - fx) + b * fx) * (1 - fy) + (c * (1 - fx) + d * fx) * fy;
  }
}

const SCRATCH = new Float32Array(3);

/** Linear luminance at a fractional pixel. */
export function sampleLuminance(picture: Picture, x: number, y: number): number {
  sampleLinear(picture, x, y, SCRATCH, 0);
  return LUMINANCE[0] * (SCRATCH[0] ?? 0) + LUMINANCE[1] * (SCRATCH[1] ?? 0) + LUMINANCE[2] * (SCRATCH[2] ?? 0);
}

/** Grey picture smaller by a whole factor, each pixel the mean of its block. */
export function shrinkToGrey(picture: Picture, factor: number): GreyPicture {
  const widthPx = Math.floor(picture.widthPx / factor);
  const heightPx = Math.floor(picture.heightPx / factor);
  const grey = new Uint8Array(widthPx * heightPx);
  const sums = new Uint32Array(widthPx);
  const scale = 1 / (256 * factor * factor);
  for (let row = 0; row < heightPx; row++) {
    sums.fill(0);
    for (let sub = 0; sub < factor; sub++) {
      let at = (row * factor + sub) * picture.widthPx * 3;
      for (let column = 0; column < widthPx; column++) {
        let sum = 0;
        for (let k = 0; k < factor; k++, at += 3) {
          sum += 54 * (picture.rgb[at] ?? 0) + 183 * (picture.rgb[at + 1] ?? 0) + 19 * (picture.rgb[at + 2] ?? 0);
        }
        sums[column] = (sums[column] ?? 0) + sum;
      }
    }
    for (let column = 0; column < widthPx; column++) grey[row * widthPx + column] = (sums[column] ?? 0) * scale;
  }
  return { widthPx, heightPx, grey };
}
