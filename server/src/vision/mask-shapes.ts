/** A mask by a rule about each cell. */
export function maskOf(length: number, holds: (cell: number) => boolean): Uint8Array {
  const mask = new Uint8Array(length);
  for (let cell = 0; cell < length; cell++) if (holds(cell)) mask[cell] = 1;
  return mask;
}

/** A connected patch of a mask. */
export interface Patch {
  readonly label: number;
  readonly cells: number;
  readonly minColumn: number;
  readonly maxColumn: number;
  readonly minRow: number;
  readonly maxRow: number;
}

export interface Labels {
  /** Zero outside the mask, the patch's label inside. */
  readonly labels: Int32Array;
  /** Largest first. */
  readonly patches: readonly Patch[];
}

/** Four-connected patches of the cells where `mask` is `value`. */
export function labelPatches(mask: Uint8Array, columns: number, rows: number, value: 0 | 1): Labels {
  const labels = new Int32Array(mask.length);
  const patches: Patch[] = [];
  const stack = new Int32Array(mask.length);
  for (let start = 0; start < mask.length; start++) {
    if (mask[start] !== value || labels[start] !== 0) continue;
    const label = patches.length + 1;
    let size = 0;
    let [minColumn, maxColumn, minRow, maxRow] = [columns, 0, rows, 0];
    let depth = 0;
    stack[depth++] = start;
    labels[start] = label;
    while (depth > 0) {
      const at = stack[--depth] ?? 0;
      const column = at % columns;
      const row = (at - column) / columns;
      size++;
      if (column < minColumn) minColumn = column;
      if (column > maxColumn) maxColumn = column;
      if (row < minRow) minRow = row;
      if (row > maxRow) maxRow = row;
      if (column > 0 && mask[at - 1] === value && labels[at - 1] === 0) {
        labels[at - 1] = label;
        stack[depth++] = at - 1;
      }
      if (column + 1 < columns && mask[at + 1] === value && labels[at + 1] === 0) {
        labels[at + 1] = label;
        stack[depth++] = at + 1;
      }
      if (row > 0 && mask[at - columns] === value && labels[at - columns] === 0) {
        labels[at - columns] = label;
        stack[depth++] = at - columns;
      }
      if (row + 1 < rows && mask[at + columns] === value && labels[at + columns] === 0) {
        labels[at + columns] = label;
        stack[depth++] = at + columns;
      }
    }
    patches.push({ label, cells: size, minColumn, maxColumn, minRow, maxRow });
  }
  return { labels, patches: patches.sort((a, b) => b.cells - a.cells) };
}

/** Mean over a square of 2 reach + 1 cells, by running sums; outside the raster counts as zero. */
export function boxMean(values: Float32Array, columns: number, rows: number, reach: number): Float32Array {
  const across = new Float32Array(values.length);
  const result = new Float32Array(values.length);
  const share = 1 / (2 * reach + 1);
  for (let r = 0; r < rows; r++) {
    let sum = 0;
    const base = r * columns;
    for (let c = 0; c < Math.min(reach, columns); c++) sum += values[base + c] ?? 0;
    for (let c = 0; c < columns; c++) {
      if (c + reach < columns) sum += values[base + c + reach] ?? 0;
      if (c - reach - 1 >= 0) sum -= values[base + c - reach - 1] ?? 0;
      across[base + c] = sum * share;
    }
  }
  for (let c = 0; c < columns; c++) {
    let sum = 0;
    for (let r = 0; r < Math.min(reach, rows); r++) sum += across[r * columns + c] ?? 0;
    for (let r = 0; r < rows; r++) {
      if (r + reach < rows) sum += across[(r + reach) * columns + c] ?? 0;
      if (r - reach - 1 >= 0) sum -= across[(r - reach - 1) * columns + c] ?? 0;
      result[r * columns + c] = sum * share;
    }
  }
  return result;
}

/** Cells whose whole square of 2 reach + 1 cells lies in the mask. */
export function erode(mask: Uint8Array, columns: number, rows: number, reach: number): Uint8Array {
  const mean = boxMean(new Float32Array(mask), columns, rows, reach);
  const limit = 1 - 0.5 / (2 * reach + 1) ** 2;
  return maskOf(mask.length, (cell) => (mean[cell] ?? 0) > limit);
}

/** Cells within a square of 2 reach + 1 cells of the mask. */
export function dilate(mask: Uint8Array, columns: number, rows: number, reach: number): Uint8Array {
  const mean = boxMean(new Float32Array(mask), columns, rows, reach);
  const limit = 0.5 / (2 * reach + 1) ** 2;
  return maskOf(mask.length, (cell) => (mean[cell] ?? 0) > limit);
}
