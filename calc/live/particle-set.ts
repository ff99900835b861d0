import { inverseNormal } from '../statistics/inverse-normal';
import { choleskyLower, effectiveSampleSize, systematicResample } from '../statistics/particle-weights';
import { seededRandom } from '../statistics/seeded-random';
import { weightedCovariance } from '../statistics/weighted-covariance';
import { liveDraws, LIVE_AXES } from './live-draws';
import { NO_PLACE, type LiveFacts, type Residual } from './live-facts';
import { posteriorOf } from './posterior';

/** Resampled below this share of the samples. */
const LEAST_SHARE = 0.5;
/**
 * How far a resampled sample is drawn to the mean before it is jittered, so that the set keeps its variance: (3δ − 1)/2δ with
 * δ = 0.95 (J. Liu, M. West, Combined parameter and state estimation in simulation-based filtering, 2001, from memory).
 */
const SHRINK = (3 * 0.95 - 1) / (2 * 0.95);
const JITTER = Math.sqrt(1 - SHRINK * SHRINK);
/** One reading is taken in by at most so many parts, each with its own resampling. */
const MOST_PARTS = 12;

/** Errors that a kind of reading carries from one to the next. */
export const MEMORIES = { volts: 0, amps: 1, celsius: 2, rest: 3 } as const;
export type Memory = keyof typeof MEMORIES;
const MEMORY_COUNT = 4;

/** One kind of reading under the samples: what was read less what each sample has for it. */
export interface Look {
  memory: Memory;
  residual: Residual;
  /** Where it is not known which of two things was read: what was read less the other; both are as likely. */
  otherResidual?: Residual;
  /** What one standard deviation of the error that the readings share makes here. */
  sharedSd: number;
  /** Share of it that is left since the last reading of the kind. */
  kept: number;
  /** The same where it can only change smoothly, for what is a jump; left out: as `kept`. */
  keptSmooth?: number;
  /** Of this reading alone, variance. */
  ownVariance: number;
}

/**
 * Weighted samples of a running charge.
 *
 * Each carries beside its draws what the model's error, the ammeter's and the thermometer's are likely to be by the readings so
 * far: a first-order process each, followed exactly (so that only the draws are sampled), with a variance that all samples
 * share. A hundred readings that share an error are therefore worth little more than one.
 */
export class ParticleSet {
  weights: Float64Array;
  /** `LIVE_AXES` a sample. */
  private draws: Float64Array;
  /** What the looks see of each. */
  private columns: Float64Array;
  /** The looks that were taken in, in their order. */
  private readonly taken: Look[] = [];
  /** What the shared errors are likely to be, of all samples kind by kind. */
  private memory: Float64Array;
  private readonly variance = [NaN, NaN, NaN, NaN];
  private readonly random: () => number;
  /** Room for one number of each sample. */
  private values: Float64Array;
  private readonly prior: Float64Array;
  private readonly off: Float64Array;
  private readonly log: Float64Array;
  /** The look that was asked for last, and of it what was read less what each sample has, and less the other. */
  private asked: Look | null = null;
  private residual: Float64Array;
  private other: Float64Array;
  /** Any reading was taken in. */
  read = false;

  /**
   * @param axes that readings say something of
   * @param count of the samples that judge each reading by those before it
   */
  constructor(
    private readonly facts: LiveFacts,
    private readonly axes: readonly number[],
    private count: number,
    private readonly seed: number,
  ) {
    this.draws = liveDraws(count, seed).slice();
    this.columns = facts.columnsOf(this.draws);
    this.weights = new Float64Array(count).fill(1 / count);
    this.memory = new Float64Array(count * MEMORY_COUNT);
    this.values = new Float64Array(count);
    this.prior = new Float64Array(count);
    this.off = new Float64Array(count);
    this.log = new Float64Array(count);
    this.residual = new Float64Array(count);
    this.other = new Float64Array(count);
    this.random = seededRandom(seed + 1);
  }

  /** Of one sample, in the order of `LIVE_AXES`. */
  drawsOf(at: number): number[] {
    const own: number[] = [];
    for (let axis = 0; axis < LIVE_AXES; axis += 1) own.push(this.draws[at * LIVE_AXES + axis]!);
    return own;
  }

  /** Mean and variance over the samples of a number that is straight in their facts. */
  moments(slopes: readonly number[]): { mean: number; variance: number } {
    this.facts.residuals({ read: 0, ...NO_PLACE, slopes }, this.columns, this.values);
    return this.momentsOf(this.values);
  }

  private momentsOf(values: Float64Array): { mean: number; variance: number } {
    const { weights, count } = this;
    let mean = 0;
    for (let at = 0; at < count; at += 1) mean += weights[at]! * values[at]!;
    let variance = 0;
    for (let at = 0; at < count; at += 1) variance += weights[at]! * (values[at]! - mean) ** 2;
    return { mean, variance };
  }

  /** Of the shared error now, in standard deviations: what one sample has for it, and the variance about that. */
  sharedOf(memory: Memory, at: number): { mean: number; variance: number | null } {
    const column = MEMORIES[memory];
    const variance = this.variance[column]!;
    return { mean: this.memory[column * this.count + at]!, variance: Number.isNaN(variance) ? null : variance };
  }

  /** Variance of the shared error before a look, of the whole of it. */
  private before({ memory }: Look, kept: number): number {
    const known = this.variance[MEMORIES[memory]]!;
    return Number.isNaN(known) ? 1 : kept ** 2 * known + 1 - kept ** 2;
  }

  /**
   * How far a look is off, in standard deviations: by the samples with the whole of the shared error (`level`), and from
   * where the readings before it have it (`jump`, null for the first of its kind).
   */
  offOf(look: Look, jumpSd: number): { level: number; jump: number | null } {
    const { memory, count, values } = this;
    const column = MEMORIES[look.memory];
    const nearer = this.nearerResidual(look);
    const level = this.momentsOf(nearer);
    const whole = Math.sqrt(level.variance + look.sharedSd ** 2 + look.ownVariance);
    if (Number.isNaN(this.variance[column]!)) return { level: level.mean / whole, jump: null };
    const kept = look.keptSmooth ?? look.kept;
    for (let at = 0; at < count; at += 1)
      values[at] = nearer[at]! - look.sharedSd * kept * memory[column * count + at]!;
    const step = this.momentsOf(values);
    const shared = look.sharedSd ** 2 * this.before(look, kept);
    const small = Math.sqrt(step.variance + shared + look.ownVariance + jumpSd ** 2);
    return { level: level.mean / whole, jump: step.mean / small };
  }

  /** What was read less what the samples have for it, mean. */
  meanOff(look: Look): number {
    this.ask(look);
    return this.momentsOf(this.residual).mean;
  }

  private nearerResidual(look: Look): Float64Array {
    this.ask(look);
    const { residual, other } = this;
    if (!look.otherResidual) return residual;
    const far = (of: Float64Array): number => Math.abs(this.momentsOf(of).mean);
    return far(residual) <= far(other) ? residual : other;
  }

  /** A look is judged before it is taken in: what the samples have for it is worked out once. */
  private ask(look: Look): void {
    if (this.asked === look) return;
    this.asked = look;
    this.facts.residuals(look.residual, this.columns, this.residual);
    if (look.otherResidual) this.facts.residuals(look.otherResidual, this.columns, this.other);
  }

  /** Reweights by a look; resamples with jitter where the effective sample size falls below half. */
  take(look: Look): void {
    this.read = true;
    this.taken.push(look);
    const column = MEMORIES[look.memory];
    const before = this.before(look, look.kept);
    const variance = look.sharedSd ** 2 * before + look.ownVariance;
    let left = 1;
    this.lookAt(look, variance);
    for (let part = 0; left > 0; part += 1) {
      left -= this.reweigh(left, part === MOST_PARTS);
      if (effectiveSampleSize(this.weights) <= LEAST_SHARE * this.count * 1.001) {
        this.resample();
        this.lookAt(look, variance);
      }
    }
    const gain = (look.sharedSd * before) / variance;
    for (let at = 0; at < this.count; at += 1)
      this.memory[column * this.count + at] = this.prior[at]! + gain * this.off[at]!;
    this.variance[column] = (1 - gain * look.sharedSd) * before;
  }

  /** Of each sample: what it expects of the shared error, how far off the look is then, and the logarithm of its likelihood. */
  private lookAt(look: Look, variance: number): void {
    this.ask(look);
    const { count, memory, prior, off, log, residual, other } = this;
    const column = MEMORIES[look.memory];
    const kept = Number.isNaN(this.variance[column]!) ? 0 : look.kept;
    for (let at = 0; at < count; at += 1) {
      prior[at] = kept * memory[column * count + at]!;
      off[at] = residual[at]! - look.sharedSd * prior[at]!;
      log[at] = (-0.5 * off[at]! * off[at]!) / variance;
    }
    if (!look.otherResidual) return;
    for (let at = 0; at < count; at += 1) {
      const own = off[at]!;
      const second = other[at]! - look.sharedSd * prior[at]!;
      const near = Math.abs(own) <= Math.abs(second) ? own : second;
      const far = near === own ? second : own;
      const ratio = Math.exp((-0.5 * (far * far - near * near)) / variance);
      off[at] = (near + ratio * far) / (1 + ratio);
      log[at] = (-0.5 * near * near) / variance + Math.log((1 + ratio) / 2);
    }
  }

  /**
   * Takes in the largest share of what is left of a look that keeps half the samples effective.
   *
   * @param whole takes it all, come what may
   * @returns the share
   */
  private reweigh(left: number, whole: boolean): number {
    const least = LEAST_SHARE * this.count;
    let most = -Infinity;
    for (let at = 0; at < this.count; at += 1) most = Math.max(most, this.log[at]!);
    let share = left;
    if (this.weighedBy(left, most) < least && !whole) {
      let low = 0;
      for (let pass = 0; pass < 12; pass += 1) {
        const middle = (low + share) / 2;
        if (this.weighedBy(middle, most) >= least) low = middle;
        else share = middle;
      }
      this.weighedBy(share, most);
    }
    const { count, weights, values } = this;
    let sum = 0;
    for (let at = 0; at < count; at += 1) sum += values[at]!;
    for (let at = 0; at < count; at += 1) weights[at] = values[at]! / sum;
    return share;
  }

  /** What the samples weigh after a share of the look, into `values`, and how many are effective then. */
  private weighedBy(share: number, most: number): number {
    const { count, weights, values, log } = this;
    let sum = 0;
    let squares = 0;
    for (let at = 0; at < count; at += 1) {
      const weight = weights[at]! * Math.exp(share * (log[at]! - most));
      values[at] = weight;
      sum += weight;
      squares += weight * weight;
    }
    return (sum * sum) / squares;
  }

  /**
   * Puts samples by all the looks at once in the place of those that were resampled look by look. No look is taken in after it.
   *
   * @param count of the samples then
   */
  settle(count: number): void {
    if (!this.read) return;
    const settled = posteriorOf(this.facts, this.taken, liveDraws(count, this.seed), this.axes);
    this.count = count;
    this.values = new Float64Array(count);
    this.residual = new Float64Array(count);
    this.other = new Float64Array(count);
    this.draws = settled.draws;
    this.columns = settled.columns;
    this.weights = settled.weights;
    this.memory = settled.memory;
    this.asked = null;
  }

  private resample(): void {
    const { axes, count, weights, draws } = this;
    // Errors that nothing was read of yet are the same in all.
    const columns = this.variance.flatMap((one, column) => (Number.isNaN(one) ? [] : [column]));
    const size = axes.length + columns.length;
    const rows = new Float64Array(count * size);
    const mean = new Float64Array(size);
    for (let at = 0; at < count; at += 1) {
      const own = at * LIVE_AXES;
      for (let k = 0; k < size; k += 1) {
        const value = k < axes.length ? draws[own + axes[k]!]! : this.memory[columns[k - axes.length]! * count + at]!;
        rows[at * size + k] = value;
        mean[k]! += weights[at]! * value;
      }
    }
    const lower = choleskyLower(weightedCovariance(rows, mean, weights, size), size);
    const picked = systematicResample(weights, this.random());
    const memory = new Float64Array(count * MEMORY_COUNT);
    const noise = new Float64Array(size);
    for (let at = 0; at < count; at += 1) {
      const from = picked[at]! * size;
      for (let k = 0; k < size; k += 1) noise[k] = JITTER * inverseNormal(Math.max(1e-12, this.random()));
      const own = at * LIVE_AXES;
      for (let k = 0; k < size; k += 1) {
        let value = mean[k]! + SHRINK * (rows[from + k]! - mean[k]!);
        for (let j = 0; j <= k; j += 1) value += lower[k * size + j]! * noise[j]!;
        if (k < axes.length) draws[own + axes[k]!] = value;
        else memory[columns[k - axes.length]! * count + at] = value;
      }
      this.facts.write(draws, this.columns, at);
    }
    this.memory = memory;
    this.asked = null;
    weights.fill(1 / count);
  }
}
