/** The bench as a problem of which charge goes where and when: what may move, on which channels, and what is in the way. */
import { setImmediate } from 'node:timers/promises';
import type { EntityManager } from 'typeorm';
import type { Band } from '@/calc/plan-types';
import type { ChargeFile } from '../charge-file';
import { isWaitingToStart } from '../charge-stages';
import type { Alternative } from './bench-tasks';
import type { BenchSolver } from './bench-solver';
import { dueOf, HORIZON_MS, type BenchGround } from './ground';
import { heldSpans, type HeldSpan } from './held-spans';
import { common, united, type Stretch } from './spans';
import { plannedAgain, whyNotAgain } from './way-input';

/** Where a charge stands, or would. */
export interface Placed {
  channelIds: string[];
  /** Clip-on, epoch ms. */
  at: number;
  busyMs: number;
  totalS: Band;
}

/** A charge that may be given another place. */
export interface Movable {
  file: ChargeFile;
  dueAt: number | null;
  /** Of each second late; all charges count alike: a promise to one customer is worth that to another. */
  weight: number;
  alternatives: Alternative[];
  /** Why a channel cannot, by its id. */
  because: Record<string, string>;
  present: Placed;
}

export interface BenchModel {
  ground: BenchGround;
  /** 0 s of the problem: the next whole minute, so that the same question within it is the same. */
  origin: number;
  /** Nothing begins after this. */
  until: number;
  movables: Movable[];
  /** Charges that wait and cannot be moved, with the reason, by id. */
  stuck: Map<string, string>;
  /** What has the channels and does not move. */
  taken: HeldSpan[];
}

const MINUTE_MS = 60_000;

/** Gathers the model; what each charge takes on each channel comes from the thread. */
export async function benchModel(
  manager: EntityManager,
  solver: BenchSolver,
  ground: BenchGround,
): Promise<BenchModel> {
  const { now, files } = ground;
  const origin = Math.ceil(now / MINUTE_MS) * MINUTE_MS;
  const until = origin + HORIZON_MS;
  const stuck = new Map<string, string>();
  const movables: Movable[] = [];
  for (const file of files.filter(({ charge }) => isWaitingToStart(charge.stage))) {
    if (file.charge.way === 'resistor') {
      stuck.set(file.charge.id, 'It is joined to another spare by a resistor and needs no channel.');
      continue;
    }
    try {
      movables.push(await movableOf(manager, solver, ground, file));
    } catch (error) {
      stuck.set(file.charge.id, whyNotAgain(error));
    }
    // A score of charges is a tenth of a second of rows: others get their turn in between.
    await setImmediate();
  }
  const moving = new Set(movables.map(({ file }) => file.charge.id));
  const taken = files.filter(({ charge }) => !moving.has(charge.id)).flatMap((file) => spansAhead(file, now, until));
  return { ground, origin, until, movables, stuck, taken };
}

/** What a charge that does not move has from now on; one that is held keeps its channels for nobody knows how long. */
export const spansAhead = (file: ChargeFile, now: number, until: number): HeldSpan[] =>
  heldSpans(file, now)
    .filter(({ to }) => to > now || (file.charge.stage === 'held' && to >= now))
    .map((span) => (file.charge.stage === 'held' ? { ...span, to: until + HORIZON_MS } : span));

async function movableOf(
  manager: EntityManager,
  solver: BenchSolver,
  ground: BenchGround,
  file: ChargeFile,
): Promise<Movable> {
  const { ask, blocked } = await plannedAgain(manager, file, null, ground.now);
  const { options, because } = await solver.alternatives(ask);
  const { charge } = file;
  const { option } = charge;
  const less = (seconds: number): number => seconds - option.queueS;
  return {
    file,
    dueAt: dueOf(ground, file),
    weight: 1,
    alternatives: options,
    because: { ...because, ...blocked },
    present: {
      channelIds: [...new Set(option.channelIds)],
      at: charge.clipOnAt + Math.round(option.queueS * 1000),
      busyMs: Math.round(less(option.currentEndS) * 1000),
      totalS: { p10: less(option.totalS.p10), p50: less(option.totalS.p50), p90: less(option.totalS.p90) },
    },
  };
}

/**
 * Instants at which a charge may be clipped on: somebody is there with free hands; and unless the workshop lets charges run
 * unattended, somebody is in the house until its current has ended. A break is no absence: one looks in before and after.
 */
export function mayBegin(
  model: Pick<BenchModel, 'ground' | 'origin' | 'until'>,
  file: ChargeFile,
  busyMs: number,
): Stretch[] {
  const { clipOnS } = file.charge.frozen.workshop;
  const known = begins.get(model.ground) ?? new Map<string, Stretch[]>();
  begins.set(model.ground, known);
  const key = [model.origin, model.until, clipOnS, busyMs].join();
  const found = known.get(key) ?? beginsOf(model, clipOnS * 1000, busyMs);
  known.set(key, found);
  return found;
}

/** What was worked out for a ground; asked for again with every place that is tried. */
const begins = new WeakMap<BenchGround, Map<string, Stretch[]>>();

function beginsOf(
  { ground, origin, until }: Pick<BenchModel, 'ground' | 'origin' | 'until'>,
  clipMs: number,
  busyMs: number,
): Stretch[] {
  const upTo = (stretches: readonly Stretch[], ms: number): Stretch[] =>
    united(stretches)
      .map(({ from, to }) => ({ from, to: to - ms }))
      .filter(({ from, to }) => to > from);
  const hands = upTo(
    ground.people.flatMap(({ present }) => present),
    clipMs,
  );
  const ahead = common(hands, [{ from: origin, to: until }]);
  if (ground.workshop.unattendedCharges === true) return ahead;
  const inHouse = ground.people.flatMap(({ present, breaks }) => [...present, ...breaks]);
  return common(ahead, upTo(inHouse, busyMs));
}

export const placedBy = ({ channelIds, busyS, totalS }: Alternative, at: number): Placed => ({
  ...{ channelIds, at, totalS },
  busyMs: Math.round(busyS * 1000),
});

/** Stretch in which a placed charge has its channels. */
export const busyOf = ({ at, busyMs }: Placed): Stretch => ({ from: at, to: at + busyMs });

/** By how much its 90th percentile misses the due time, ms. */
export const lateMs = (dueAt: number | null, placed: Placed): number =>
  dueAt === null ? 0 : Math.max(0, placed.at + Math.round(placed.totalS.p90 * 1000) - dueAt);

/** On these channels. */
export const onChannels = (spans: readonly HeldSpan[], channelIds: readonly string[]): Stretch[] =>
  spans.filter(({ channelId }) => channelIds.includes(channelId));

export const spansOf = (placed: Placed): HeldSpan[] =>
  placed.channelIds.map((channelId) => ({ channelId, ...busyOf(placed) }));
