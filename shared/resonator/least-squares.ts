import { ResonatorError } from './errors';

export interface LeastSquaresFit {
  coefficients: number[];
  residuals: number[];
  residualSumOfSquares: number;
  /** (X^T X)^-1, row by row; times the residual variance it is the covariance of the coefficients. */
  inverseNormal: number[][];
  /** Diagonal of the hat matrix: how strongly each reading pulls its own fitted value. */
  leverages: number[];
}

/**
 * Linear least squares by Householder reflections, which do not square the condition of the design.
 * @param design one row per reading, one column per coefficient; more rows than or as many as columns
 * @param values one per row
 * @throws ResonatorError `too_few`, `no_spread` when the columns do not determine the coefficients
 * @see G. H. Golub, Numer. Math. 7 (1965) 206
 */
export function leastSquares(
  design: readonly (readonly number[])[],
  values: ArrayLike<number>,
): LeastSquaresFit {
  const rows = design.length;
  const columns = design[0]?.length ?? 0;
  if (rows < columns || columns === 0) {
    throw new ResonatorError('too_few', 'design', `must hold at least ${columns} readings`);
  }
  const a = design.map((row) => [...row]);
  const y = Array.from({ length: rows }, (_, i) => values[i]!);
  const columnNorm = Array.from({ length: columns }, (_, k) =>
    Math.hypot(...a.map((row) => row[k]!)),
  );

  for (let k = 0; k < columns; k += 1) {
    let norm = 0;
    for (let i = k; i < rows; i += 1) norm = Math.hypot(norm, a[i]![k]!);
    if (!(norm > 1e-12 * columnNorm[k]!)) {
      throw new ResonatorError('no_spread', 'design', 'must tell the coefficients apart');
    }
    const alpha = a[k]![k]! > 0 ? -norm : norm;
    const v = a.slice(k).map((row) => row[k]!);
    v[0]! -= alpha;
    const scale = v.reduce((sum, value) => sum + value * value, 0) / 2;
    for (let j = k; j <= columns; j += 1) {
      const at = (i: number) => (j < columns ? a[i]![j]! : y[i]!);
      let dot = 0;
      for (let i = k; i < rows; i += 1) dot += v[i - k]! * at(i);
      for (let i = k; i < rows; i += 1) {
        const value = at(i) - (dot / scale) * v[i - k]!;
        if (j < columns) a[i]![j] = value;
        else y[i] = value;
      }
    }
  }

  const solve = (right: readonly number[]): number[] => {
    const x = new Array<number>(columns).fill(0);
    for (let k = columns - 1; k >= 0; k -= 1) {
      let sum = right[k]!;
      for (let j = k + 1; j < columns; j += 1) sum -= a[k]![j]! * x[j]!;
      x[k] = sum / a[k]![k]!;
    }
    return x;
  };
  const coefficients = solve(y);
  // Columns of the inverse of the triangular factor.
  const inverse = Array.from({ length: columns }, (_, k) =>
    solve(Array.from({ length: columns }, (_unused, i) => (i === k ? 1 : 0))),
  );
  const indices = coefficients.map((_, i) => i);
  const inverseNormal = indices.map((i) =>
    indices.map((j) => inverse.reduce((sum, column) => sum + column[i]! * column[j]!, 0)),
  );
  const residuals = design.map(
    (row, i) => values[i]! - row.reduce((sum, x, k) => sum + x * coefficients[k]!, 0),
  );
  const leverages = design.map((row) =>
    inverse.reduce(
      (sum, column) => sum + row.reduce((dot, x, k) => dot + x * column[k]!, 0) ** 2,
      0,
    ),
  );
  const residualSumOfSquares = residuals.reduce((sum, r) => sum + r * r, 0);
  return { coefficients, residuals, residualSumOfSquares, inverseNormal, leverages };
}

/** Square of the standard error of row . coefficients over the residual variance: row (X^T X)^-1 row^T. */
export function quadraticForm(
  row: readonly number[],
  matrix: readonly (readonly number[])[],
): number {
  let sum = 0;
  row.forEach((x, i) => row.forEach((y, j) => (sum += x * matrix[i]![j]! * y)));
  return sum;
}
