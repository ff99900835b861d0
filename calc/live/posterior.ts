import type { PlanModel } from '../plan/plan-model';
import type { Sample } from '../plan/samples';
import { choleskyInverse, choleskySolve } from '../statistics/cholesky-solve';
import { choleskyLower, effectiveSampleSize } from '../statistics/particle-weights';
import { weightedCovariance } from '../statistics/weighted-covariance';
import { liveSample } from './live-draws';
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
  samples: Sample[];
  weights: Float64Array;
  /** `MEMORY_COUNT` a sample. */
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
 * How far each look is off in one sample, in standard deviations, with the errors that looks share followed on the way.
 *
 * @param memory takes what the sample has for the shared errors in the end
 */
function offIn(chain: readonly Chain[], sample: Sample, memory: Float64Array, into: Float64Array): void {
  memory.fill(0);
  for (let at = 0; at < chain.length; at += 1) {
    const { look, column, kept, gain, perSd } = chain[at]!;
    const prior = kept * memory[column]!;
    let off = look.residual(sample) - look.sharedSd * prior;
    if (look.otherResidual) {
      const other = look.otherResidual(sample) - look.sharedSd * prior;
      if (Math.abs(other) < Math.abs(off)) off = other;
    }
    memory[column] = prior + gain * off;
    into[at] = off * perSd;
  }
}

/**
 * The samples of a charge by all its readings at once: drawn evenly about the likeliest draws, as wide as the readings leave
 * them, each with its exact weight (importance sampling about a Gauss–Newton fit). Unlike samples that are resampled reading
 * by reading, their middle does not wander with the seed.
 *
 * @param draws even standard normal draws of all axes; those that nothing was read of stay as they are
 * @param axes that readings say something of
 */
export function posteriorOf(
  model: PlanModel,
  looks: readonly Look[],
  draws: readonly (readonly number[])[],
  axes: readonly number[],
): Posterior {
  const chain = chainOf(looks);
  const size = axes.length;
  const count = draws.length;
  const memory = new Float64Array(MEMORY_COUNT);
  const full = new Array<number>(draws[0]!.length).fill(0);
  const at = (x: Float64Array, into: Float64Array): void => {
    const own = full.slice();
    for (let k = 0; k < size; k += 1) own[axes[k]!] = x[k]!;
    offIn(chain, liveSample(model, own), memory, into);
  };
  let { centre, lower } = fit(at, chain.length, size);
  let best: (Posterior & { worth: number }) | null = null;
  const off = new Float64Array(chain.length);
  for (let round = 1; ; round += 1) {
    const samples: Sample[] = [];
    const logs = new Float64Array(count);
    const memories = new Float64Array(count * MEMORY_COUNT);
    const rows = new Float64Array(count * size);
    for (let one = 0; one < count; one += 1) {
      const own = draws[one]!.slice();
      let log = 0;
      for (let k = 0; k < size; k += 1) {
        const z = draws[one]![axes[k]!]!;
        let value = centre[k]!;
        for (let j = 0; j <= k; j += 1) value += lower[k * size + j]! * draws[one]![axes[j]!]!;
        own[axes[k]!] = value;
        rows[one * size + k] = value;
        log += 0.5 * (z * z - value * value);
      }
      const sample = liveSample(model, own);
      samples.push(sample);
      offIn(chain, sample, memory, off);
      for (let k = 0; k < off.length; k += 1) log -= 0.5 * off[k]! * off[k]!;
      memories.set(memory, one * MEMORY_COUNT);
      logs[one] = log;
    }
    const weights = weightsOf(logs, 1);
    const worth = effectiveSampleSize(weights);
    if (best === null || worth > best.worth) best = { samples, weights, memory: memories, worth };
    if (round === MOST_ROUNDS || worth >= ENOUGH_SHARE * count) return best;
    ({ centre, lower } = about(rows, flattened(logs, COUNT_AN_AXIS * size), size));
  }
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
function fit(at: (x: Float64Array, into: Float64Array) => void, looks: number, size: number) {
  const centre = new Float64Array(size);
  const base = new Float64Array(looks);
  const moved = new Float64Array(looks);
  const slopes = new Float64Array(looks * size);
  const normal = new Float64Array(size * size);
  let worth = Infinity;
  const worthOf = (x: Float64Array): number => {
    at(x, moved);
    return moved.reduce((sum, one) => sum + one * one, 0) + x.reduce((sum, one) => sum + one * one, 0);
  };
  for (let step = 0; step < MOST_STEPS; step += 1) {
    at(centre, base);
    worth = base.reduce((sum, one) => sum + one * one, 0) + centre.reduce((sum, one) => sum + one * one, 0);
    for (let k = 0; k < size; k += 1) {
      const x = centre.slice();
      x[k] = x[k]! + NUDGE;
      at(x, moved);
      for (let row = 0; row < looks; row += 1) slopes[row * size + k] = (moved[row]! - base[row]!) / NUDGE;
    }
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
      const x = centre.map((one, k) => one + share * move[k]!);
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
