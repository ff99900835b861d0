/** Today's plan as it will come about: what runs late pushes what waits behind it. */
import { lateMs, mayBegin, onChannels, spansOf, type BenchModel, type Movable, type Placed } from './bench-model';
import { earliestBegin } from './spans';
import type { HeldSpan } from './held-spans';

/** A place this much off the planned one is the planned one still, ms. */
export const SAME_MS = 5 * 60_000;

/** Nobody clips on at 11:58:38. */
const wholeMinute = (at: number): number => Math.ceil(at / 60_000) * 60_000;

export type Placements = Map<string, Placed>;
export const idOf = ({ file }: Movable): string => file.charge.id;

/**
 * Where each charge stands when nobody changes anything: on its own channels, in the order of the planned clip-ons, not
 * before its time, the channel being free and somebody there. One that finds no such time stays as it is planned.
 */
export function presentPlan(model: BenchModel): Placements {
  const placements: Placements = new Map();
  const taken: HeldSpan[] = [...model.taken];
  for (const movable of [...model.movables].sort((a, b) => a.present.at - b.present.at)) {
    const { present, file } = movable;
    const wished = Math.max(present.at, model.origin);
    const begins = earliestBegin(
      mayBegin(model, file, present.busyMs),
      onChannels(taken, present.channelIds),
      present.busyMs,
      wished,
    );
    const placed = { ...present, at: begins === null || begins === wished ? wished : wholeMinute(begins) };
    placements.set(idOf(movable), placed);
    taken.push(...spansOf(placed));
  }
  return placements;
}

/** All being ready less than this sooner is not worth a change, ms. */
export const LEAST_SOONER_MS = 30 * 60_000;

export interface Worth {
  /** Σ weight · lateness, ms. */
  lateMs: number;
  /** When the last is ready, epoch ms; 0: none waits. */
  endsAt: number;
}

export function worthOf(movables: readonly Movable[], placements: Placements): Worth {
  let late = 0;
  let endsAt = 0;
  for (const movable of movables) {
    const placed = placements.get(idOf(movable));
    if (!placed) continue;
    late += movable.weight * lateMs(movable.dueAt, placed);
    endsAt = Math.max(endsAt, placed.at + placed.totalS.p50 * 1000);
  }
  return { lateMs: late, endsAt };
}

/** On the same channels, at the same time but for some minutes. */
export const isSamePlace = (one: Placed, other: Placed): boolean =>
  [...one.channelIds].sort().join() === [...other.channelIds].sort().join() && Math.abs(one.at - other.at) < SAME_MS;
