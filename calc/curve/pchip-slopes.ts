/**
 * Slopes at the knots of a piecewise-cubic Hermite interpolant that keeps the data's monotonicity.
 *
 * Inside: F. N. Fritsch, J. Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300–304, the weighted harmonic mean of the
 * neighbouring secants. At the ends: the three-point formula, cut so that it keeps the sign of the end secant and at
 * most three times it. The same choice as SciPy's PchipInterpolator.
 *
 * @param x knots, rising strictly
 * @param y values at the knots
 */
export function pchipSlopes(x: ArrayLike<number>, y: ArrayLike<number>): Float64Array {
  const n = x.length;
  const slopes = new Float64Array(n);
  const width = (k: number) => x[k + 1]! - x[k]!;
  const secant = (k: number) => (y[k + 1]! - y[k]!) / width(k);
  if (n === 2) return slopes.fill(secant(0));
  for (let k = 1; k < n - 1; k++) {
    const before = secant(k - 1);
    const after = secant(k);
    if (before * after <= 0) continue;
    const first = 2 * width(k) + width(k - 1);
    const second = width(k) + 2 * width(k - 1);
    slopes[k] = (first + second) / (first / before + second / after);
  }
  slopes[0] = endSlope(width(0), width(1), secant(0), secant(1));
  slopes[n - 1] = endSlope(width(n - 2), width(n - 3), secant(n - 2), secant(n - 3));
  return slopes;
}

function endSlope(width: number, nextWidth: number, secant: number, nextSecant: number): number {
  const slope = ((2 * width + nextWidth) * secant - width * nextSecant) / (width + nextWidth);
  if (Math.sign(slope) !== Math.sign(secant)) return 0;
  if (Math.sign(secant) !== Math.sign(nextSecant) && Math.abs(slope) > 3 * Math.abs(secant)) return 3 * secant;
  return slope;
}
