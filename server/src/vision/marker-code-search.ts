/** Side of a code, cells. A marker adds one dark cell all round. */
export const CODE_SIDE_CELLS = 5;
const CELLS = CODE_SIDE_CELLS * CODE_SIDE_CELLS;
const CENTRE_BIT = 1 << ((CELLS - 1) / 2);

/** Cell (row, column) of a code; row 0 is the top row of the upright marker. A set bit is a light cell. */
export function codeCell(code: number, row: number, column: number): boolean {
  return ((code >>> (row * CODE_SIDE_CELLS + column)) & 1) === 1;
}

function mapCells(code: number, from: (row: number, column: number) => readonly [number, number]): number {
  let mapped = 0;
  for (let row = 0; row < CODE_SIDE_CELLS; row++) {
    for (let column = 0; column < CODE_SIDE_CELLS; column++) {
      const [sourceRow, sourceColumn] = from(row, column);
      if (codeCell(code, sourceRow, sourceColumn)) mapped |= 1 << (row * CODE_SIDE_CELLS + column);
    }
  }
  return mapped;
}

/** The code as seen when the marker is turned a quarter clockwise. */
export function turnCode(code: number): number {
  return mapCells(code, (row, column) => [CODE_SIDE_CELLS - 1 - column, row]);
}

/** The code as seen in a mirror that swaps left and right. */
export function mirrorCode(code: number): number {
  return mapCells(code, (row, column) => [row, CODE_SIDE_CELLS - 1 - column]);
}

/** Count of cells in which two codes differ. */
export function codeDistance(a: number, b: number): number {
  let bits = a ^ b;
  let count = 0;
  for (; bits !== 0; bits &= bits - 1) count++;
  return count;
}

/** The four quarter turns of a code, the code itself first. */
export function codeTurns(code: number): readonly number[] {
  const turns = [code];
  for (let turn = 1; turn < 4; turn++) turns.push(turnCode(turns[turn - 1] ?? code));
  return turns;
}

/** Repeatable stream of 32-bit numbers (xorshift, Marsaglia 2003: shifts 13, 17, 5). */
function seededBits(seed: number): () => number {
  let state = seed | 0 || 1;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return state >>> 0;
  };
}

export interface CodeSearch {
  readonly seed: number;
  readonly count: number;
  /** Least distance between any two codes in any turn, and between a code and its own turns. */
  readonly distance: number;
  /** Least distance of a mirrored code to every code: keeps a mirrored print recognisable. */
  readonly mirrorDistance: number;
}

/**
 * Words closed under addition (xor) and under quarter turns, all at least `distance` light cells heavy. Two words of
 * such a set differ in a third word of the set, so the least weight is the least distance, turned or not.
 */
function growClosedSet(nextBits: () => number, distance: number, patience: number): readonly number[] {
  let words = [0];
  for (let failures = 0; failures < patience;) {
    const seedWord = nextBits() & ((1 << CELLS) - 1) & ~CENTRE_BIT;
    let grown = words;
    for (const turn of codeTurns(seedWord)) {
      if (grown.includes(turn)) continue;
      const shifted = grown.map((word) => word ^ turn);
      grown = shifted.some((word) => codeDistance(word, 0) < distance) ? [] : [...grown, ...shifted];
      if (grown.length === 0) break;
    }
    if (grown.length > words.length) words = grown;
    else failures++;
  }
  return words;
}

/** Count of neighbouring cells that differ: plain patterns look like print or dirt. */
function changes(code: number): number {
  let count = 0;
  for (let row = 0; row < CODE_SIDE_CELLS; row++) {
    for (let column = 0; column < CODE_SIDE_CELLS; column++) {
      if (column > 0 && codeCell(code, row, column) !== codeCell(code, row, column - 1)) count++;
      if (row > 0 && codeCell(code, row, column) !== codeCell(code, row - 1, column)) count++;
    }
  }
  return count;
}

/**
 * Marker codes found by a seeded search; the same search gives the same codes in the same order.
 *
 * @throws RangeError when the search cannot reach `count` codes at these distances.
 */
export function searchMarkerCodes(search: CodeSearch): readonly number[] {
  const nextBits = seededBits(search.seed);
  const words = growClosedSet(nextBits, search.distance, 20000);
  const busyFirst = [...words].sort((a, b) => changes(b) - changes(a) || a - b);
  const codes: number[] = [];
  const taken = new Set<number>();
  for (const word of busyFirst) {
    if (codes.length === search.count) break;
    const turns = codeTurns(word);
    if (turns.some((turn) => taken.has(turn))) continue;
    if (turns.some((turn, index) => index > 0 && codeDistance(word, turn) < search.distance)) continue;
    const mirrored = mirrorCode(word);
    const ownMirror = Math.min(...turns.map((turn) => codeDistance(mirrored, turn)));
    if (ownMirror < search.mirrorDistance) continue;
    if (codes.some((code) => codeTurns(code).some((turn) => codeDistance(mirrored, turn) < search.mirrorDistance))) {
      continue;
    }
    codes.push(word);
    for (const turn of turns) taken.add(turn);
  }
  if (codes.length < search.count) throw new RangeError(`only ${codes.length} of ${search.count} codes found`);
  return codes;
}
