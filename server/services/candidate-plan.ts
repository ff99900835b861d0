/** What the plan of a spare for a repair is reckoned from, in a list of many and for one alone. */
import type { ChannelParameters, PlanInput, SpareState } from '@/calc/plan-types';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { SpareReading } from '../entities/spare-reading';
import type { Workshop } from '../entities/workshop';
import { correctedVolt, meterOffsetSdVolts } from './meter-trust';
import { computedTarget } from './pack-numbers';
import { PLAN_SEED, ROOM_CELSIUS } from './plan-inputs';
import { moduleParameters, workshopParameters } from './plan-parameters';
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
  type: ModuleType;
  target: CandidateTarget;
  channels: ChannelParameters[];
  workshop: Workshop;
  meters: ReadonlyMap<string, Meter>;
  now: number;
}

export function candidatePlan(ground: CandidateGround, state: SpareState, reading: SpareReading): PlanInput {
  const { type, target, channels, workshop, meters, now } = ground;
  const packMeter = meters.get(target.meterId ?? '') ?? null;
  const meter = meters.get(reading.meterId ?? '') ?? null;
  const meterVolts = meterOffsetSdVolts(
    [packMeter, meter].filter((one) => one !== null),
    now,
  );
  return {
    module: moduleParameters(type),
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
    workshop: workshopParameters(workshop, closesInSeconds(workshop, now, now)),
    readyByS: null,
    clipOnAtS: 0,
    celsius: state.celsius ?? ROOM_CELSIUS,
    seed: PLAN_SEED,
    samples: FEW_SAMPLES,
    ...(meterVolts === undefined ? {} : { spreads: { meterVolts } }),
  };
}
