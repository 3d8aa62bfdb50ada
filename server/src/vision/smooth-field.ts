/** A raster of vectors with `channels` values a cell. */
export interface Field {
  readonly columns: number;
  readonly rows: number;
  readonly channels: number;
  readonly values: Float32Array;
}

interface Level {
  readonly columns: number;
  readonly rows: number;
  readonly values: Float32Array;
  readonly weights: Float32Array;
}

function shrink(level: Level, channels: number): Level {
  const columns = Math.ceil(level.columns / 2);
  const rows = Math.ceil(level.rows / 2);
  const values = new Float32Array(columns * rows * channels);
  const weights = new Float32Array(columns * rows);
  for (let r = 0; r < level.rows; r++) {
    for (let c = 0; c < level.columns; c++) {
      const from = r * level.columns + c;
      const weight = level.weights[from] ?? 0;
      if (weight === 0) continue;
      const to = (r >> 1) * columns + (c >> 1);
      weights[to] = (weights[to] ?? 0) + weight;
      for (let k = 0; k < channels; k++) {
        const at = to * channels + k;
        values[at] = (values[at] ?? 0) + weight * (level.values[from * channels + k] ?? 0);
      }
    }
  }
  for (let cell = 0; cell < weights.length; cell++) {
    const weight = weights[cell] ?? 0;
    if (weight === 0) continue;
    for (let k = 0; k < channels; k++) values[cell * channels + k] = (values[cell * channels + k] ?? 0) / weight;
    weights[cell] = Math.min(weight, 1);
  }
  return { columns, rows, values, weights };
}

/** Fills what the finer level does not know from the coarser one, bilinear. */
function fill(fine: Level, coarse: Level, channels: number): void {
  for (let r = 0; r < fine.rows; r++) {
    for (let c = 0; c < fine.columns; c++) {
      const cell = r * fine.columns + c;
      const known = fine.weights[cell] ?? 0;
      if (known >= 1) continue;
      const x = Math.min(Math.max((c + 0.5) / 2 - 0.5, 0), coarse.columns - 1);
      const y = Math.min(Math.max((r + 0.5) / 2 - 0.5, 0), coarse.rows - 1);
      const left = Math.min(Math.floor(x), Math.max(coarse.columns - 2, 0));
      const top = Math.min(Math.floor(y), Math.max(coarse.rows - 2, 0));
      const right = Math.min(left + 1, coarse.columns - 1);
      const below = Math.min(top + 1, coarse.rows - 1);
      const fx = x - left;
      const fy = y - top;
      const topLeft = (top * coarse.columns + left) * channels;
      const topRight = (top * coarse.columns + right) * channels;
      const belowLeft = (below * coarse.columns + left) * channels;
      const belowRight = (below * coarse.columns + right) * channels;
      for (let k = 0; k < channels; k++) {
        const upper = (coarse.values[topLeft + k] ?? 0) * (1 - fx) + (coarse.values[topRight + k] ?? 0) * fx;
        const lower = (coarse.values[belowLeft + k] ?? 0) * (1 - fx) + (coarse.values[belowRight + k] ?? 0) * fx;
        const guess = upper * (1 - fy) + lower * fy;
        const place = cell * channels + k;
        fine.values[place] = known * (fine.values[place] ?? 0) + (1 - known) * guess;
      }
    }
  }
}

/**
 * A smooth field through the cells whose mask is one, carried on over all others (pull and push over a pyramid, after
 * Gortler and others 1996). With `smoothLevels` the finest levels are taken from the next coarser one, known cells too.
 */
export function spreadField(field: Field, mask: Uint8Array, smoothLevels: number): Field {
  const { channels } = field;
  let level: Level = {
    columns: field.columns,
    rows: field.rows,
    values: field.values.slice(),
    weights: new Float32Array(mask),
  };
  const levels: Level[] = [level];
  while (level.columns > 1 || level.rows > 1) {
    level = shrink(level, channels);
    levels.push(level);
  }
  for (let k = levels.length - 2; k >= 0; k--) {
    const fine = levels[k];
    const coarse = levels[k + 1];
    if (!fine || !coarse) continue;
    if (k < smoothLevels) fine.weights.fill(0);
    fill(fine, coarse, channels);
  }
  return { columns: field.columns, rows: field.rows, channels, values: levels[0]?.values ?? field.values };
}
