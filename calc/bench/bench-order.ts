import type { BenchOrder } from './bench-decode';
import type { BenchModel } from './bench-model';
import type { BenchScore } from './bench-score';

/** An order with what it is worth. */
export interface ScoredOrder extends BenchOrder {
  score: BenchScore;
}

/** One of its own, which later changes leave alone. */
export const copyOfOrder = ({ order, alternative, score }: ScoredOrder): ScoredOrder => ({
  order: order.slice(),
  alternative: alternative.slice(),
  score: { ...score },
});

/** Takes what stands at one place of a list to another; what is between moves up. */
export function moveTo(order: Int32Array, at: number, to: number): void {
  const one = order[at]!;
  if (to < at) order.copyWithin(to + 1, to, at);
  else order.copyWithin(at, at + 1, to + 1);
  order[to] = one;
}

/** Which jobs and alternatives get in each other's way: the same for all models of one problem. */
export interface BenchReach {
  /** Whether two alternatives have a channel in common. */
  shares: (one: number, other: number) => boolean;
  /** The alternative of a job that holds the channels of another job's; −1: it has none. */
  twin: (job: number, of: number) => number;
}

/** Looks all pairs of sets of channels up once; there are few of those, however many jobs. */
export function benchReach({ source, busy, firstHeld, held, firstAlternative }: BenchModel): BenchReach {
  const keys = Array.from(busy, (_, way) => [...held.subarray(firstHeld[way]!, firstHeld[way + 1]!)].sort().join());
  const numberOf = new Map([...new Set(keys)].map((key, at) => [key, at]));
  const setOf = Int32Array.from(keys, (key) => numberOf.get(key)!);
  const sets = numberOf.size;
  const channels = [...numberOf.keys()].map((key) => key.split(','));
  const common = new Uint8Array(sets * sets);
  for (let one = 0; one < sets; one += 1)
    for (let other = 0; other < sets; other += 1)
      if (channels[one]!.some((channel) => channels[other]!.includes(channel))) common[one * sets + other] = 1;
  const known = new Int32Array(source.length * sets).fill(-1);
  for (let job = 0; job < source.length; job += 1)
    for (let way = firstAlternative[job]!; way < firstAlternative[job + 1]!; way += 1)
      known[job * sets + setOf[way]!] = way;
  return {
    shares: (one, other) => common[setOf[one]! * sets + setOf[other]!] === 1,
    twin: (job, of) => known[job * sets + setOf[of]!]!,
  };
}
