/** (Σw)²/Σw²: how many equal samples a weighted set is worth. */
export function effectiveSampleSize(weights: ArrayLike<number>): number {
  let sum = 0;
  let squares = 0;
  for (let at = 0; at < weights.length; at += 1) {
    sum += weights[at]!;
    squares += weights[at]! * weights[at]!;
  }
  return squares > 0 ? (sum * sum) / squares : 0;
}

/**
 * Picks as many indexes as there are weights, each as often as its weight says to within one: systematic resampling
 * (G. Kitagawa, J. Comput. Graph. Stat. 5 (1996) 1–25, from memory).
 *
 * @param offset 0…1, where the comb of equal teeth begins
 */
export function systematicResample(weights: ArrayLike<number>, offset: number): Int32Array {
  const count = weights.length;
  let sum = 0;
  for (let at = 0; at < count; at += 1) sum += weights[at]!;
  const picked = new Int32Array(count);
  let index = 0;
  let cumulated = weights[0]! / sum;
  for (let tooth = 0; tooth < count; tooth += 1) {
    const place = (tooth + offset) / count;
    while (cumulated < place && index < count - 1) {
      index += 1;
      cumulated += weights[index]! / sum;
    }
    picked[tooth] = index;
  }
  return picked;
}

/**
 * Lower triangle L with L·Lᵀ = the matrix, row by row; a direction without variance gets a row of zeros.
 *
 * @param matrix symmetric, positive semi-definite, `size`² numbers row by row
 */
export function choleskyLower(matrix: Float64Array, size: number): Float64Array {
  const lower = new Float64Array(size * size);
  for (let row = 0; row < size; row += 1) {
    for (let column = 0; column <= row; column += 1) {
      let sum = matrix[row * size + column]!;
      for (let k = 0; k < column; k += 1) sum -= lower[row * size + k]! * lower[column * size + k]!;
      if (row === column) lower[row * size + row] = sum > 1e-14 * matrix[row * size + row]! ? Math.sqrt(sum) : 0;
      else {
        const pivot = lower[column * size + column]!;
        lower[row * size + column] = pivot > 0 ? sum / pivot : 0;
      }
    }
  }
  return lower;
}
