/**
 * Covariance of weighted rows about a mean, a symmetric matrix by rows.
 *
 * @param rows `size` numbers a row, one row a weight
 * @param weights their sum is 1
 */
export function weightedCovariance(
  rows: Float64Array,
  mean: Float64Array,
  weights: Float64Array,
  size: number,
): Float64Array {
  const matrix = new Float64Array(size * size);
  for (let at = 0; at < weights.length; at += 1) {
    for (let row = 0; row < size; row += 1) {
      const off = weights[at]! * (rows[at * size + row]! - mean[row]!);
      for (let column = 0; column <= row; column += 1)
        matrix[row * size + column]! += off * (rows[at * size + column]! - mean[column]!);
    }
  }
  for (let row = 0; row < size; row += 1)
    for (let column = row + 1; column < size; column += 1) matrix[row * size + column] = matrix[column * size + row]!;
  return matrix;
}
