/** Rows of the stock and the equipment as the planner takes them: SI units, and what is not typed as null. */
import { longResistance, publishedCurves, pulseTimeConstant } from '@/calc/index';
import type {
  ChannelParameters,
  ModuleParameters,
  ResistorParameters,
  SpareState,
  TimeFactor,
  WorkshopParameters,
} from '@/calc/plan-types';
import type { Channel } from '../entities/channel';
import type { LevellingResistor } from '../entities/levelling-resistor';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import type { Workshop } from '../entities/workshop';
import { chargerOffsetSdVolts, correctedVolts } from './meter-trust';
import { usedCapacity } from './spare-capacity';

/** Hands-on times, s. Guesses of the trade; a workshop's own come with its closed charges. */
const CLIP_ON_S = 300;
const CLIP_OFF_S = 300;
const CHECK_S = 300;
/** Busbars off, or on again. */
const BUSBARS_S = 720;

/** A reading's temperature says how warm the module is for this long, s: it follows the room within half a day. A guess. */
const TEMPERATURE_GOOD_S = 12 * 3600;

const shareOf = (percent: number | null): number | null => (percent === null ? null : percent / 100);

/**
 * Time constant of the over-voltage by the two pulses of a type, s; null where they were not typed, or where no whole
 * resistance stands beside them.
 * @throws CalcInputError where they do not fit it
 */
export function pulseSeconds(type: ModuleType): number | null {
  const { pulseShortS, pulseShortMilliohm, pulseLongerS, pulseLongerMilliohm, resistanceMilliohm } = type;
  if (pulseShortS === null || pulseShortMilliohm === null) return null;
  if (pulseLongerS === null || pulseLongerMilliohm === null || resistanceMilliohm === null) return null;
  return pulseTimeConstant(
    { afterS: pulseShortS, ohm: pulseShortMilliohm / 1000 },
    { afterS: pulseLongerS, ohm: pulseLongerMilliohm / 1000 },
    longResistance(type.resistanceKind, resistanceMilliohm / 1000),
  );
}

export const moduleParameters = (type: ModuleType): ModuleParameters => ({
  chemistry: type.chemistry,
  groupsInSeries: type.groupsInSeries,
  cellsInParallel: type.cellsInParallel,
  ratedAh: type.ratedAh,
  chargeLimitVolts: type.chargeLimitVolts,
  dischargeLimitVolts: type.dischargeLimitVolts,
  floorVolts: type.floorVolts,
  maxChargeAmps: type.maxChargeAmps,
  maxDischargeAmps: type.maxDischargeAmps,
  minChargeCelsius: type.minChargeCelsius,
  maxChargeCelsius: type.maxChargeCelsius,
  resistanceOhm: type.resistanceMilliohm === null ? null : type.resistanceMilliohm / 1000,
  resistanceKind: type.resistanceKind,
  linkResistanceOhm: type.linkMilliohm / 1000,
  curve: type.ownCurve ?? publishedCurves(type.chemistry).find(({ id }) => id === type.curveId)?.curve ?? null,
  polarisationTimeConstantS: pulseSeconds(type),
  coldCurrentShare: shareOf(type.coldCurrentPercent),
  warmCurrentShare: shareOf(type.warmCurrentPercent),
  prechargeBelowVolts: type.prechargeBelowVolts,
  selfDischargePerMonth: type.selfDischargePercentPerMonth === null ? null : type.selfDischargePercentPerMonth / 100,
});

export function spareState(
  spare: Spare,
  type: ModuleType,
  reading: SpareReading,
  meter: Meter | null,
  now: number,
): SpareState {
  const { capacityAh, source, sdAh } = usedCapacity(spare, type);
  const readingAgeS = Math.max(0, (now - reading.at) / 1000);
  return {
    groupVolts: correctedVolts(reading.groupVolts, meter),
    readingAgeS,
    celsius: readingAgeS <= TEMPERATURE_GOOD_S ? reading.celsius : null,
    meterId: reading.meterId,
    capacityAh,
    capacitySource: source,
    capacityRelativeSd: spare.capacitySdAh === null ? null : sdAh / capacityAh,
    condition: spare.quarantinedAt === null ? spare.condition : 'quarantined',
    quarantineReason: spare.quarantineReason,
  };
}

export const channelParameters = (
  channel: Channel,
  meter: Meter | null,
  freeInS: number,
  now: number,
  /** Learned of the planned type on this charger; null: taken off; left out: nothing yet. */
  timeFactor?: TimeFactor | null,
): ChannelParameters => ({
  channelId: channel.id,
  name: channel.name,
  maxAmps: channel.maxAmps,
  minAmps: channel.minAmps,
  maxVolts: channel.maxVolts,
  maxWatts: channel.maxWatts,
  adjustableVolts: channel.adjustableVolts,
  senses: channel.senses,
  leadResistanceOhm: channel.leadMilliohm / 1000,
  displayStepVolts: channel.displayStepMillivolts / 1000,
  ...(channel.displayStepAmps === null ? {} : { displayStepAmps: channel.displayStepAmps }),
  ...(channel.leadsMeasured === null ? {} : { leadsMeasured: channel.leadsMeasured }),
  ...(channel.deratingAboveCelsius === null || channel.deratingPercent === null
    ? {}
    : { derating: { aboveCelsius: channel.deratingAboveCelsius, ampsShare: channel.deratingPercent / 100 } }),
  ...(channel.dutyPercent === null ? {} : { duty: channel.dutyPercent / 100 }),
  singleGroup: channel.singleGroup,
  canDischarge: channel.canDischarge,
  dischargeAmps: channel.dischargeAmps,
  loadOhm: channel.loadOhm,
  freeInS,
  offsetSdVolts: chargerOffsetSdVolts(meter, now),
  ...(timeFactor === undefined ? {} : { timeFactor }),
});

export const resistorParameters = (resistor: LevellingResistor): ResistorParameters => ({
  resistorId: resistor.id,
  name: resistor.name,
  ohm: resistor.ohm,
  maxWatts: resistor.maxWatts,
});

export const workshopParameters = (workshop: Workshop, closesInS: number): WorkshopParameters => ({
  minRestS: workshop.minRestMinutes * 60,
  lookInIntervalS: workshop.lookInMinutes * 60,
  inrushLimitC: workshop.inrushLimitC,
  clipOnS: CLIP_ON_S,
  clipOffS: CLIP_OFF_S,
  checkS: CHECK_S,
  busbarsS: BUSBARS_S,
  closesInS,
});
