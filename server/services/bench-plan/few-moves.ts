/**
 * Of plans that are as good the one that moves the fewest charges: a plan that shuffles five where one has to move is no
 * better to those who carry it out.
 */
import {
  busyOf,
  mayBegin,
  onChannels,
  placedBy,
  spansOf,
  type BenchModel,
  type Movable,
  type Placed,
} from './bench-model';
import type { HeldSpan } from './held-spans';
import { idOf, isSamePlace, LEAST_SOONER_MS, worthOf, type Placements, type Worth } from './present-plan';
import { earliestBegin, overlaps } from './spans';

/** As late, but for rounding, ms. */
const SAME_LATE_MS = 1000;

/**
 * @param present where the charges stand when nobody changes anything
 * @param found the best plan
 */
export function fewMoves(model: BenchModel, present: Placements, found: Placements): Placements {
  const best = worthOf(model.movables, found);
  const isAsGood = (plan: Placements): boolean => {
    const { lateMs, endsAt } = worthOf(model.movables, plan);
    return lateMs <= best.lateMs + SAME_LATE_MS && endsAt <= best.endsAt + LEAST_SOONER_MS;
  };
  const plans = [takenBack(model, present, found), oneByOne(model, present, isAsGood)].filter(isAsGood);
  return plans.sort((a, b) => movesOf(model, a) - movesOf(model, b))[0] ?? found;
}

/** Against what is written: what today's plan pushes aside has moved too. */
const movesOf = ({ movables }: BenchModel, plan: Placements): number =>
  movables.filter((movable) => !isSamePlace(movable.present, plan.get(idOf(movable))!)).length;

const isBetter = (one: Worth, other: Worth): boolean =>
  one.lateMs < other.lateMs - SAME_LATE_MS || (one.lateMs <= other.lateMs && one.endsAt < other.endsAt - 1000);

/** The best plan with every charge put back that can stay where it is. */
function takenBack(model: BenchModel, present: Placements, found: Placements): Placements {
  const plan = new Map(found);
  let worth = worthOf(model.movables, plan);
  for (let again = true; again;) {
    again = false;
    for (const movable of model.movables) {
      const stays = present.get(idOf(movable))!;
      if (plan.get(idOf(movable)) === stays || !fits(model, movable, stays, plan)) continue;
      const tried = new Map(plan).set(idOf(movable), stays);
      const now = worthOf(model.movables, tried);
      if (isBetter(worth, now)) continue;
      plan.set(idOf(movable), stays);
      worth = now;
      again = true;
    }
  }
  return plan;
}

/** Today's plan with one charge moved after the other, each time the one that gains most, until it is as good. */
function oneByOne(model: BenchModel, present: Placements, isDone: (plan: Placements) => boolean): Placements {
  let plan = new Map(present);
  for (let moves = 0; moves < model.movables.length && !isDone(plan); moves += 1) {
    let worth = worthOf(model.movables, plan);
    let next: Placements | null = null;
    for (const movable of model.movables)
      for (const placed of placesOf(model, movable, plan)) {
        const tried = new Map(plan).set(idOf(movable), placed);
        const now = worthOf(model.movables, tried);
        if (isBetter(now, worth)) [worth, next] = [now, tried];
      }
    if (next === null) break;
    plan = next;
  }
  return plan;
}

const others = (model: BenchModel, movable: Movable, plan: Placements): HeldSpan[] => [
  ...model.taken,
  ...[...plan].filter(([id]) => id !== idOf(movable)).flatMap(([, one]) => spansOf(one)),
];

/** The soonest place on every channel that can, everything else staying where it is. */
function placesOf(model: BenchModel, movable: Movable, plan: Placements): Placed[] {
  const taken = others(model, movable, plan);
  return movable.alternatives.flatMap((alternative) => {
    // The minute in which the channel is let go is not begun in.
    const placed = placedBy(alternative, 0);
    const at = earliestBegin(
      mayBegin(model, movable.file, placed.busyMs),
      onChannels(taken, placed.channelIds).map(({ from, to }) => ({ from, to: Math.ceil(to / 60_000) * 60_000 })),
      placed.busyMs,
    );
    return at === null ? [] : [{ ...placed, at }];
  });
}

function fits(model: BenchModel, movable: Movable, placed: Placed, plan: Placements): boolean {
  const taken = onChannels(others(model, movable, plan), placed.channelIds);
  if (taken.some((one) => overlaps(one, busyOf(placed)))) return false;
  return mayBegin(model, movable.file, placed.busyMs).some(({ from, to }) => placed.at >= from && placed.at <= to);
}
