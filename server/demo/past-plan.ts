/** One charge of the past: planned with the numbers that were known, run with the numbers that were true. */
import type { ChannelParameters, Finish, PlanInput, PlanOption, Way } from '@/calc/plan-types';
import { CAPACITY_RELATIVE_SD } from '@/calc/plan/default-spreads';
import { isPossible, type Draft } from '@/calc/plan/draft';
import { paralleledWay } from '@/calc/plan/paralleled-way';
import { planModel } from '@/calc/plan/plan-model';
import { terminalsWay } from '@/calc/plan/terminals-way';
import { toOption } from '@/calc/plan/to-option';
import type { FrozenInputs } from '../entities/charge-json';
import type { ModuleType } from '../entities/module-type';
import type { Workshop } from '../entities/workshop';
import { channelParameters, moduleParameters, workshopParameters } from '../services/plan-parameters';
import { closesInSeconds } from '../services/working-hours';
import { handMeterId, type DemoEquipment, type DemoType } from './equipment';
import type { Noise } from './noise';

/** Enough samples for a band that is looked back on. */
const SAMPLES = 32;

export interface PastWish {
  type: DemoType;
  way: Way;
  finish: Finish;
  channel: string;
  groupVolts: number[];
  capacityAh: number;
  targetVolts: number;
  /** When it was planned, and how old the spare's reading was then. */
  askedAt: number;
  readingAgeS: number;
  seed: number;
}

export interface PastPlan {
  frozen: FrozenInputs;
  option: PlanOption;
}

/** What truly happened from the first current on, s. */
export interface PastRun {
  taperS: number | null;
  currentS: number;
}

export interface PastShop {
  workshop: Workshop;
  equipment: DemoEquipment;
}

/** The plan as it was made then; null where the way cannot be done in one step. */
export function planPast(shop: PastShop, wish: PastWish): PastPlan | null {
  const frozen = frozenOf(shop, wish);
  const draft = draftOf(inputOf(frozen, SAMPLES), wish);
  if (draft === null) return null;
  const option = toOption(planModel(inputOf(frozen, SAMPLES)), draft);
  return option.withinTolerance ? { frozen, option } : null;
}

/**
 * The same way with the module as it truly was: capacity, resistance, current and readings off by what such numbers are
 * off by.
 */
export function runPast(plan: PastPlan, wish: PastWish, noise: Noise): PastRun | null {
  const { frozen } = plan;
  const ohm = frozen.module.resistanceOhm;
  const meterVolts = 0.001 * noise.normal();
  const truth: FrozenInputs = {
    ...frozen,
    module: { ...frozen.module, resistanceOhm: ohm === null ? null : ohm * (1 + 0.2 * noise.normal()) },
    spare: {
      ...frozen.spare,
      capacityAh: wish.capacityAh * (1 + CAPACITY_RELATIVE_SD.measured * noise.normal()),
      groupVolts: frozen.spare.groupVolts.map((volts) => volts + meterVolts),
    },
    channels: frozen.channels.map((channel) => ({
      ...channel,
      maxAmps: channel.maxAmps * (1 + 0.006 * noise.normal()),
    })),
  };
  const [step, ...more] = draftOf(inputOf(truth, 1), wish)?.steps ?? [];
  return step === undefined || more.length > 0
    ? null
    : { currentS: step.seconds, taperS: wish.finish === 'on-the-mark' ? step.voltageLimitAtS : null };
}

function draftOf(input: PlanInput, { way, finish }: PastWish): Draft | null {
  const model = planModel(input);
  const [channel] = input.channels;
  const draft = way === 'paralleled' ? paralleledWay(model, channel!, finish) : terminalsWay(model, channel!, finish);
  return isPossible(draft) && draft.steps.length === 1 ? draft : null;
}

const inputOf = (frozen: FrozenInputs, samples: number): PlanInput => ({
  module: frozen.module,
  spare: frozen.spare,
  target: frozen.target,
  channels: frozen.channels,
  resistors: [],
  neighbour: null,
  workshop: frozen.workshop,
  celsius: frozen.celsius,
  seed: frozen.seed,
  readyByS: null,
  clipOnAtS: 0,
  samples,
});

function frozenOf({ workshop, equipment }: PastShop, wish: PastWish): FrozenInputs {
  const { askedAt } = wish;
  const type: ModuleType = equipment.types.get(wish.type)!;
  const channel = equipment.channels.get(wish.channel)!;
  const meter = equipment.meters.get(`demo-meter-${wish.channel}`) ?? null;
  const parameters: ChannelParameters = channelParameters(channel, meter, 0, askedAt);
  return {
    module: moduleParameters(type),
    spare: {
      groupVolts: wish.groupVolts,
      readingAgeS: wish.readingAgeS,
      celsius: 21,
      meterId: handMeterId,
      capacityAh: wish.capacityAh,
      capacitySource: 'measured',
      capacityRelativeSd: null,
      condition: 'sound',
      quarantineReason: null,
    },
    target: {
      volts: wish.targetVolts,
      toleranceVolts: workshop.toleranceMillivolts / 1000,
      meterId: handMeterId,
      celsius: 21,
      sdVolts: null,
    },
    channels: [parameters],
    resistors: [],
    neighbour: null,
    workshop: workshopParameters(workshop, closesInSeconds(workshop, askedAt, askedAt)),
    celsius: 21,
    seed: wish.seed,
    lagLimitVolts: workshop.lagLimitMillivolts / 1000,
    spareReadAt: askedAt - wish.readingAgeS * 1000,
  };
}
