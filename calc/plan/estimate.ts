import { chemistryParameters } from '../chemistry';
import type {
  Band,
  Caution,
  ChemistryId,
  Doubt,
  Finish,
  PlanInput,
  PlanOption,
  Refusal,
  Segment,
  TracePlanPoint,
} from '../plan-types';
import type { Direction } from '../types';
import { DEFAULT_SPREADS } from './default-spreads';
import { planCharge } from './plan-charge';

/** What the quick estimate asks for; what was left empty is null. */
export interface QuickNumbers {
  chemistry: ChemistryId;
  groups: number;
  /** Of one group, Ah. */
  ratedAh: number;
  healthPercent: number;
  /** Rest voltages per group, V. */
  spareVolts: number;
  targetVolts: number;
  amps: number;
  maxVolts: number | null;
  maxWatts: number | null;
  /** Of one group, read with a 10 s pulse, mΩ. */
  resistanceMilliohm: number | null;
  celsius: number | null;
}

export interface QuickWay {
  totalS: Band;
  segments: Segment[];
  trace: TracePlanPoint[];
  ampHours: number;
  setVolts: number | null;
  endGroupVolts: number[];
  dominant: Doubt;
  narrowsByS: number;
}

export interface QuickEstimate {
  direction: Direction;
  /** Null where the numbers or the charger rule it out. */
  overAndSettle: QuickWay | null;
  onTheMark: QuickWay | null;
  refusals: Refusal[];
  cautions: Caution[];
  /** Why a finish is missing, or that nothing is to be charged. */
  ruledOut: string[];
}

/** What nobody is asked for here. Guesses of the trade, and the tolerance that workshops begin with. */
const TOLERANCE_VOLTS = 0.005;
const ROOM_CELSIUS = 20;
/** Short leads with good clips, there and back. */
const LEAD_OHM = 0.002;
const HANDS_S = 300;
const BUSBARS_S = 720;
const REST_S = 3600;
/** Every estimate of the same numbers is the same to the last digit. */
const SEED = 20_260_609;

/** Cautions about what this estimate asks nobody for: leads and meters. Their doubt is in the band all the same. */
const unasked: ReadonlySet<string> = new Set(['thin-leads', 'other-meter']);

/**
 * Time and band of one charge through the terminals of one charger, for both finishes: the planner itself with a
 * charger and a module of which only these numbers are known. Limits are the chemistry's.
 *
 * A plan warns where nobody noted the meter of a reading. Here there is no meter to note, so it does not: the offset of
 * two meters widens the band as in a plan without them.
 *
 * @returns no way where the numbers rule the charge out; then `refusals` or `ruledOut` says why
 */
export function quickEstimate(numbers: QuickNumbers): QuickEstimate {
  const plan = planCharge(quickPlanInput(numbers));
  const wayOf = (finish: Finish): QuickWay | null => {
    const option = plan.options.find((one) => one.way === 'terminals' && one.finish === finish);
    return option === undefined ? null : quickWay(option);
  };
  const overAndSettle = wayOf('over-and-settle');
  const onTheMark = wayOf('on-the-mark');
  const reasons = plan.ruledOut.filter(({ way }) => way === 'terminals').map(({ reason }) => reason);
  return {
    direction: plan.direction,
    overAndSettle,
    onTheMark,
    // All groups are alike here, so what one is refused for stands for all.
    refusals: firstOfEach(plan.refusals),
    cautions: firstOfEach([
      ...plan.cautions,
      ...plan.options.flatMap(({ way, cautions }) => (way === 'terminals' ? cautions : [])),
    ]).filter(({ code }) => !unasked.has(code)),
    ruledOut: plan.alreadyWithin
      ? ['The spare rests within 5\u00a0mV of the target already. Nothing is to be charged.']
      : [...new Set(reasons)],
  };
}

const quickWay = (option: PlanOption): QuickWay => ({
  totalS: option.totalS,
  segments: option.segments,
  trace: option.trace,
  ampHours: option.ampHours,
  setVolts: option.setVolts,
  endGroupVolts: option.endGroupVolts,
  dominant: option.dominant,
  narrowsByS: option.narrowsByS,
});

const firstOfEach = <Said extends { code: string }>(said: Said[]): Said[] =>
  said.filter(({ code }, index) => said.findIndex((other) => other.code === code) === index);

/** The planner's input that stands behind a quick estimate. */
function quickPlanInput(numbers: QuickNumbers): PlanInput {
  const { groups, amps, celsius } = numbers;
  const chemistry = chemistryParameters(numbers.chemistry);
  return {
    module: {
      chemistry: numbers.chemistry,
      groupsInSeries: groups,
      cellsInParallel: 1,
      ratedAh: numbers.ratedAh,
      chargeLimitVolts: chemistry.chargeLimitVolts,
      dischargeLimitVolts: chemistry.dischargeLimitVolts,
      floorVolts: chemistry.recoveryFloorVolts,
      maxChargeAmps: amps,
      maxDischargeAmps: amps,
      minChargeCelsius: chemistry.minChargeCelsius,
      maxChargeCelsius: chemistry.maxChargeCelsius,
      resistanceOhm: numbers.resistanceMilliohm === null ? null : numbers.resistanceMilliohm / 1000,
      resistanceKind: 'pulse-10s',
      linkResistanceOhm: 0,
      curve: null,
      selfDischargePerMonth: null,
    },
    spare: {
      groupVolts: Array.from({ length: groups }, () => numbers.spareVolts),
      readingAgeS: 0,
      celsius,
      meterId: null,
      capacityAh: (numbers.ratedAh * numbers.healthPercent) / 100,
      capacitySource: 'label',
      capacityRelativeSd: null,
      condition: 'sound',
      quarantineReason: null,
    },
    target: { volts: numbers.targetVolts, toleranceVolts: TOLERANCE_VOLTS, meterId: null, celsius, sdVolts: null },
    channels: [
      {
        channelId: 'charger',
        name: 'The charger',
        maxAmps: amps,
        minAmps: 0,
        // Ample, where nobody has said: the set voltage is chosen under the module's own cap.
        maxVolts: numbers.maxVolts ?? 2 * groups * chemistry.chargeLimitVolts,
        maxWatts: numbers.maxWatts,
        adjustableVolts: true,
        senses: 'own-terminals',
        leadResistanceOhm: LEAD_OHM,
        displayStepVolts: 0.001,
        singleGroup: false,
        canDischarge: true,
        dischargeAmps: amps,
        loadOhm: null,
        freeInS: 0,
        offsetSdVolts: DEFAULT_SPREADS.chargerVolts,
      },
    ],
    resistors: [],
    neighbour: null,
    workshop: {
      minRestS: REST_S,
      lookInIntervalS: 3600,
      inrushLimitC: 1,
      clipOnS: HANDS_S,
      clipOffS: HANDS_S,
      checkS: HANDS_S,
      busbarsS: BUSBARS_S,
      closesInS: null,
    },
    readyByS: null,
    clipOnAtS: 0,
    celsius: celsius ?? ROOM_CELSIUS,
    seed: SEED,
  };
}
