/** What is typed into a plan, and the request it makes. Pure. */
import type { ChemistryId } from '@/calc/plan-types';
import { targetProblem, type TypeWindow } from '@/shared/contract/group-volts';
import type { PlanRequest } from '@/shared/contract/plan';
import { planSchema } from '@/shared/contract/plan';
import { parseTimeOfDay } from '../format/parse';
import { instantOfDay } from '../format/zone';

/** As typed; instants are a day of the workshop's zone and a time of day, a switch is '' or 'yes'. */
export interface PlanTyped {
  spareId: string;
  targetVolts: string;
  toleranceMillivolts: string;
  meterId: string;
  packCelsius: string;
  repairRef: string;
  modulePosition: string;
  readyDay: string;
  readyTime: string;
  clipDay: string;
  clipTime: string;
  /** 'soc': the pack is told by its state of charge, per cent, in place of its volts; only for chemistries with a flat curve. */
  targetBy: string;
  targetSoc: string;
  /** 'yes': the wide band of a voltage on the flat of the curve is taken. */
  acceptWideBand: string;
  /** 'yes': what closed charges have taught of the times is left out. */
  withoutLearned: string;
}

export type PlanField = keyof PlanTyped;

export const emptyPlan: PlanTyped = {
  spareId: '',
  targetVolts: '',
  toleranceMillivolts: '',
  meterId: '',
  packCelsius: '',
  repairRef: '',
  modulePosition: '',
  readyDay: '',
  readyTime: '',
  clipDay: '',
  clipTime: '',
  withoutLearned: '',
  targetBy: '',
  targetSoc: '',
  acceptWideBand: '',
};

/** Chemistries whose voltage says little of the charge over most of it: the pack may be told by its state of charge. */
export const flatChemistries: readonly ChemistryId[] = ['lfp', 'nimh'];

/** The typed field that a path of the request belongs to. */
export const fieldOf = (path: string): PlanField =>
  path === 'readyBy' ? 'readyTime' : path === 'clipOnAt' ? 'clipTime' : (path as PlanField);

const noTime = 'This is no time. Type it like 18:15.';

/** The instant of a day and a typed time, ISO; null where no time is typed; undefined where it is none. */
function typedInstant(day: string, time: string, today: string, zone: string): string | null | undefined {
  if (time.trim() === '') return null;
  const minutes = parseTimeOfDay(time);
  if (minutes === null) return undefined;
  return new Date(instantOfDay(day || today, minutes, zone)).toISOString();
}

/** The pack is told by its state of charge: chosen, and the chemistry is one whose voltage says little. */
export const isBySoc = ({ targetBy }: Pick<PlanTyped, 'targetBy'>, chemistry: ChemistryId | null): boolean =>
  targetBy === 'soc' && chemistry !== null && flatChemistries.includes(chemistry);

/** What is known of the chosen spare and meter: the target is judged by them, as the plan will. */
export interface TargetLimits {
  type: TypeWindow;
  /** Null while the type is not read yet. */
  chemistry?: ChemistryId | null;
  /** Known offset of the meter the pack was read with, mV. */
  offsetMillivolts: number;
}

/**
 * The request that was typed, and the sentence at each field that keeps it from being one.
 * @param limits null while the spare is not chosen or not known yet
 */
export function requestOf(
  typed: PlanTyped,
  { zone, today, now, limits = null }: { zone: string; today: string; now: number; limits?: TargetLimits | null },
): { request: PlanRequest | null; errors: Partial<Record<PlanField, string>> } {
  const errors: Partial<Record<PlanField, string>> = {};
  const readyBy = typedInstant(typed.readyDay, typed.readyTime, today, zone);
  const clipOnAt = typedInstant(typed.clipDay, typed.clipTime, today, zone);
  if (readyBy === undefined) errors.readyTime = noTime;
  if (clipOnAt === undefined) errors.clipTime = noTime;
  if (readyBy && Date.parse(readyBy) < now - 60_000) errors.readyTime = 'That time is over. Choose a later one.';
  if (clipOnAt && Date.parse(clipOnAt) < now - 15 * 60_000) errors.clipTime = 'That time is over. Choose a later one.';
  if (typed.spareId === '') errors.spareId = 'Choose the spare.';
  const bySoc = isBySoc(typed, limits?.chemistry ?? null);
  const target = limits && !bySoc && targetProblem(typed.targetVolts, limits.type, limits.offsetMillivolts / 1000);
  if (target) errors.targetVolts = target;
  const parsed = planSchema.safeParse({
    spareId: typed.spareId,
    ...(bySoc ? { targetVolts: null, targetSoc: typed.targetSoc } : { targetVolts: typed.targetVolts }),
    ...(typed.acceptWideBand === 'yes' && !bySoc ? { acceptWideBand: true } : {}),
    toleranceMillivolts: typed.toleranceMillivolts,
    meterId: typed.meterId === '' ? null : typed.meterId,
    packCelsius: typed.packCelsius,
    readyBy: readyBy ?? null,
    clipOnAt: clipOnAt ?? null,
    repairRef: typed.repairRef,
    modulePosition: typed.modulePosition,
    ...(typed.withoutLearned === 'yes' ? { withoutLearned: true } : {}),
  });
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      const named = String(issue.path[0]) as PlanField;
      // Neither given is said at the volts: told by the state of charge it is that which is missing.
      const field = bySoc && named === 'targetVolts' ? 'targetSoc' : named;
      if (field in emptyPlan) errors[field] ??= issue.message;
    }
    return { request: null, errors };
  }
  return { request: Object.keys(errors).length > 0 ? null : parsed.data, errors };
}
