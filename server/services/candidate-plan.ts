/** What the plan of a spare for a repair is reckoned from, in a list of many and for one alone. */
import type { ChannelParameters, ModuleParameters, PlanInput, SpareState, WorkshopParameters } from '@/calc/plan-types';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import { correctedVolt, meterOffsetSdVolts } from './meter-trust';
import { computedTarget } from './pack-numbers';
import { PLAN_SEED, ROOM_CELSIUS } from './plan-inputs';
import { moduleParameters, spareState, workshopParameters } from './plan-parameters';
import { repairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';
import { closesInSeconds } from './working-hours';

/** Samples of a candidate's band: enough to put them in order. The plan of the one that is chosen has its own. */
const FEW_SAMPLES = 16;

export interface CandidateTarget {
  volts: number;
  toleranceMillivolts: number;
  meterId: string | null;
  celsius: number | null;
}

/** The taken target, else the computed one; null: the pack is not read yet. */
export function candidateTarget(file: RepairFile, type: ModuleType, now: number): CandidateTarget | null {
  const { repair, meters, workshop, readings } = file;
  const facts = repairFacts(file);
  const { arrival } = facts;
  const meter = meters.get(arrival?.meterId ?? '') ?? null;
  const computed = arrival === null ? null : computedTarget(arrival, repair, facts.failing, type, meter, now);
  const known = facts.target ?? computed;
  if (known === null) return null;
  const reading = readings.find(({ id }) => id === known.readingId);
  return {
    volts: known.volts,
    toleranceMillivolts: facts.target?.toleranceMillivolts ?? workshop.toleranceMillivolts,
    meterId: reading?.meterId ?? null,
    celsius: reading?.celsius ?? null,
  };
}

/** What the plans of all spares for one target share. */
export interface CandidateGround {
  target: CandidateTarget;
  channels: ChannelParameters[];
  meters: ReadonlyMap<string, Meter>;
  now: number;
  /** Once for all of them: what is worked out of a curve is kept with the curve. */
  module: ModuleParameters;
  workshop: WorkshopParameters;
}

export const candidateGround = (
  { workshop, meters }: Pick<RepairFile, 'workshop' | 'meters'>,
  type: ModuleType,
  target: CandidateTarget,
  channels: ChannelParameters[],
  now: number,
): CandidateGround => ({
  ...{ target, channels, meters, now, module: moduleParameters(type) },
  workshop: workshopParameters(workshop, closesInSeconds(workshop, now, now)),
});

/** Ages of readings by whole hours: what a module loses in one is nothing, and spares that read alike are reckoned once. */
const AGE_STEP_S = 3600;

/** A spare as the plan of a list takes it. */
export function candidateState(
  spare: Spare,
  type: ModuleType,
  reading: SpareReading,
  meters: ReadonlyMap<string, Meter>,
  now: number,
): SpareState {
  const state = spareState(spare, type, reading, meters.get(reading.meterId ?? '') ?? null, now);
  return { ...state, readingAgeS: Math.round(state.readingAgeS / AGE_STEP_S) * AGE_STEP_S };
}

export function candidatePlan(ground: CandidateGround, state: SpareState, reading: SpareReading): PlanInput {
  const { module, target, channels, workshop, meters, now } = ground;
  const packMeter = meters.get(target.meterId ?? '') ?? null;
  const meter = meters.get(reading.meterId ?? '') ?? null;
  const meterVolts = meterOffsetSdVolts(
    [packMeter, meter].filter((one) => one !== null),
    now,
  );
  return {
    module,
    spare: state,
    target: {
      volts: correctedVolt(target.volts, packMeter),
      toleranceVolts: target.toleranceMillivolts / 1000,
      meterId: target.meterId,
      celsius: target.celsius,
      sdVolts: null,
    },
    channels,
    resistors: [],
    neighbour: null,
    workshop,
    readyByS: null,
    clipOnAtS: 0,
    celsius: state.celsius ?? ROOM_CELSIUS,
    seed: PLAN_SEED,
    samples: FEW_SAMPLES,
    ...(meterVolts === undefined ? {} : { spreads: { meterVolts } }),
  };
}
