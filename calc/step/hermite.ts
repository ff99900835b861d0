/**
 * The cubic through both ends of a step and their rates, at the share `theta` of its length `h`, into `out`.
 */
export function hermite(
  from: number[],
  to: number[],
  rateFrom: number[],
  rateTo: number[],
  h: number,
  theta: number,
  out: number[],
): void {
  const rest = 1 - theta;
  const a = rest * rest * (1 + 2 * theta);
  const b = theta * theta * (3 - 2 * theta);
  const c = h * theta * rest * rest;
  const d = -h * theta * theta * rest;
  for (let j = 0; j < from.length; j++) out[j] = a * from[j]! + b * to[j]! + c * rateFrom[j]! + d * rateTo[j]!;
}
