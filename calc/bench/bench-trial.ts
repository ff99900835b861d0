import { firstStart, secondsOver, type BenchModel } from './bench-model';
import { SAME_S, type BenchScore } from './bench-score';

/** A job put by an alternative at a place of the list. */
export interface Put {
  at: number;
  job: number;
  way: number;
}

/** Tries changes of one order, and reads again only what they touch. */
export interface BenchTrial {
  /** Of the last change that was tried to its end. */
  score: BenchScore;
  /** The list that changes are tried on from now on. */
  base: (list: Int32Array, alternative: Int32Array) => void;
  /**
   * The list with a job more, before what stands at `put.at`; false: worse than `limit`, and sure to be so unless another
   * job loses its place, which may let later ones begin earlier.
   */
  insert: (put: Put, limit: BenchScore) => boolean;
  /** The list with another job at two of its places, `one.at` before `other.at`; false: worse than `limit`. */
  replace: (one: Put, other: Put, limit: BenchScore) => boolean;
}

/**
 * Reads a changed order like `benchDecoder`, but goes only to jobs on a channel that the change leaves free at another
 * time than before: from one to the next on that channel, until it is free again when it was.
 */
export function benchTrial(model: BenchModel): BenchTrial {
  const { busy, ready, guard, due, weight, firstHeld, held, channels, overPrice } = model;
  const most = model.source.length;
  const jobs = new Int32Array(most);
  const ways = new Int32Array(most);
  let length = 0;
  /** Per place and channel: when it is free before the job there, and the first place from there on whose job holds it. */
  const freeAt = new Float64Array((most + 1) * channels);
  const nextOn = new Int32Array((most + 1) * channels);
  /** Per place what its job starts at and costs; from each place on what late starts cost at most. */
  const starts = new Float64Array(most);
  const lates = new Float64Array(most);
  const overFrom = new Float64Array(most + 1);
  const whole = { unplaced: 0, lateS: 0 };

  /** Channels free at another time than in the base, and when; places read again, and their new starts. */
  const isMoved = new Uint8Array(channels);
  const moved = new Int32Array(channels);
  let movedCount = 0;
  const free = new Float64Array(channels);
  const readAt = new Int32Array(most);
  const newStarts = new Float64Array(most);
  let run = 0;
  let [unplaced, late] = [0, 0];
  const score: BenchScore = { unplaced: 0, lateS: 0, makespanS: 0, startsS: 0 };

  const costOf = (job: number, way: number, start: number): number => {
    if (start === Infinity) return 0;
    const over = start + guard[way]! - due[job]!;
    const cost = over > 0 ? weight[job]! * over : 0;
    return overPrice > 0 ? cost + overPrice * secondsOver(model, way, start) : cost;
  };
  const move = (channel: number, freeS: number) => {
    free[channel] = freeS;
    if (isMoved[channel]) return;
    isMoved[channel] = 1;
    moved[movedCount] = channel;
    movedCount += 1;
  };
  /** The channel is free again when it was. */
  const settle = (channel: number) => {
    if (!isMoved[channel]) return;
    isMoved[channel] = 0;
    movedCount -= 1;
    for (let at = 0; at < movedCount; at += 1)
      if (moved[at] === channel) {
        moved[at] = moved[movedCount]!;
        return;
      }
  };
  const startOf = (way: number, at: number): number => {
    let from = 0;
    for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) {
      const channel = held[h]!;
      const freeS = isMoved[channel] ? free[channel]! : freeAt[at * channels + channel]!;
      if (freeS > from) from = freeS;
    }
    return firstStart(model, way, from);
  };
  /** A job that is not in the base, before what is at the place. */
  const put = ({ at, job, way }: Put): number => {
    const start = startOf(way, at);
    if (start === Infinity) unplaced += 1;
    else for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) move(held[h]!, start + busy[way]!);
    late += costOf(job, way, start);
    return start;
  };
  /** The job of the base at a place is not there any more: its channels stay as free as before it. */
  const skip = (at: number) => {
    const way = ways[at]!;
    if (starts[at] === Infinity) unplaced -= 1;
    late -= lates[at]!;
    for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1)
      if (!isMoved[held[h]!]) move(held[h]!, freeAt[at * channels + held[h]!]!);
  };
  /** A job of the base, of which a channel has moved. */
  const readAgain = (at: number) => {
    const way = ways[at]!;
    const start = startOf(way, at);
    readAt[at] = run;
    newStarts[at] = start;
    unplaced += Number(start === Infinity) - Number(starts[at] === Infinity);
    late += costOf(jobs[at]!, way, start) - lates[at]!;
    for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) {
      const channel = held[h]!;
      const before = isMoved[channel] ? free[channel]! : freeAt[at * channels + channel]!;
      const freeS = start === Infinity ? before : start + busy[way]!;
      if (freeS === freeAt[(at + 1) * channels + channel]!) settle(channel);
      else move(channel, freeS);
    }
  };
  /** Reads again what has moved from a place to another; `limit`: nothing in the list can begin earlier than it did. */
  const walk = (from: number, to: number, limit: BenchScore | null): boolean => {
    for (let at = from; ;) {
      let next = length;
      for (let k = 0; k < movedCount; k += 1) {
        const on = nextOn[at * channels + moved[k]!]!;
        if (on < next) next = on;
      }
      if (next >= to) return true;
      readAgain(next);
      at = next + 1;
      // What comes later can only cost more, but for late starts that become early ones of the next morning.
      if (limit && isWorse(limit, overFrom[at]!)) return false;
    }
  };
  const isWorse = (limit: BenchScore, lessS: number) =>
    unplaced > limit.unplaced || (unplaced === limit.unplaced && late - lessS > limit.lateS + SAME_S);
  const begin = () => {
    for (let k = 0; k < movedCount; k += 1) isMoved[moved[k]!] = 0;
    movedCount = 0;
    run += 1;
    unplaced = whole.unplaced;
    late = whole.lateS;
    score.makespanS = 0;
    score.startsS = 0;
  };
  const count = (way: number, start: number) => {
    if (start === Infinity) return;
    if (start + ready[way]! > score.makespanS) score.makespanS = start + ready[way]!;
    score.startsS += start;
  };
  /** What is no worse by its lateness is summed up in full; places in `without` are not of the base any more. */
  const end = (limit: BenchScore, without: readonly number[] = []): boolean => {
    if (isWorse(limit, 0)) return false;
    for (let at = 0; at < length; at += 1)
      if (!without.includes(at)) count(ways[at]!, readAt[at] === run ? newStarts[at]! : starts[at]!);
    score.unplaced = unplaced;
    score.lateS = late;
    return true;
  };

  return {
    score,
    base: (list, alternative) => {
      length = list.length;
      whole.unplaced = 0;
      whole.lateS = 0;
      begin();
      freeAt.fill(0, 0, channels);
      for (let at = 0; at < length; at += 1) {
        const job = list[at]!;
        const way = alternative[job]!;
        jobs[at] = job;
        ways[at] = way;
        const start = startOf(way, at);
        starts[at] = start;
        lates[at] = costOf(job, way, start);
        whole.lateS += lates[at]!;
        const row = at * channels;
        for (let channel = 0; channel < channels; channel += 1)
          freeAt[row + channels + channel] = freeAt[row + channel]!;
        if (start === Infinity) whole.unplaced += 1;
        else
          for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1)
            freeAt[row + channels + held[h]!] = start + busy[way]!;
      }
      nextOn.fill(length, length * channels, (length + 1) * channels);
      overFrom[length] = 0;
      for (let at = length - 1; at >= 0; at -= 1) {
        const way = ways[at]!;
        const row = at * channels;
        for (let channel = 0; channel < channels; channel += 1)
          nextOn[row + channel] = nextOn[row + channels + channel]!;
        for (let h = firstHeld[way]!; h < firstHeld[way + 1]!; h += 1) nextOn[row + held[h]!] = at;
        const over = overPrice > 0 && starts[at]! < Infinity ? secondsOver(model, way, starts[at]!) : 0;
        overFrom[at] = overFrom[at + 1]! + overPrice * over;
      }
    },
    insert: (one, limit) => {
      begin();
      count(one.way, put(one));
      if (isWorse(limit, overFrom[one.at]!) || !walk(one.at, length, limit)) return false;
      return end(limit);
    },
    replace: (one, other, limit) => {
      begin();
      skip(one.at);
      count(one.way, put(one));
      walk(one.at + 1, other.at, null);
      skip(other.at);
      count(other.way, put(other));
      walk(other.at + 1, length, null);
      return end(limit, [one.at, other.at]);
    },
  };
}
