import { findDarkQuads, type Quad, type PixelPoint } from './dark-quads';
import { CODE_SIDE_CELLS, codeDistance, codeTurns, mirrorCode } from './marker-code-search';
import { CORRECTABLE_CELLS, MARKER_CODES } from './marker-codes';
import type { GreyPicture } from './picture';
import { MARKER_SIDE_CELLS } from './scale-sheet-layout';
import { quadToSquare } from './quad-map';

/** A marker in the picture: its corners from the printed marker's top left, clockwise as printed, in pixels. */
export interface FoundMarker {
  readonly id: number;
  readonly corners: Quad;
}

export interface MarkerSearch {
  readonly markers: readonly FoundMarker[];
  /** Markers that read only in a mirror. */
  readonly mirroredCount: number;
}

interface TurnedCode {
  readonly id: number;
  readonly turns: number;
  readonly code: number;
}

const UPRIGHT: readonly TurnedCode[] = MARKER_CODES.flatMap((code, id) =>
  codeTurns(code).map((turned, turns) => ({ id, turns, code: turned })),
);
const MIRRORED: readonly TurnedCode[] = MARKER_CODES.flatMap((code, id) =>
  codeTurns(mirrorCode(code)).map((turned, turns) => ({ id, turns, code: turned })),
);

/** Rim cells that may look light before the quad is no marker. */
const MAX_RIM_ERRORS = 3;
const MIN_CONTRAST = 24;

function nearestCode(codes: readonly TurnedCode[], seen: number, withinCells: number): TurnedCode | null {
  return codes.find((candidate) => codeDistance(candidate.code, seen) <= withinCells) ?? null;
}

/** Mean grey of each of the 7 x 7 cells, row by row. */
function readCells(picture: GreyPicture, quad: Quad): readonly number[] {
  const toPixel = quadToSquare(quad, MARKER_SIDE_CELLS);
  const cells: number[] = [];
  for (let row = 0; row < MARKER_SIDE_CELLS; row++) {
    for (let column = 0; column < MARKER_SIDE_CELLS; column++) {
      let sum = 0;
      for (const dy of [0.3, 0.5, 0.7]) {
        for (const dx of [0.3, 0.5, 0.7]) {
          const at = toPixel(column + dx, row + dy);
          const x = Math.min(Math.max(Math.round(at.x), 0), picture.widthPx - 1);
          const y = Math.min(Math.max(Math.round(at.y), 0), picture.heightPx - 1);
          sum += picture.grey[y * picture.widthPx + x] ?? 0;
        }
      }
      cells.push(sum / 9);
    }
  }
  return cells;
}

/** The code as read with the quad's first corner as the top left, or `null` when the rim is not dark. */
function readCode(picture: GreyPicture, quad: Quad): number | null {
  const cells = readCells(picture, quad);
  const darkest = Math.min(...cells);
  const lightest = Math.max(...cells);
  if (lightest - darkest < MIN_CONTRAST) return null;
  const threshold = (darkest + lightest) / 2;
  let code = 0;
  let rimErrors = 0;
  cells.forEach((value, index) => {
    const row = Math.floor(index / MARKER_SIDE_CELLS) - 1;
    const column = (index % MARKER_SIDE_CELLS) - 1;
    const isRim = row < 0 || column < 0 || row >= CODE_SIDE_CELLS || column >= CODE_SIDE_CELLS;
    if (isRim) rimErrors += value > threshold ? 1 : 0;
    else if (value > threshold) code |= 1 << (row * CODE_SIDE_CELLS + column);
  });
  return rimErrors <= MAX_RIM_ERRORS ? code : null;
}

function turnQuad(quad: Quad, turns: number): Quad {
  const corner = (k: number): PixelPoint => quad[((k + turns) % 4) as 0 | 1 | 2 | 3];
  return [corner(0), corner(1), corner(2), corner(3)];
}

/** Looks for our markers in a grey picture. Corners are good to about a pixel of that picture. */
export function findMarkers(picture: GreyPicture): MarkerSearch {
  const byId = new Map<number, FoundMarker>();
  let mirroredCount = 0;
  for (const quad of findDarkQuads(picture)) {
    const seen = readCode(picture, quad);
    if (seen === null) continue;
    const match = nearestCode(UPRIGHT, seen, CORRECTABLE_CELLS - 1);
    if (match) {
      if (!byId.has(match.id)) byId.set(match.id, { id: match.id, corners: turnQuad(quad, match.turns) });
    } else if (nearestCode(MIRRORED, seen, 1)) {
      mirroredCount++;
    }
  }
  return { markers: [...byId.values()].sort((a, b) => a.id - b.id), mirroredCount };
}
