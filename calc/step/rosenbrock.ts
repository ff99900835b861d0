/**
 * One step of a stiffly stable Rosenbrock method for y' = b·I(y) − d·y, where one scalar current I drives a few
 * linear decays.
 *
 * Coefficients: RODAS, six stages, order 4 with an embedded order 3, L-stable; E. Hairer, G. Wanner, Solving Ordinary
 * Differential Equations II, 2nd ed. (Springer 1996), section IV.7. Since the Jacobian is b·∇Iᵀ − diag(d), each stage
 * is solved in as many operations as there are unknowns (Sherman–Morrison).
 */
const GAMMA = 0.25;
const A21 = 1.544;
const A31 = 0.9466785280815826;
const A32 = 0.2557011698983284;
const A41 = 3.314825187068521;
const A42 = 2.896124015972201;
const A43 = 0.9986419139977817;
const A51 = 1.221224509226641;
const A52 = 6.019134481288629;
const A53 = 12.53708332932087;
const A54 = -0.687886036105895;
const C21 = -5.6688;
const C31 = -2.430093356833875;
const C32 = -0.2063599157091915;
const C41 = -0.1073529058151375;
const C42 = -9.594562251023355;
const C43 = -20.47028614809616;
const C51 = 7.496443313967647;
const C52 = -10.24680431464352;
const C53 = -33.99990352819905;
const C54 = 11.7089089320616;
const C61 = 8.083246795921522;
const C62 = -7.981132988064893;
const C63 = -31.52159432874371;
const C64 = 16.31930543123136;
const C65 = -6.058818238834054;

export class RosenbrockStep {
  /** Result and error estimate of the last step. */
  readonly result: number[];
  readonly error: number[];
  private readonly k: number[][];
  private readonly inverse: number[];
  private readonly scaledDrive: number[];
  private divisor = 1;

  constructor(
    private readonly size: number,
    private readonly drive: number[],
    private readonly decay: number[],
    private readonly amps: (y: number[]) => number,
  ) {
    const zeros = () => new Array<number>(size).fill(0);
    this.result = zeros();
    this.error = zeros();
    this.k = [zeros(), zeros(), zeros(), zeros(), zeros(), zeros()];
    this.inverse = zeros();
    this.scaledDrive = zeros();
  }

  /**
   * Steps from `y` by `h` seconds; false where `h` is too long for the stages to be solved.
   *
   * @param amps current at `y`, A
   * @param gradient of the current to the state at `y`
   */
  step(y: number[], h: number, amps: number, gradient: number[]): boolean {
    const { size, decay, result, error } = this;
    if (!this.factor(h, gradient)) return false;
    const [k1, k2, k3, k4, k5, k6] = this.k as [number[], number[], number[], number[], number[], number[]];
    const r = 1 / h;
    for (let j = 0; j < size; j++) k1[j] = -decay[j]! * y[j]!;
    this.solve(k1, amps, gradient);

    for (let j = 0; j < size; j++) result[j] = y[j]! + A21 * k1[j]!;
    this.load(k2);
    for (let j = 0; j < size; j++) k2[j]! += r * C21 * k1[j]!;
    this.solve(k2, this.amps(result), gradient);

    for (let j = 0; j < size; j++) result[j] = y[j]! + A31 * k1[j]! + A32 * k2[j]!;
    this.load(k3);
    for (let j = 0; j < size; j++) k3[j]! += r * (C31 * k1[j]! + C32 * k2[j]!);
    this.solve(k3, this.amps(result), gradient);

    for (let j = 0; j < size; j++) result[j] = y[j]! + A41 * k1[j]! + A42 * k2[j]! + A43 * k3[j]!;
    this.load(k4);
    for (let j = 0; j < size; j++) k4[j]! += r * (C41 * k1[j]! + C42 * k2[j]! + C43 * k3[j]!);
    this.solve(k4, this.amps(result), gradient);

    for (let j = 0; j < size; j++) result[j] = y[j]! + A51 * k1[j]! + A52 * k2[j]! + A53 * k3[j]! + A54 * k4[j]!;
    this.load(k5);
    for (let j = 0; j < size; j++) k5[j]! += r * (C51 * k1[j]! + C52 * k2[j]! + C53 * k3[j]! + C54 * k4[j]!);
    this.solve(k5, this.amps(result), gradient);

    for (let j = 0; j < size; j++) result[j]! += k5[j]!;
    this.load(k6);
    for (let j = 0; j < size; j++)
      k6[j]! += r * (C61 * k1[j]! + C62 * k2[j]! + C63 * k3[j]! + C64 * k4[j]! + C65 * k5[j]!);
    this.solve(k6, this.amps(result), gradient);
    for (let j = 0; j < size; j++) {
      result[j]! += k6[j]!;
      error[j] = k6[j]!;
    }
    return true;
  }

  /** The decays' part of the right-hand side at the stage's state. */
  private load(k: number[]): void {
    for (let j = 0; j < this.size; j++) k[j] = -this.decay[j]! * this.result[j]!;
  }

  private factor(h: number, gradient: number[]): boolean {
    let product = 0;
    for (let j = 0; j < this.size; j++) {
      this.inverse[j] = 1 / (1 / (h * GAMMA) + this.decay[j]!);
      this.scaledDrive[j] = this.drive[j]! * this.inverse[j]!;
      product += gradient[j]! * this.scaledDrive[j]!;
    }
    this.divisor = 1 - product;
    return this.divisor > 0.2;
  }

  /** Overwrites `k` (its part without the current) by the stage's solution. */
  private solve(k: number[], amps: number, gradient: number[]): void {
    let product = 0;
    for (let j = 0; j < this.size; j++) {
      k[j] = k[j]! * this.inverse[j]! + this.scaledDrive[j]! * amps;
      product += gradient[j]! * k[j]!;
    }
    const pull = product / this.divisor;
    for (let j = 0; j < this.size; j++) k[j]! += this.scaledDrive[j]! * pull;
  }
}
