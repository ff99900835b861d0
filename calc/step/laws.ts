import type { SeriesLoop } from './series-loop';

/** Which limit sets the current. A held group's law is HELD plus its branch. */
export const AMPS = 0;
export const WATTS = 1;
export const SET = 2;
export const LOAD = 3;
export const HELD = 4;

export interface LawLimits {
  maxAmps: number | null;
  maxWatts: number | null;
  setVolts: number | null;
  /** Resistor the loop runs into. */
  loadOhm: number | null;
  heldVolts: number | null;
  /** Everything in the loop at the supply's own terminals: groups, links, leads. */
  totalOhm: number;
}

/** Below any contact resistance; keeps an ideal, resistance-free loop solvable under a set voltage. */
const LEAST_OHM = 1e-6;

/**
 * The laws a current can follow, each with its gradient to the state.
 *
 * The state is y = [q, class over-voltages…, and, only where single groups are watched and do not follow their class,
 * one decay e^(−t/τ) for each class].
 *
 * Charging: I = 2·P/(E + √(E² + 4·R·P)), (V_set − E)/R, (V_held − U − v1)/R0; discharging mirrored; into a resistor
 * E/(R + R_load). The ruling law is the one with the least current.
 */
export class Laws {
  readonly kinds: number[] = [];
  readonly classes: number;

  constructor(
    readonly loop: SeriesLoop,
    readonly limits: LawLimits,
    /** The decays are part of the state. */
    readonly decays: boolean,
  ) {
    this.classes = loop.classTau.length;
    if (limits.maxAmps !== null) this.kinds.push(AMPS);
    if (limits.maxWatts !== null) this.kinds.push(WATTS);
    if (limits.setVolts !== null) this.kinds.push(SET);
    if (limits.loadOhm !== null) this.kinds.push(LOAD);
    if (limits.heldVolts !== null) loop.counts.forEach((_, b) => this.kinds.push(HELD + b));
  }

  static isVoltageLimit(kind: number): boolean {
    return kind === SET || kind >= HELD;
  }

  /** E = ΣU + Σv1 at the state, V; brings the loop to that charge. */
  emf(y: ArrayLike<number>): number {
    this.loop.at(y[0]!);
    let over = 0;
    for (let c = 1; c <= this.classes; c++) over += y[c]!;
    return this.loop.emf + this.loop.sense * over;
  }

  over(b: number, y: ArrayLike<number>): number {
    const c = this.loop.classOf[b]!;
    const over = this.loop.share[b]! * y[1 + c]!;
    return this.decays ? over + this.loop.residual[b]! * y[1 + this.classes + c]! : over;
  }

  /** Voltage of one group of branch `b` under the current, counted in the current's direction, V. */
  branchTerminal(b: number, y: ArrayLike<number>, amps: number): number {
    const { loop } = this;
    return loop.sense * loop.branchVolts(b, y[0]!) + this.over(b, y) + amps * loop.ohmic[b]!;
  }

  /** Amperes the law allows; zero or below where the limit is already passed. */
  amps(kind: number, y: ArrayLike<number>): number {
    if (kind === AMPS) return this.limits.maxAmps!;
    if (kind >= HELD) {
      const b = kind - HELD;
      const gap = this.loop.sense * this.limits.heldVolts! - this.branchTerminal(b, y, 0);
      return gap / Math.max(this.loop.ohmic[b]!, LEAST_OHM);
    }
    return this.ampsAt(kind, this.emf(y));
  }

  private ampsAt(kind: number, emf: number): number {
    const { loop, limits } = this;
    if (kind === SET) return (loop.sense * (limits.setVolts! - emf)) / Math.max(limits.totalOhm, LEAST_OHM);
    if (kind === LOAD) return emf / Math.max(limits.totalOhm + limits.loadOhm!, LEAST_OHM);
    const watts = limits.maxWatts!;
    const square = emf * emf + 4 * loop.sense * limits.totalOhm * watts;
    // A discharge whose loop cannot give that much power: the most it can give flows at half the voltage.
    if (square <= 0) return emf / (2 * limits.totalOhm);
    const divisor = emf + Math.sqrt(square);
    return divisor > 0 ? (2 * watts) / divisor : Infinity;
  }

  /** The law with the least current; the first where several agree. */
  ruling(y: ArrayLike<number>): number {
    let best = Infinity;
    let ruling = this.kinds[0]!;
    for (const kind of this.kinds) {
      const amps = this.amps(kind, y);
      if (amps < best) {
        best = amps;
        ruling = kind;
      }
    }
    return ruling;
  }

  /** Least current of all laws but `ruling`, A. */
  leastOther(ruling: number, y: ArrayLike<number>): number {
    let least = Infinity;
    for (const kind of this.kinds) {
      if (kind === ruling) continue;
      const amps = this.amps(kind, y);
      if (amps < least) least = amps;
    }
    return least;
  }

  /** Amperes of a law that moves with the state, with its gradient to the state in `gradient`. */
  gradient(kind: number, y: ArrayLike<number>, gradient: number[]): number {
    const { loop, classes } = this;
    gradient.fill(0);
    if (kind >= HELD) {
      const b = kind - HELD;
      const c = loop.classOf[b]!;
      const ohm = Math.max(loop.ohmic[b]!, LEAST_OHM);
      gradient[0] = (-loop.sense * loop.branchSlope(b, y[0]!)) / ohm;
      gradient[1 + c] = -loop.share[b]! / ohm;
      if (this.decays) gradient[1 + classes + c] = -loop.residual[b]! / ohm;
      return this.amps(kind, y);
    }
    const emf = this.emf(y);
    const amps = this.ampsAt(kind, emf);
    const perVolt = this.perVolt(kind, emf, amps);
    gradient[0] = perVolt * loop.emfSlope;
    for (let c = 1; c <= classes; c++) gradient[c] = perVolt * loop.sense;
    return amps;
  }

  /** dI/dE, A/V. */
  private perVolt(kind: number, emf: number, amps: number): number {
    const { loop, limits } = this;
    if (kind === SET) return -loop.sense / Math.max(limits.totalOhm, LEAST_OHM);
    if (kind === LOAD) return 1 / Math.max(limits.totalOhm + limits.loadOhm!, LEAST_OHM);
    const square = emf * emf + 4 * loop.sense * limits.totalOhm * limits.maxWatts!;
    return square <= 0 ? 1 / (2 * limits.totalOhm) : -amps / Math.sqrt(square);
  }
}
