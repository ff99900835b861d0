/**
 * x of L·Lᵀ·x = b, forward and back.
 *
 * @param lower of `choleskyLower`, positive on its diagonal
 */
export function choleskySolve(lower: Float64Array, right: ArrayLike<number>, size: number): Float64Array {
  const x = Float64Array.from(right);
  for (let k = 0; k < size; k += 1) {
    for (let j = 0; j < k; j += 1) x[k] = x[k]! - lower[k * size + j]! * x[j]!;
    x[k] = x[k]! / lower[k * size + k]!;
  }
  for (let k = size - 1; k >= 0; k -= 1) {
    for (let j = k + 1; j < size; j += 1) x[k] = x[k]! - lower[j * size + k]! * x[j]!;
    x[k] = x[k]! / lower[k * size + k]!;
  }
  return x;
}

/** (L·Lᵀ)⁻¹, row by row. */
export function choleskyInverse(lower: Float64Array, size: number): Float64Array {
  const result = new Float64Array(size * size);
  for (let k = 0; k < size; k += 1) {
    const unit = new Float64Array(size);
    unit[k] = 1;
    const column = choleskySolve(lower, unit, size);
    for (let j = 0; j < size; j += 1) result[j * size + k] = column[j]!;
  }
  return result;
}
