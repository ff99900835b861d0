import { choleskyInverse, choleskySolve } from '../statistics/cholesky-solve';
import { choleskyLower, effectiveSampleSize } from '../statistics/particle-weights';
import { weightedCovariance } from '../statistics/weighted-covariance';
import { LIVE_AXES } from './live-draws';
import type { LiveFacts } from './live-facts';
import { MEMORIES, type Look } from './particle-set';

const MEMORY_COUNT = 4;
/** Gauss–Newton steps to the likeliest draws; each halves what is left or better. */
const MOST_STEPS = 6;
/** A step this short is the last one, standard deviations. */
const SHORT = 0.02;
/** Of the difference quotient, standard deviations. */
const NUDGE = 0.05;
/** The draws stand this much wider about the likeliest ones than a straight model would have them, so that no tail is missed. */
const WIDER = 1.15;
/** Redrawn about what the first draws have weighed, where fewer than this share of them count. */
const ENOUGH_SHARE = 0.5;
const MOST_ROUNDS = 5;
/** For that the weights are flattened until so many draws an axis count: a spread seen by fewer is chance. */
const COUNT_AN_AXIS = 8;

/** Samples that stand for all that was read, with their weights and what each has for the shared errors. */
export interface Posterior {
  /** `LIVE_AXES` a sample. */
  draws: Float64Array;
  /** Their facts. */
  columns: Float64Array;
  weights: Float64Array;
  /** Of all samples kind by kind. */
  memory: Float64Array;
}

interface Chain {
  look: Look;
  column: number;
  kept: number;
  gain: number;
  /** Of the look less what is expected, 1/V. */
  perSd: number;
}

/** Gains and variances of the looks in a row: they are the same in every sample. */
function chainOf(looks: readonly Look[]): Chain[] {
  const variance = [NaN, NaN, NaN, NaN];
  return looks.map((look) => {
    const column = MEMORIES[look.memory];
    const known = variance[column]!;
    const before = Number.isNaN(known) ? 1 : look.kept ** 2 * known + 1 - look.kept ** 2;
    const total = look.sharedSd ** 2 * before + look.ownVariance;
    const gain = (look.sharedSd * before) / total;
    const kept = Number.isNaN(known) ? 0 : look.kept;
    variance[column] = (1 - gain * look.sharedSd) * before;
    return { look, column, kept, gain, perSd: 1 / Math.sqrt(total) };
  });
}

/**
 * How far looks are off in each of so many samples, in standard deviations, with the errors that looks share followed on the
 * way: look by look, since all samples go through the same.
 */
class Offs {
  /** What each sample has for the shared errors in the end, of all samples kind by kind. */
  readonly memory: Float64Array;
  /** Sum of the squares in each. */
  readonly squares: Float64Array;
  private readonly residual: Float64Array;
  private readonly other: Float64Array;

  constructor(
    private readonly facts: LiveFacts,
    private readonly chain: readonly Chain[],
    private readonly count: number,
  ) {
    this.memory = new Float64Array(count * MEMORY_COUNT);
    this.squares = new Float64Array(count);
    this.residual = new Float64Array(count);
    this.other = new Float64Array(count);
  }

  /**
   * @param columns facts of the samples
   * @param into takes the looks one after the other, `count` each
   */
  follow(columns: Float64Array, into?: Float64Array): void {
    const { facts, chain, count, memory, squares, residual, other } = this;
    memory.fill(0);
    squares.fill(0);
    for (let row = 0; row < chain.length; row += 1) {
      const { look, column, kept, gain, perSd } = chain[row]!;
      const { sharedSd, otherResidual } = look;
      facts.residuals(look.residual, columns, residual);
      if (otherResidual) facts.residuals(otherResidual, columns, other);
      for (let at = 0; at < count; at += 1) {
        const place = column * count + at;
        const prior = kept * memory[place]!;
        let own = residual[at]! - sharedSd * prior;
        if (otherResidual) {
          const second = other[at]! - sharedSd * prior;
          if (Math.abs(second) < Math.abs(own)) own = second;
        }
        memory[place] = prior + gain * own;
        const off = own * perSd;
        squares[at] = squares[at]! + off * off;
        if (into) into[row * count + at] = off;
      }
    }
  }
}

/**
 * The samples of a charge by all its readings at once: drawn evenly about the likeliest draws, as wide as the readings leave
 * them, each with its exact weight (importance sampling about a Gauss–Newton fit). Unlike samples that are resampled reading
 * by reading, their middle does not wander with the seed.
 *
 * @param even standard normal draws of all axes; those that nothing was read of stay as they are
 * @param axes that readings say something of
 */
export function posteriorOf(
  facts: LiveFacts,
  looks: readonly Look[],
  even: Float64Array,
  axes: readonly number[],
): Posterior {
  const chain = chainOf(looks);
  const size = axes.length;
  const count = even.length / LIVE_AXES;
  const z = readDraws(even, axes);
  let { centre, lower } = fit(facts, chain, axes);
  let best: (Posterior & { worth: number }) | null = null;
  for (let round = 1; ; round += 1) {
    const draws = even.slice();
    const logs = new Float64Array(count);
    const values = new Float64Array(count * size);
    for (let at = 0; at < count; at += 1) {
      const from = at * size;
      let log = 0;
      for (let k = 0; k < size; k += 1) {
        let value = centre[k]!;
        for (let j = 0; j <= k; j += 1) value += lower[k * size + j]! * z[from + j]!;
        draws[at * LIVE_AXES + axes[k]!] = value;
        values[from + k] = value;
        log += 0.5 * (z[from + k]! * z[from + k]! - value * value);
      }
      logs[at] = log;
    }
    const columns = facts.columnsOf(draws);
    const offs = new Offs(facts, chain, count);
    offs.follow(columns);
    for (let at = 0; at < count; at += 1) logs[at] = logs[at]! - 0.5 * offs.squares[at]!;
    const weights = weightsOf(logs, 1);
    const worth = effectiveSampleSize(weights);
    if (best === null || worth > best.worth) best = { draws, columns, weights, memory: offs.memory, worth };
    if (round === MOST_ROUNDS || worth >= ENOUGH_SHARE * count) return best;
    ({ centre, lower } = about(values, flattened(logs, COUNT_AN_AXIS * size), size));
  }
}

/** The draws of the axes that readings say something of, a row a sample. */
function readDraws(even: Float64Array, axes: readonly number[]): Float64Array {
  const size = axes.length;
  const read = new Float64Array((even.length / LIVE_AXES) * size);
  for (let at = 0; at * size < read.length; at += 1)
    for (let k = 0; k < size; k += 1) read[at * size + k] = even[at * LIVE_AXES + axes[k]!]!;
  return read;
}

/** Weights of the logarithms, each taken times `power`; their sum is 1. */
function weightsOf(logs: Float64Array, power: number): Float64Array {
  const most = logs.reduce((high, one) => Math.max(high, one), -Infinity);
  const weights = logs.map((one) => Math.exp(power * (one - most)));
  const sum = weights.reduce((total, one) => total + one, 0);
  return weights.map((one) => one / sum);
}

/** The same with the largest power, 1 at most, that leaves so many draws effective. */
function flattened(logs: Float64Array, least: number): Float64Array {
  let weights = weightsOf(logs, 1);
  for (let power = 0.8; power > 0.01 && effectiveSampleSize(weights) < least; power *= 0.8)
    weights = weightsOf(logs, power);
  return weights;
}

/** The likeliest draws under readings and prior, and the spread about them where the model is straight. */
function fit(facts: LiveFacts, chain: readonly Chain[], axes: readonly number[]) {
  const size = axes.length;
  const looks = chain.length;
  const centre = new Float64Array(size);
  const base = new Float64Array(looks);
  const moved = new Float64Array(looks * size);
  const slopes = new Float64Array(looks * size);
  const normal = new Float64Array(size * size);
  const one = new Offs(facts, chain, 1);
  const nudged = new Offs(facts, chain, size);
  const worthOf = (x: Float64Array): number => {
    const own = new Float64Array(LIVE_AXES);
    for (let k = 0; k < size; k += 1) own[axes[k]!] = x[k]!;
    one.follow(facts.columnsOf(own), base);
    return one.squares[0]! + x.reduce((sum, value) => sum + value * value, 0);
  };
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const worth = worthOf(centre);
    const near = new Float64Array(size * LIVE_AXES);
    for (let k = 0; k < size; k += 1)
      for (let j = 0; j < size; j += 1) near[k * LIVE_AXES + axes[j]!] = centre[j]! + (j === k ? NUDGE : 0);
    nudged.follow(facts.columnsOf(near), moved);
    for (let row = 0; row < looks; row += 1)
      for (let k = 0; k < size; k += 1) slopes[row * size + k] = (moved[row * size + k]! - base[row]!) / NUDGE;
    normal.fill(0);
    const right = new Float64Array(size);
    for (let k = 0; k < size; k += 1) {
      right[k] = -centre[k]!;
      for (let row = 0; row < looks; row += 1) right[k] = right[k]! - slopes[row * size + k]! * base[row]!;
      for (let j = 0; j <= k; j += 1) {
        let sum = j === k ? 1 : 0;
        for (let row = 0; row < looks; row += 1) sum += slopes[row * size + k]! * slopes[row * size + j]!;
        normal[k * size + j] = sum;
        normal[j * size + k] = sum;
      }
    }
    const move = choleskySolve(choleskyLower(normal, size), right, size);
    let length = 0;
    for (let k = 0; k < size; k += 1) length = Math.max(length, Math.abs(move[k]!));
    // Where the model bends, a whole step may lead too far.
    for (let share = 1; share > 0.1; share /= 2) {
      const x = centre.map((from, k) => from + share * move[k]!);
      if (worthOf(x) <= worth || share <= 0.25) {
        centre.set(x);
        break;
      }
    }
    if (length < SHORT) break;
  }
  return { centre, lower: scaled(choleskyLower(choleskyInverse(choleskyLower(normal, size), size), size), WIDER) };
}

/** Mean and spread of weighted draws, a little wider. */
function about(rows: Float64Array, weights: Float64Array, size: number) {
  const centre = new Float64Array(size);
  weights.forEach((weight, one) => {
    for (let k = 0; k < size; k += 1) centre[k] = centre[k]! + weight * rows[one * size + k]!;
  });
  const matrix = weightedCovariance(rows, centre, weights, size);
  return { centre, lower: scaled(choleskyLower(matrix, size), WIDER) };
}

const scaled = (matrix: Float64Array, by: number): Float64Array => matrix.map((one) => one * by);
