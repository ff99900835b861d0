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

/** The alternative of a job that holds the channels of another job's; −1: it has none. */
export function twins({
  source,
  busy,
  firstHeld,
  held,
  firstAlternative,
}: BenchModel): (job: number, of: number) => number {
  const key = (way: number) => [...held.subarray(firstHeld[way]!, firstHeld[way + 1]!)].sort((a, b) => a - b).join();
  const keys = Array.from(busy, (_, way) => key(way));
  const ways = busy.length;
  const known = new Int32Array(source.length * ways).fill(-1);
  for (let job = 0; job < source.length; job += 1)
    for (let of = 0; of < ways; of += 1)
      for (let way = firstAlternative[job]!; way < firstAlternative[job + 1]!; way += 1)
        if (keys[way] === keys[of]) known[job * ways + of] = way;
  return (job, of) => known[job * ways + of]!;
}

/** Whether two alternatives have a channel in common. */
export function shareChannels({ busy, firstHeld, held }: BenchModel): (one: number, other: number) => boolean {
  const ways = busy.length;
  const common = new Uint8Array(ways * ways);
  const channels = Array.from({ length: ways }, (_, way) => held.subarray(firstHeld[way]!, firstHeld[way + 1]!));
  for (let one = 0; one < ways; one += 1)
    for (let other = 0; other < ways; other += 1)
      if (channels[one]!.some((channel) => channels[other]!.includes(channel))) common[one * ways + other] = 1;
  return (one, other) => common[one * ways + other] === 1;
}
