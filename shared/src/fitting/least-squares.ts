/**
 * Solves the symmetric positive system `matrix * x = right` (row-major, `size` x `size`) by Cholesky with a small ridge
 * on the diagonal. `null` when the matrix is not positive even so.
 */
export function solveSymmetric(matrix: readonly number[], right: readonly number[], ridge = 0): number[] | null {
  const size = right.length;
  const lower = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = (matrix[row * size + column] ?? 0) * (row === column ? 1 + ridge : 1);
      for (let k = 0; k < column; k++) sum -= (lower[row * size + k] ?? 0) * (lower[column * size + k] ?? 0);
      if (row === column) {
        if (!(sum > 0)) return null;
        lower[row * size + row] = Math.sqrt(sum);
      } else {
        lower[row * size + column] = sum / (lower[column * size + column] ?? 1);
      }
    }
  }
  const solution: number[] = new Array<number>(size).fill(0);
  for (let row = 0; row < size; row++) {
    let sum = right[row] ?? 0;
    for (let k = 0; k < row; k++) sum -= (lower[row * size + k] ?? 0) * (solution[k] ?? 0);
    solution[row] = sum / (lower[row * size + row] ?? 1);
  }
  for (let row = size - 1; row >= 0; row--) {
    let sum = solution[row] ?? 0;
    for (let k = row + 1; k < size; k++) sum -= (lower[k * size + row] ?? 0) * (solution[k] ?? 0);
    solution[row] = sum / (lower[row * size + row] ?? 1);
  }
  return solution;
}

export interface Minimum {
  readonly parameters: readonly number[];
  /** Half the sum of squared residuals, doubled: the plain sum. */
  readonly cost: number;
  /** J'J at the minimum, row-major: the inverse times the residual variance is the covariance. */
  readonly information: readonly number[];
}

export interface MinimiseOptions {
  /** Step of the numeric derivative for each parameter, in the parameter's own unit. */
  readonly steps: readonly number[];
  readonly maxIterations?: number;
}

function sumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

/**
 * Levenberg-Marquardt with forward differences. `residuals` must always answer the same count.
 * Marquardt 1963, with the damping scaled by the diagonal.
 */
export function minimise(
  residuals: (parameters: readonly number[]) => Float64Array,
  start: readonly number[],
  options: MinimiseOptions,
): Minimum {
  const size = start.length;
  let parameters = [...start];
  let current = residuals(parameters);
  let cost = sumOfSquares(current);
  let damping = 1e-3;
  let information: number[] = new Array<number>(size * size).fill(0);
  for (let iteration = 0; iteration < (options.maxIterations ?? 30); iteration++) {
    const columns: Float64Array[] = [];
    for (let p = 0; p < size; p++) {
      const step = options.steps[p] ?? 1e-6;
      const moved = [...parameters];
      moved[p] = (moved[p] ?? 0) + step;
      const shifted = residuals(moved);
      for (let i = 0; i < shifted.length; i++) shifted[i] = ((shifted[i] ?? 0) - (current[i] ?? 0)) / step;
      columns.push(shifted);
    }
    information = new Array<number>(size * size).fill(0);
    const gradient: number[] = new Array<number>(size).fill(0);
    columns.forEach((column, p) => {
      let slope = 0;
      for (let i = 0; i < column.length; i++) slope -= (column[i] ?? 0) * (current[i] ?? 0);
      gradient[p] = slope;
      for (let q = 0; q <= p; q++) {
        const other = columns[q];
        if (!other) continue;
        let sum = 0;
        for (let i = 0; i < column.length; i++) sum += (column[i] ?? 0) * (other[i] ?? 0);
        information[p * size + q] = sum;
        information[q * size + p] = sum;
      }
    });
    let improved = false;
    for (let attempt = 0; attempt < 8 && !improved; attempt++) {
      const change = solveSymmetric(information, gradient, damping);
      if (change) {
        const next = parameters.map((value, p) => value + (change[p] ?? 0));
        const trial = residuals(next);
        const trialCost = sumOfSquares(trial);
        if (trialCost < cost) {
          const gain = cost - trialCost;
          parameters = next;
          current = trial;
          cost = trialCost;
          damping = Math.max(damping / 8, 1e-12);
          improved = true;
          if (gain < 1e-9 * cost) return { parameters, cost, information };
        }
      }
      if (!improved) damping *= 6;
    }
    if (!improved) break;
  }
  return { parameters, cost, information };
}
