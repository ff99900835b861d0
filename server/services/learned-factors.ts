/** What closed charges teach about the next one of their type on their charger. */
import type { EntityManager } from 'typeorm';
import { learnedFactor } from '@/calc/index';
import type { PlanOption, TimeFactor } from '@/calc/plan-types';
import type { RunStretch } from '../entities/run-stretch';
import { runsOf } from '../repositories/charge-rows.repository';
import { optionsOfCharges, taughtChargeIds } from '../repositories/learned.repository';
import { SWAP_REASON } from './charge-steps';

/** The last charges of a type that count: a charger or a habit that has changed is forgotten with time. A guess. */
const MOST_CHARGES = 100;
/** A run that ended otherwise was held or stopped: its seconds are not those of the plan. */
const ENDED_AS_PLANNED: readonly (string | null)[] = [SWAP_REASON, 'switched off'];

interface Lesson {
  channelId: string;
  predictedS: number;
  actualS: number;
}

/** A closed charge does not change any more, so what it taught is worked out once. Null: it taught nothing. */
const lessonsOf = new WeakMap<object, Map<string, Lesson | null>>();

/**
 * Learned factor of a module type by the id of each channel's charger; chargers without a charge that counts are left out.
 * @param chargerOf charger of each channel, retired ones too
 */
export async function learnedByCharger(
  manager: EntityManager,
  workshopId: string,
  moduleTypeId: string,
  chargerOf: ReadonlyMap<string, string>,
): Promise<Map<string, TimeFactor>> {
  const lessons = await lessonsFor(manager, workshopId, moduleTypeId);
  const byCharger = new Map<string, Lesson[]>();
  for (const lesson of lessons) {
    const chargerId = chargerOf.get(lesson.channelId);
    if (chargerId !== undefined) byCharger.set(chargerId, [...(byCharger.get(chargerId) ?? []), lesson]);
  }
  const factors = [...byCharger].map(([chargerId, own]): [string, TimeFactor] => {
    const { mean, sd, charges } = learnedFactor(own);
    return [chargerId, { mean, sd, charges }];
  });
  return new Map(factors.filter(([, { charges }]) => charges > 0));
}

async function lessonsFor(manager: EntityManager, workshopId: string, moduleTypeId: string): Promise<Lesson[]> {
  const known = lessonsOf.get(manager.connection) ?? new Map<string, Lesson | null>();
  lessonsOf.set(manager.connection, known);
  const ids = await taughtChargeIds(manager, workshopId, moduleTypeId, MOST_CHARGES);
  const unknown = ids.filter((id) => !known.has(id));
  const runs = await runsOf(manager, workshopId, unknown);
  for (const { id, option } of await optionsOfCharges(manager, workshopId, unknown))
    known.set(id, lessonOf(option, runs.get(id) ?? []));
  return ids.flatMap((id) => known.get(id) ?? []);
}

/** Seconds of current as planned, without what was learned before, against those that flowed. */
function lessonOf(option: PlanOption, runs: readonly RunStretch[]): Lesson | null {
  const channelId = option.steps.find((step) => step.kind === 'bulk' && step.channelIds.length > 0)?.channelIds[0];
  if (channelId === undefined || runs.length === 0) return null;
  if (runs.some((run) => run.toAt === null || !ENDED_AS_PLANNED.includes(run.reason))) return null;
  const planned = option.segments
    .filter(({ kind }) => kind === 'cc' || kind === 'taper')
    .reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  const predictedS = planned / (option.timeFactor?.mean ?? 1);
  const actualS = runs.reduce((sum, run) => sum + (run.toAt! - run.fromAt) / 1000, 0);
  return predictedS > 0 && actualS > 0 ? { channelId, predictedS, actualS } : null;
}
