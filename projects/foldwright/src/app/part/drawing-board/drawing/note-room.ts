/** A few words on the metal, or in ink where a large hole shows the bench. */
export interface DrawnNote {
  readonly key: string;
  readonly lines: readonly string[];
  readonly xPx: number;
  readonly yPx: number;
  readonly turnDeg: number;
  readonly anchor: 'start' | 'middle' | 'end';
  /** From the thing to the words, or nothing. */
  readonly leader: string;
  readonly isOnMetal: boolean;
}

/** A part of the screen, px. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Measures of the note's face, px: advance of a letter, line height, height of capitals over the base line. */
export const LETTER_PX = 7.9;
export const LINE_PX = 16;
export const CAPITAL_PX = 11;
/** From a crease to the base line of its words, px: below it, or above. */
export const BELOW_CREASE_PX = 20;
export const ABOVE_CREASE_PX = -9;
/** Lines are taken as chains of boxes of this size, px: words keep clear of them by half of it. */
const LINE_ROOM_PX = 6;

/** What a note covers. Notes are turned by nothing, or about upright; words at a slant count as lying. */
export function noteBox(note: Pick<DrawnNote, 'lines' | 'turnDeg' | 'xPx' | 'yPx' | 'anchor'>): Box {
  const widthPx = Math.max(...note.lines.map((line) => line.length)) * LETTER_PX;
  const heightPx = (note.lines.length - 1) * LINE_PX + CAPITAL_PX + 4;
  if (Math.abs(note.turnDeg) > 45) {
    return {
      left: note.xPx - CAPITAL_PX,
      right: note.xPx + 4,
      top: note.yPx - widthPx / 2,
      bottom: note.yPx + widthPx / 2,
    };
  }
  const left = note.anchor === 'start' ? note.xPx : note.anchor === 'end' ? note.xPx - widthPx : note.xPx - widthPx / 2;
  return { left, right: left + widthPx, top: note.yPx - CAPITAL_PX, bottom: note.yPx - CAPITAL_PX + heightPx };
}

/** What a straight line covers: boxes along it, so that a line at a slant doesn't take the whole corner. */
export function boxesAlong(
  from: { readonly xPx: number; readonly yPx: number },
  to: { readonly xPx: number; readonly yPx: number },
): readonly Box[] {
  const count = Math.max(1, Math.ceil(Math.hypot(to.xPx - from.xPx, to.yPx - from.yPx) / LINE_ROOM_PX));
  return Array.from({ length: count + 1 }, (_, at) => {
    const x = from.xPx + ((to.xPx - from.xPx) * at) / count;
    const y = from.yPx + ((to.yPx - from.yPx) * at) / count;
    const half = LINE_ROOM_PX / 2;
    return { left: x - half, right: x + half, top: y - half, bottom: y + half };
  });
}

/** Whether a box covers nothing that is taken. */
export function isFree(box: Box, taken: readonly Box[]): boolean {
  return taken.every(
    (other) =>
      Math.min(box.right, other.right) <= Math.max(box.left, other.left) ||
      Math.min(box.bottom, other.bottom) <= Math.max(box.top, other.top),
  );
}
