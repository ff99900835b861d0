/** A normal distribution of several numbers, by the Cholesky factor of its precision. */
export interface Posterior {
  mean: number[];
  /** Lower triangle L of the precision Λ = L·Lᵀ. */
  factor: number[][];
  /** Log of how well this explains the data, up to a constant of the data. */
  logEvidence: number;
}

export interface Datum {
  row: readonly number[];
  value: number;
  sd: number;
}

/**
 * Bayesian linear regression: value = row·θ + noise, θ normal about 0.
 *
 * @param priorPrecision of θ, symmetric and positive definite
 * @param priorLogDeterminant of that precision
 */
export function linearFit(
  data: readonly Datum[],
  priorPrecision: readonly number[][],
  priorLogDeterminant: number,
): Posterior {
  const n = priorPrecision.length;
  const precision = priorPrecision.map((row) => [...row]);
  const moment = new Array<number>(n).fill(0);
  let square = 0;
  for (const { row, value, sd } of data) {
    const w = 1 / (sd * sd);
    square += w * value * value;
    for (let i = 0; i < n; i += 1) {
      moment[i]! += w * row[i]! * value;
      for (let j = 0; j <= i; j += 1) precision[i]![j]! += w * row[i]! * row[j]!;
    }
  }
  const factor = cholesky(precision);
  const half = forward(factor, moment);
  const mean = backward(factor, half);
  const explained = half.reduce((sum, value) => sum + value * value, 0);
  const logDeterminant = 2 * factor.reduce((sum, row, i) => sum + Math.log(row[i]!), 0);
  return { mean, factor, logEvidence: (explained - square + priorLogDeterminant - logDeterminant) / 2 };
}

/** Mean and standard deviation of row·θ. */
export function project({ mean, factor }: Posterior, row: readonly number[]): { mean: number; sd: number } {
  const half = forward(factor, row);
  return {
    mean: row.reduce((sum, value, at) => sum + value * mean[at]!, 0),
    sd: Math.sqrt(half.reduce((sum, value) => sum + value * value, 0)),
  };
}

/** L of a symmetric matrix of which the lower triangle is read. */
function cholesky(matrix: readonly number[][]): number[][] {
  const factor: number[][] = [];
  matrix.forEach((row, i) => {
    const own: number[] = [];
    factor.push(own);
    for (let j = 0; j <= i; j += 1) {
      let sum = row[j]!;
      for (let k = 0; k < j; k += 1) sum -= own[k]! * factor[j]![k]!;
      own.push(i === j ? Math.sqrt(sum) : sum / factor[j]![j]!);
    }
  });
  return factor;
}

/** x of L·x = b. */
function forward(factor: readonly number[][], b: readonly number[]): number[] {
  const x: number[] = [];
  factor.forEach((row, i) => {
    let sum = b[i]!;
    for (let k = 0; k < i; k += 1) sum -= row[k]! * x[k]!;
    x.push(sum / row[i]!);
  });
  return x;
}

/** x of Lᵀ·x = b. */
function backward(factor: readonly number[][], b: readonly number[]): number[] {
  const x = [...b];
  for (let i = factor.length - 1; i >= 0; i -= 1) {
    for (let k = i + 1; k < factor.length; k += 1) x[i]! -= factor[k]![i]! * x[k]!;
    x[i]! /= factor[i]![i]!;
  }
  return x;
}
