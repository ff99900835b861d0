/**
 * A zero of `f` between `a` and `b`, where it has opposite signs: inverse quadratic interpolation where it is safe,
 * halving where not. Source of the choice between the two: T. R. Chandrupatla, Adv. Eng. Softw. 28 (1997) 145–149.
 *
 * @param tolerance on the argument
 */
export function findRoot(
  f: (x: number) => number,
  a: number,
  atA: number,
  b: number,
  atB: number,
  tolerance: number,
): number {
  if (atA === 0) return a;
  if (atB === 0) return b;
  let x1 = b;
  let f1 = atB;
  let x2 = a;
  let f2 = atA;
  let x3 = a;
  let f3 = atA;
  let t = 0.5;
  for (let i = 0; i < 200; i++) {
    const x = x1 + t * (x2 - x1);
    const fx = f(x);
    if (Math.sign(fx) === Math.sign(f1)) {
      x3 = x1;
      f3 = f1;
    } else {
      x3 = x2;
      f3 = f2;
      x2 = x1;
      f2 = f1;
    }
    x1 = x;
    f1 = fx;
    const best = Math.abs(f2) < Math.abs(f1) ? x2 : x1;
    if (f1 === 0) return x1;
    const smallest = (2e-16 * Math.abs(best) + tolerance) / Math.abs(x2 - x1);
    if (smallest > 0.5) return best;
    const xi = (x1 - x2) / (x3 - x2);
    const phi = (f1 - f2) / (f3 - f2);
    t = 0.5;
    if (phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)
      t = (f1 / (f1 - f2)) * (f3 / (f3 - f2)) + (((x3 - x1) / (x2 - x1)) * f1 * f2) / ((f1 - f3) * (f2 - f3));
    if (t < smallest) t = smallest;
    if (t > 1 - smallest) t = 1 - smallest;
  }
  return x1;
}
