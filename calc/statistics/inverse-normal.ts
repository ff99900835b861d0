import { CalcInputError } from '../errors';

const MIDDLE_ABOVE = [
  -39.69683028665376, 220.9460984245205, -275.9285104469687, 138.357751867269, -30.66479806614716, 2.506628277459239,
];
const MIDDLE_BELOW = [
  -54.47609879822406, 161.5858368580409, -155.6989798598866, 66.80131188771972, -13.28068155288572, 1,
];
const TAIL_ABOVE = [
  -0.007784894002430293, -0.3223964580411365, -2.400758277161838, -2.549732539343734, 4.374664141464968,
  2.938163982698783,
];
const TAIL_BELOW = [0.007784695709041462, 0.3224671290700398, 2.445134137142996, 3.754408661907416, 1];

/**
 * The standard normal deviate below which a share `p` lies. Rational approximation of P. J. Acklam (2000–2003),
 * relative error below 1.15e-9.
 *
 * @param p above 0 and below 1
 * @throws CalcInputError outside that range
 * @example Math.abs(inverseNormal(0.975) - 1.959964) < 1e-6
 */
export function inverseNormal(p: number): number {
  if (!(p > 0 && p < 1)) throw new CalcInputError('p', p, 'above 0 and below 1');
  if (p < 0.02425) return tail(Math.sqrt(-2 * Math.log(p)));
  if (p > 1 - 0.02425) return -tail(Math.sqrt(-2 * Math.log1p(-p)));
  const q = p - 0.5;
  const r = q * q;
  return (q * polynomial(MIDDLE_ABOVE, r)) / polynomial(MIDDLE_BELOW, r);
}

const tail = (q: number): number => polynomial(TAIL_ABOVE, q) / polynomial(TAIL_BELOW, q);

/** Highest power first. */
function polynomial(coefficients: readonly number[], x: number): number {
  let sum = 0;
  for (let at = 0; at < coefficients.length; at += 1) sum = sum * x + coefficients[at]!;
  return sum;
}
