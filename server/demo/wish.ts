/** A charge that the demo's day wishes for, and what is done with every one of them. */
import type { Finish, PlanOption, Way } from '@/calc/plan-types';
import { planCharge } from '@/calc/index';
import type { KeepPlanRequest } from '@/shared/contract/plan';
import type { Deps } from '../deps';
import type { ChargeFile } from '../services/charge-file';
import { buildPlanInputs } from '../services/plan-inputs';
import type { Act, BenchDay } from './bench-day';
import { dayActs, type DayActs } from './day-acts';
import { demoWorkshopId } from './demo-workshop';
import { channelId, handMeterId } from './equipment';
import { makeNoise } from './noise';
import type { DemoName } from './people';
import { spareId } from './stock';

const MINUTE = 60_000;
/** From the plan to the clip-on: the checks lie between. */
const PLANNED_BEFORE_MS = 14 * MINUTE;

export interface Wish {
  repair: string;
  position: string;
  spare: string;
  target: number;
  way: Way;
  finish: Finish;
  channel: string;
  by: DemoName;
  /** Minutes from now; null: as soon as can be. */
  readyByMin?: number;
  clipOnMin?: number;
}

/** Stretches of a way from its first current, ms. */
export interface Course {
  taperMs: number;
  endMs: number;
  checkDueMs: number;
  /** What the plan promises with 90 %. */
  lateMs: number;
}

export const actsOf = (day: BenchDay, wish: Wish): DayActs =>
  dayActs(
    day,
    wish.repair,
    wish.by,
    makeNoise([...wish.repair].reduce((sum, letter) => sum * 31 + letter.charCodeAt(0), 7)),
  );

export const begin = (acts: DayActs, wish: Wish, start: number, now: number): Act[] => [
  acts.keep(start - PLANNED_BEFORE_MS, requestOf(wish, now)),
  acts.answer(start - 8 * MINUTE),
  acts.start(start),
];

/** A reading just after each look-in of an hour. */
export function visits(acts: DayActs, start: number, until: number): Act[] {
  const found: Act[] = [];
  for (let at = start + 63 * MINUTE; at < until; at += 60 * MINUTE) found.push(acts.read(at));
  return found;
}

/** Two minutes after the reckoned end somebody switches the supply off and says so. */
export const switchOff =
  (acts: DayActs) =>
  ({ charge }: ChargeFile, at: number): Act | null =>
    charge.stage === 'resting' && !charge.currentOffSaid && charge.currentEndAt !== null
      ? acts.off(Math.max(at, charge.currentEndAt + 2 * MINUTE))
      : null;

export const requestOf = (wish: Wish, now: number): KeepPlanRequest => ({
  spareId: spareId(wish.spare),
  targetVolts: wish.target,
  toleranceMillivolts: null,
  meterId: handMeterId,
  packCelsius: 21,
  readyBy: wish.readyByMin === undefined ? null : new Date(now + wish.readyByMin * MINUTE).toISOString(),
  clipOnAt: wish.clipOnMin === undefined ? null : new Date(now + wish.clipOnMin * MINUTE).toISOString(),
  repairRef: wish.repair,
  modulePosition: wish.position,
  optionId: `${wish.way}/${wish.finish}/${channelId(wish.channel)}`,
});

/** How long the way takes, by the planner itself. */
export async function courseOf(deps: Deps, wish: Wish, now: number): Promise<Course> {
  const { input } = await buildPlanInputs(
    deps.dataSource.manager,
    demoWorkshopId,
    requestOf({ ...wish, readyByMin: undefined }, now),
    now,
  );
  const channels = input.channels.filter((channel) => channel.channelId === channelId(wish.channel));
  const option = planCharge({ ...input, channels, neighbour: null }).options.find(
    (one) => one.way === wish.way && one.finish === wish.finish,
  );
  if (!option) throw new Error(`The demo's ${wish.repair} has no such way.`);
  return course(option);
}

function course(option: PlanOption): Course {
  const ms = (seconds: number): number => Math.round((seconds - option.currentStartS) * 1000);
  const of = (kind: string) => option.segments.filter((segment) => segment.kind === kind);
  const end = of('rest')[0]!.fromS;
  return {
    taperMs: ms(of('taper')[0]?.fromS ?? end),
    endMs: ms(end),
    checkDueMs: ms(of('rest').at(-1)!.toS),
    lateMs: ms(option.totalS.p90),
  };
}
