/** Whether there is a better plan than today's, and what it changes. */
import { createHash } from 'node:crypto';
import type { BenchProblem, BenchSolution } from '@/calc/bench/bench-types';
import type { BenchSolver } from './bench-solver';
import { mayBegin, onChannels, placedBy, spansOf, type BenchModel, type Movable, type Placed } from './bench-model';
import { fewMoves } from './few-moves';
import type { HeldSpan } from './held-spans';
import {
  idOf,
  isSamePlace,
  presentPlan,
  SAME_MS,
  worthOf,
  type Placements,
  type Worth,
  LEAST_SOONER_MS,
} from './present-plan';
import { united, type Stretch } from './spans';

/** Less lateness than this is not worth a change, ms. */
const LEAST_LATE_MS = 60_000;

export interface ProposedMove {
  movable: Movable;
  now: Placed;
  then: Placed;
}
export interface Proposal {
  id: string;
  model: BenchModel;
  /** Today's plan as it will come about. */
  present: Placements;
  moves: ProposedMove[];
  /** Charges that stay, in the order of their clip-ons. */
  stay: Movable[];
  unplaced: Movable[];
  worth: { now: Worth; then: Worth };
  proved: boolean;
}

/** @returns null where nothing is better */
export async function betterPlan(model: BenchModel, solver: BenchSolver): Promise<Proposal | null> {
  if (model.movables.length === 0) return null;
  const first = await solver.bench(problemOf(model));
  if (first.unplaced.length === 0) return compared(model, first, []);
  // What has no place under the rules stays where somebody has put it, and the others are planned around it.
  const isPlaced = (movable: Movable): boolean => !first.unplaced.includes(idOf(movable));
  const unplaced = model.movables.filter((movable) => !isPlaced(movable));
  const around: BenchModel = {
    ...model,
    movables: model.movables.filter(isPlaced),
    taken: [...model.taken, ...unplaced.flatMap(({ present }) => spansOf(present))],
  };
  return around.movables.length === 0 ? null : compared(around, await solver.bench(problemOf(around)), unplaced);
}

function compared(model: BenchModel, solution: BenchSolution, unplaced: Movable[]): Proposal | null {
  const found = placementsOf(model, solution);
  if (found.size < model.movables.length) return null;
  const present = presentPlan(model);
  const plan = fewMoves(model, present, found);
  const [now, then] = [worthOf(model.movables, present), worthOf(model.movables, plan)];
  const isBetter =
    then.lateMs < now.lateMs - LEAST_LATE_MS ||
    (then.lateMs <= now.lateMs && then.endsAt < now.endsAt - LEAST_SOONER_MS) ||
    // Those that are pushed aside today need another time, whatever they are worth.
    (then.lateMs <= now.lateMs && pushed(model, present).length > 0);
  if (!isBetter) return null;
  const moves: ProposedMove[] = [];
  const stay: Movable[] = [];
  for (const movable of model.movables) {
    const at = plan.get(idOf(movable))!;
    const stands = present.get(idOf(movable))!;
    // Against what is written on the plan: what is pushed aside gets its new time with it.
    if (isSamePlace(movable.present, at)) stay.push(movable);
    // One that only gets the time it will come to anyway is told against what is written.
    else moves.push({ movable, now: isSamePlace(stands, at) ? movable.present : stands, then: at });
  }
  if (moves.length === 0) return null;
  moves.sort((a, b) => a.then.at - b.then.at);
  stay.sort((a, b) => a.present.at - b.present.at);
  return { id: nameOf(moves), model, present, moves, stay, unplaced, worth: { now, then }, proved: solution.proved };
}

/** Charges in the queue that do not come to their turn when the plan says, though their time is still to come. */
export const pushed = ({ movables, origin }: BenchModel, present: Placements): Movable[] =>
  movables.filter(
    (movable) =>
      movable.file.charge.stage === 'queued' &&
      present.get(idOf(movable))!.at - Math.max(origin, movable.present.at) > SAME_MS,
  );

function problemOf(model: BenchModel): BenchProblem {
  const { origin, movables, taken, ground } = model;
  // Whole minutes, rounded to the safe side: nobody clips on at 11:58:38.
  const within = ({ from, to }: Stretch) => ({ fromS: minuteUp(from - origin), toS: minuteDown(to - origin) });
  const around = ({ channelId, from, to }: HeldSpan): HeldSpan => ({
    channelId,
    from: minuteDown(from - origin),
    to: minuteUp(to - origin),
  });
  const ids = ground.channels.map(({ id }) => id);
  return {
    taken: ids.map((channelId) =>
      united(onChannels(taken.map(around), [channelId])).map(({ from, to }) => ({ fromS: from, toS: to })),
    ),
    jobs: movables.map((movable) => ({
      id: idOf(movable),
      dueS: movable.dueAt === null ? null : (movable.dueAt - origin) / 1000,
      weight: movable.weight,
      alternatives: movable.alternatives.map((alternative) => ({
        channels: alternative.channelIds.map((channelId) => ids.indexOf(channelId)),
        busyS: minuteUp(alternative.busyS * 1000),
        readyS: alternative.totalS.p50,
        guardS: alternative.totalS.p90,
        mayStart: mayBegin(model, movable.file, alternative.busyS * 1000)
          .map(within)
          .filter(({ fromS, toS }) => toS > fromS),
      })),
    })),
  };
}

const minuteUp = (ms: number): number => Math.ceil(ms / 60_000) * 60;
const minuteDown = (ms: number): number => Math.floor(ms / 60_000) * 60;

function placementsOf({ movables, origin }: BenchModel, { placements }: BenchSolution): Placements {
  const byId = new Map(movables.map((movable) => [idOf(movable), movable]));
  return new Map(
    placements.map(({ jobId, alternative, startS }) => [
      jobId,
      placedBy(byId.get(jobId)!.alternatives[alternative]!, origin + Math.round(startS * 1000)),
    ]),
  );
}

/** The name of what it changes: the same change of the same charges has the same name. */
function nameOf(moves: readonly ProposedMove[]): string {
  const what = moves.map(({ movable, then }) => [
    idOf(movable),
    movable.file.charge.rev,
    [...then.channelIds].sort(),
    then.at,
  ]);
  return createHash('sha256').update(JSON.stringify(what)).digest('base64url').slice(0, 22);
}
