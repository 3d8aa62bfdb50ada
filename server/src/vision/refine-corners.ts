import type { PixelPoint, Quad } from './dark-quads';
import { isInside, type Picture, sampleLuminance } from './picture';
import { MARKER_SIDE_CELLS } from './scale-sheet-layout';

/** A marker's corners to a few hundredths of a pixel, and how sharp its edges are. */
export interface RefinedMarker {
  readonly id: number;
  readonly corners: Quad;
  /** Standard deviation of the blur over its edges, pixels. */
  readonly blurPx: number;
}

interface SideLine {
  readonly nx: number;
  readonly ny: number;
  readonly offset: number;
}

const SAMPLES_ALONG = 28;
const KEEP_CLEAR = 0.1;
const STEP_PX = 0.5;

interface EdgePoint extends PixelPoint {
  readonly blurPx: number;
}

/** Where light passes half way between dark and light along a normal, or `null` where there is no clean edge. */
function edgeOnProfile(
  picture: Picture,
  x: number,
  y: number,
  nx: number,
  ny: number,
  reach: number,
): EdgePoint | null {
  if (!isInside(picture, x - nx * reach, y - ny * reach) || !isInside(picture, x + nx * reach, y + ny * reach))
    return null;
  const count = 2 * Math.round(reach / STEP_PX) + 1;
  const light: number[] = [];
  for (let k = 0; k < count; k++) {
    const s = (k - (count - 1) / 2) * STEP_PX;
    light.push(sampleLuminance(picture, x + nx * s, y + ny * s));
  }
  const third = Math.max(2, Math.floor(count / 5));
  const mean = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
  const dark = mean(light.slice(0, third));
  const bright = mean(light.slice(-third));
  const contrast = bright - dark;
  if (contrast < 0.02 || bright < 1.5 * dark) return null;
  const half = (dark + bright) / 2;
  let steepest = 0;
  let found: number | null = null;
  for (let k = 1; k < count; k++) {
    const a = light[k - 1] ?? 0;
    const b = light[k] ?? 0;
    steepest = Math.max(steepest, b - a);
    if (found === null && a < half && b >= half) found = k - 1 + (half - a) / (b - a);
  }
  if (found === null) return null;
  const s = (found - (count - 1) / 2) * STEP_PX;
  return { x: x + nx * s, y: y + ny * s, blurPx: (contrast * STEP_PX) / (steepest * Math.sqrt(2 * Math.PI)) };
}

function fitLine(points: readonly PixelPoint[]): SideLine {
  const count = points.length;
  const mx = points.reduce((sum, p) => sum + p.x, 0) / count;
  const my = points.reduce((sum, p) => sum + p.y, 0) / count;
  let sxx = 0;
  let sxy = 0;
  let syy = 0;
  for (const p of points) {
    sxx += (p.x - mx) ** 2;
    sxy += (p.x - mx) * (p.y - my);
    syy += (p.y - my) ** 2;
  }
  const turn = 0.5 * Math.atan2(2 * sxy, sxx - syy);
  const nx = -Math.sin(turn);
  const ny = Math.cos(turn);
  return { nx, ny, offset: nx * mx + ny * my };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? 0;
}

/** Line through the edge points with stragglers left out; `null` when too few stay. */
function robustLine(points: readonly EdgePoint[]): SideLine | null {
  let kept: readonly EdgePoint[] = points;
  for (let round = 0; round < 3; round++) {
    if (kept.length < SAMPLES_ALONG / 2) return null;
    const line = fitLine(kept);
    const off = (p: PixelPoint): number => Math.abs(line.nx * p.x + line.ny * p.y - line.offset);
    const limit = Math.max(0.15, 3 * median(kept.map(off)));
    const next = points.filter((p) => off(p) <= limit);
    if (next.length === kept.length) return line;
    kept = next;
  }
  return kept.length < SAMPLES_ALONG / 2 ? null : fitLine(kept);
}

function meet(a: SideLine, b: SideLine): PixelPoint | null {
  const determinant = a.nx * b.ny - a.ny * b.nx;
  if (Math.abs(determinant) < 0.05) return null;
  return {
    x: (a.offset * b.ny - b.offset * a.ny) / determinant,
    y: (a.nx * b.offset - b.nx * a.offset) / determinant,
  };
}

function refineOnce(picture: Picture, corners: Quad): { corners: Quad; blurPx: number } | null {
  const lines: SideLine[] = [];
  const blurs: number[] = [];
  for (let side = 0; side < 4; side++) {
    const a = corners[side as 0 | 1 | 2 | 3];
    const b = corners[((side + 1) % 4) as 0 | 1 | 2 | 3];
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    // Clockwise as seen, y down: the outside is to the left of the way.
    const nx = (b.y - a.y) / length;
    const ny = -(b.x - a.x) / length;
    const reach = Math.max(3, 0.75 * (length / MARKER_SIDE_CELLS));
    const points: EdgePoint[] = [];
    for (let k = 0; k < SAMPLES_ALONG; k++) {
      const share = KEEP_CLEAR + ((1 - 2 * KEEP_CLEAR) * (k + 0.5)) / SAMPLES_ALONG;
      const edge = edgeOnProfile(picture, a.x + (b.x - a.x) * share, a.y + (b.y - a.y) * share, nx, ny, reach);
      if (edge) points.push(edge);
    }
    const line = robustLine(points);
    if (!line) return null;
    lines.push(line);
    blurs.push(median(points.map((p) => p.blurPx)));
  }
  const refined: PixelPoint[] = [];
  for (let corner = 0; corner < 4; corner++) {
    const before = lines[(corner + 3) % 4];
    const after = lines[corner];
    const at = before && after ? meet(before, after) : null;
    if (!at) return null;
    refined.push(at);
  }
  const [c0, c1, c2, c3] = refined;
  return c0 && c1 && c2 && c3 ? { corners: [c0, c1, c2, c3], blurPx: median(blurs) } : null;
}

/**
 * Corners of one marker by lines fitted to its four edges in linear light at full resolution; `null` where an edge is
 * covered, out of the picture or without contrast.
 */
export function refineMarker(picture: Picture, id: number, rough: Quad): RefinedMarker | null {
  const first = refineOnce(picture, rough);
  const second = first && refineOnce(picture, first.corners);
  return second && { id, ...second };
}
