import { CalcInputError } from '../errors';
import { guardedUntil, openFrom } from './open-time';
import { KeyHeap } from './key-heap';
import type { QueueInput, QueueResult, WaitsControl } from './waits-types';

const TELL_EVERY = 8192;
const MOST_KINDS = 20;

/**
 * Discrete-event simulation of charges that come to channels of several kinds: whenever a channel and somebody is free,
 * the waiting charge that is due first goes to the free kind that has it done soonest. A charge begins only while somebody
 * is there, and only where no absence longer than the look-in interval falls into it, unless it may run unwatched.
 *
 * @returns begin and end of every charge, min; null: it was told to stop
 * @throws CalcInputError for arrivals out of order, no channel or a service that is no number above 0
 */
export function simulateQueue(input: QueueInput, control: WaitsControl = {}): QueueResult | null {
  const { arrivalMinutes, dueMinutes, channels, serviceMinutes, mayRunUnwatched } = input;
  const count = arrivalMinutes.length;
  const kinds = channels.length;
  if (kinds === 0 || kinds > MOST_KINDS) throw new CalcInputError('channels', kinds, `1 to ${MOST_KINDS} kinds`);
  for (const each of channels)
    if (!Number.isInteger(each) || each < 0) throw new CalcInputError('channels', each, 'a whole number, 0 or more');
  const startMinutes = new Float64Array(count).fill(NaN);
  const endMinutes = new Float64Array(count).fill(NaN);
  const kindOf = new Int32Array(count).fill(-1);
  const service = new Float64Array(count * kinds);
  const idle = [...channels];
  const open = openFrom(input.open);
  const guarded = guardedUntil(input.open, input.lookInMinutes);
  const running = new KeyHeap();
  const waiting = new Map<number, KeyHeap>();
  let next = 0;
  let waits = 0;
  let now = -Infinity;
  let begun = 0;
  let events = 0;

  const come = (charge: number) => {
    let mask = 0;
    for (let kind = 0; kind < kinds; kind += 1) {
      const takes = channels[kind]! > 0 ? serviceMinutes(charge, kind) : null;
      if (takes !== null && !(takes > 0 && takes < Infinity))
        throw new CalcInputError('serviceMinutes', takes, 'a number above 0, or null');
      service[charge * kinds + kind] = takes ?? Infinity;
      if (takes !== null) mask |= 1 << kind;
    }
    if (mask === 0) return;
    let heap = waiting.get(mask);
    if (!heap) waiting.set(mask, (heap = new KeyHeap()));
    heap.push(dueMinutes?.[charge] ?? arrivalMinutes[charge]!, charge);
    waits += 1;
  };

  /** The free kind that has it done soonest and may begin it now; −1: none. */
  const bestKind = (charge: number, until: number): number => {
    const unwatched = mayRunUnwatched?.(charge) ?? false;
    let best = -1;
    let least = Infinity;
    for (let kind = 0; kind < kinds; kind += 1) {
      const takes = service[charge * kinds + kind]!;
      if (idle[kind]! > 0 && takes < least && (unwatched || now + takes <= until)) [best, least] = [kind, takes];
    }
    return best;
  };

  const dispatch = () => {
    const until = guarded(now);
    const aside: [KeyHeap, number, number][] = [];
    for (;;) {
      let free = 0;
      for (let kind = 0; kind < kinds; kind += 1) if (idle[kind]! > 0) free |= 1 << kind;
      let first: KeyHeap | null = null;
      for (const [mask, heap] of waiting)
        if ((mask & free) !== 0 && heap.size > 0 && (!first || heap.before(first))) first = heap;
      if (!first) break;
      const key = first.topKey();
      const charge = first.pop();
      const kind = bestKind(charge, until);
      if (kind < 0) {
        aside.push([first, key, charge]);
        continue;
      }
      startMinutes[charge] = now;
      endMinutes[charge] = now + service[charge * kinds + kind]!;
      kindOf[charge] = kind;
      idle[kind]! -= 1;
      running.push(endMinutes[charge]!, charge);
      waits -= 1;
      begun += 1;
    }
    for (const [heap, key, charge] of aside) heap.push(key, charge);
  };

  for (;;) {
    const opens = waits > 0 ? open.nextAfter(now) : Infinity;
    const at = Math.min(next < count ? arrivalMinutes[next]! : Infinity, running.topKey(), opens);
    if (at === Infinity) break;
    if (!(at >= now)) throw new CalcInputError('arrivalMinutes', at, 'numbers in rising order');
    now = at;
    while (next < count && arrivalMinutes[next]! <= now) {
      if (!(arrivalMinutes[next]! >= now)) throw new CalcInputError('arrivalMinutes', next, 'numbers in rising order');
      come(next);
      next += 1;
    }
    while (running.topKey() <= now) idle[kindOf[running.pop()]!]! += 1;
    if (waits > 0 && open.isOpen(now)) dispatch();
    events += 1;
    if (events % TELL_EVERY === 0) {
      control.progress?.(begun, count);
      if (control.shouldStop?.()) return null;
    }
  }
  control.progress?.(begun, count);
  return { startMinutes, endMinutes, kind: kindOf, unplaced: count - begun };
}
