import { findRoot } from './find-root';
import { hermite } from './hermite';
import { RosenbrockStep } from './rosenbrock';
import type { Ending, Run } from './run';
import { watchesOf, type Watch } from './watches';

/** Local error allowed: of the current and of the charge a step brings, as shares; of the over-voltages, V. */
const AMPS_TOLERANCE = 3e-4;
const CHARGE_TOLERANCE = 1e-4;
const OVER_TOLERANCE = 1e-5;
const ROUNDING = 1e-13;
const MOST_STEPS = 100_000;

/**
 * A stretch in which the current follows a voltage, a power or a resistor: steps of a stiffly stable method as long as
 * the error allows, until a stop or until another law asks for less.
 *
 * @param law the ruling law, kept until another one undercuts it
 */
export function variablePhase(run: Run, law: number): Ending {
  return new VariablePhase(run, law).run();
}

class VariablePhase {
  private readonly laws;
  private readonly drive: number[];
  private readonly decay: number[];
  private readonly method: RosenbrockStep;
  private readonly gradient: number[];
  private readonly rate: number[];
  private readonly nextRate: number[];
  private readonly middle: number[];
  private readonly watches: Watch[];
  private readonly deadAmps: number;
  private amps = 0;
  private lastAmps = Infinity;

  constructor(
    private readonly phase: Run,
    private readonly law: number,
  ) {
    const { loop, laws, y } = phase;
    this.laws = laws;
    const size = y.length;
    this.drive = [1, ...loop.classOhm.map((ohm, c) => ohm / loop.classTau[c]!)];
    this.decay = [0, ...loop.classTau.map((tau) => 1 / tau)];
    if (laws.decays)
      for (const tau of loop.classTau) {
        this.drive.push(0);
        this.decay.push(1 / tau);
      }
    this.method = new RosenbrockStep(size, this.drive, this.decay, (state) => laws.amps(law, state));
    const zeros = () => new Array<number>(size).fill(0);
    this.gradient = zeros();
    this.rate = zeros();
    this.nextRate = zeros();
    this.middle = zeros();
    this.watches = watchesOf(phase, law);
    // A millionth of the one-hour current: what is then still to come cannot be seen on any meter.
    this.deadAmps = 1e-6 / (3600 * Math.max(...loop.socPerCoulomb.map(Math.abs)));
  }

  run(): Ending {
    const { phase, laws, law, gradient } = this;
    this.amps = laws.gradient(law, phase.y, gradient);
    this.rates(phase.y, this.amps, this.rate);
    phase.record(phase.s, phase.y, this.amps);
    let h = this.firstStep();
    for (let i = 0; i < MOST_STEPS; i++) {
      const leftS = phase.stops.maxSeconds - phase.s;
      if (leftS <= 0) return { kind: 'time-cap' };
      if (h > leftS) h = leftS;
      if (!this.method.step(phase.y, h, this.amps, gradient)) {
        h /= 4;
        continue;
      }
      const size = this.errorSize(h);
      if (!(size <= 1)) {
        h *= Number.isFinite(size) ? Math.max(0.2, 0.85 * size ** -0.25) : 0.2;
        continue;
      }
      const grown = h * Math.min(6, Math.max(0.3, 0.85 * size ** -0.25));
      const ending = this.accept(h);
      if (ending) return ending;
      h = grown;
    }
    throw new Error('The step did not come to an end; report this input.');
  }

  /** A third of the quickest time in which the current itself would change. */
  private firstStep(): number {
    const { gradient, drive, decay, phase } = this;
    let speed = 0;
    for (let j = 0; j < drive.length; j++) speed += Math.abs(gradient[j]! * drive[j]!);
    speed += Math.max(...decay) * 0.2;
    const toStop = this.amps > 0 ? (phase.stops.atCoulombs - phase.y[0]!) / this.amps : Infinity;
    return Math.min(0.3 / speed, toStop);
  }

  private rates(y: number[], amps: number, rate: number[]): void {
    for (let j = 0; j < y.length; j++) rate[j] = this.drive[j]! * amps - this.decay[j]! * y[j]!;
  }

  private errorSize(h: number): number {
    const { error } = this.method;
    let ofAmps = 0;
    let ofOver = 0;
    for (let j = 0; j < error.length; j++) {
      ofAmps += this.gradient[j]! * error[j]!;
      if (j > 0) ofOver = Math.max(ofOver, Math.abs(error[j]!));
    }
    const amps = Math.abs(this.amps) + this.deadAmps;
    return Math.max(
      Math.abs(ofAmps) / (AMPS_TOLERANCE * amps),
      Math.abs(error[0]!) / (CHARGE_TOLERANCE * amps * h + ROUNDING * Math.abs(this.phase.y[0]!)),
      ofOver / OVER_TOLERANCE,
    );
  }

  /** Takes the step to `method.result`, or the part of it up to the first event. */
  private accept(h: number): Ending | null {
    const { phase, laws, law, method, middle, nextRate } = this;
    const next = method.result.slice();
    const amps = laws.amps(law, next);
    this.rates(next, amps, nextRate);
    this.interpolate(next, 0.5, h, middle);
    const middleAmps = laws.amps(law, middle);
    const event = this.firstEvent(middle, middleAmps, 0, 0.5, h, next) ?? this.firstEvent(next, amps, 0.5, 1, h, next);
    if (event) return this.cut(event, h);

    this.commit(next, amps, middle, middleAmps, h);
    // With a time cap the rest is run out, so that the state at the cap is told.
    const endless = !phase.signed && phase.stops.maxSeconds === Infinity;
    if (endless && this.amps <= this.deadAmps && this.amps <= this.lastAmps) return { kind: 'dead' };
    return null;
  }

  private commit(next: number[], amps: number, middle: number[], middleAmps: number, h: number): void {
    const { phase } = this;
    // Simpson's rule for the over-voltages' and resistances' share of the energy.
    phase.lossWs +=
      (h / 6) * (this.loss(phase.y, this.amps) + 4 * this.loss(middle, middleAmps) + this.loss(next, amps));
    if (phase.trace) phase.record(phase.s + h / 2, middle, middleAmps);
    phase.s += h;
    phase.y = next;
    this.lastAmps = this.amps;
    this.amps = this.laws.gradient(this.law, next, this.gradient);
    this.rates(next, this.amps, this.rate);
    phase.peakAmps = Math.max(phase.peakAmps, Math.abs(this.amps));
    phase.record(phase.s, next, this.amps);
  }

  private loss(y: number[], amps: number): number {
    let over = 0;
    for (let c = 1; c <= this.phase.classes; c++) over += y[c]!;
    return amps * (over + amps * this.phase.moduleOhm);
  }

  private interpolate(next: number[], theta: number, h: number, out: number[]): void {
    hermite(this.phase.y, next, this.rate, this.nextRate, h, theta, out);
  }

  private firstEvent(y: number[], amps: number, from: number, to: number, h: number, next: number[]): Event | null {
    let first: Event | null = null;
    for (const watch of this.watches) {
      if (watch.value(y, amps) < 0) continue;
      const scratch = new Array<number>(y.length).fill(0);
      const at = (theta: number) => {
        this.interpolate(next, theta, h, scratch);
        return watch.value(scratch, this.laws.amps(this.law, scratch));
      };
      const start = at(from);
      const theta = start >= 0 ? from : findRoot(at, from, start, to, at(to), 1e-9);
      if (!first || theta < first.theta) first = { theta, watch, slope: slopeAt(at, theta) };
    }
    return first;
  }

  /** Takes the step only as far as the event, and corrects for the interpolant's error once. */
  private cut(event: Event, h: number): Ending | null {
    const { phase, laws, law, method } = this;
    const ending = event.watch.ending;
    let cutS = event.theta * h;
    if (cutS <= 1e-9 + 1e-14 * phase.s && ending.kind === 'switch') {
      // Two laws that touch without crossing would hand over for ever: after a few times take the step as it is.
      if (++phase.idleSwitches < 4) return ending;
      cutS = h;
    }
    phase.idleSwitches = 0;
    for (let pass = 0; pass < 2 && cutS > 0; pass++) {
      method.step(phase.y, cutS, this.amps, this.gradient);
      if (pass === 1 || cutS === h) break;
      const miss = event.watch.value(method.result, laws.amps(law, method.result));
      const moved = event.slope > 0 ? (-miss / event.slope) * h : 0;
      cutS = Math.min(h, Math.max(0, cutS + moved));
    }
    const next = cutS > 0 ? method.result.slice() : phase.y.slice();
    const amps = laws.amps(law, next);
    this.rates(next, amps, this.nextRate);
    this.interpolate(next, 0.5, cutS, this.middle);
    this.commit(next, amps, this.middle, laws.amps(law, this.middle), cutS);
    return ending;
  }
}

interface Event {
  theta: number;
  watch: Watch;
  /** Change of the watched value for the whole step, at the event. */
  slope: number;
}

function slopeAt(value: (theta: number) => number, theta: number): number {
  const before = Math.max(0, theta - 1e-4);
  return (value(before + 1e-4) - value(before)) / 1e-4;
}
