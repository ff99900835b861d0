/** What a charge tells of its spare's capacity: read at rest before and after it, and counted in between. */
import { capacityFromTwoReadings, chemistryParameters, combineFigures, type Figure } from '@/calc/index';
import { DEFAULT_SPREADS } from '@/calc/plan/default-spreads';
import type { RestCheck } from '../entities/rest-check';
import {
  capacityOfCharge,
  deleteSpareCapacity,
  insertSpareCapacity,
} from '../repositories/spare-capacities.repository';
import { updateSpare } from '../repositories/charge-stock.repository';
import type { ChargeFile } from './charge-file';
import { validReadings } from './charge-reckoning';
import { ampHoursText } from './charge-words';
import type { ChargeWrite } from './charge-write';
import { newId } from './ids';
import { correctedVolts } from './meter-trust';
import { usedCapacity } from './spare-capacity';

/** A reading of before that is older than this at the first current has lost an unknown charge, ms. A guess. */
const FRESH_BEFORE_MS = 3 * 86_400_000;
/** Doubt of the ampere-hours counted, as a share: by amps that were read, and over a taper. Guesses. */
const COUNT_READ = 0.01;
const COUNT_TAPERED = 0.04;
/** What a rest that was cut short leaves in a reading, V. A guess. */
const EARLY_VOLTS = 0.002;

/**
 * Capacity of one group by the readings before and after; null where the charge tells nothing of it: the clips were moved in
 * between, nobody has read the current or said when it ended, the reading of before is old, or the curve is too flat.
 */
export function foundCapacity(file: ChargeFile, check: RestCheck): Figure | null {
  const { charge } = file;
  const { module, spare, spareReadAt, spreads } = charge.frozen;
  const reckoning = charge.reckoning?.reckoning;
  if (!reckoning || !charge.currentOffSaid || charge.startedAt === null) return null;
  if (charge.startedAt - spareReadAt > FRESH_BEFORE_MS) return null;
  const endAt = charge.currentEndAt ?? 0;
  if (!validReadings(file.readings).some(({ amps, at }) => amps !== null && at <= endAt)) return null;
  const { steps } = charge.option;
  if (steps.some(({ way, groupIndexes }) => way !== 'terminals' || groupIndexes.length !== module.groupsInSeries))
    return null;
  const chemistry = chemistryParameters(module.chemistry);
  const ampHours = Math.abs(reckoning.deliveredAh);
  const tapered = charge.taperAt !== null && charge.taperAt < endAt;
  const { capacityAh } = capacityFromTwoReadings({
    curve: module.curve ?? chemistry.curve,
    beforeVolts: spare.groupVolts,
    afterVolts: correctedVolts(check.groupVolts, file.meters.get(check.meterId ?? '') ?? null),
    countedAh: charge.direction === 'discharge' ? -ampHours : ampHours,
    coulombicEfficiency: chemistry.coulombicEfficiency,
    sameMeter: check.meterId !== null && check.meterId === spare.meterId,
    spreads: {
      meterVolts: spreads?.meterVolts ?? DEFAULT_SPREADS.meterVolts,
      readingVolts: Math.hypot(DEFAULT_SPREADS.readingVolts, check.early ? EARLY_VOLTS : 0),
      curveVolts: DEFAULT_SPREADS.curveVolts,
      hysteresisVolts: chemistry.hysteresisVolts,
      countRelative: tapered ? COUNT_TAPERED : COUNT_READ,
    },
  });
  return capacityAh;
}

/**
 * Keeps what a check tells of the capacity. Where it agrees with what was known, the spare's capacity becomes both, each by
 * its weight; where it does not, it is kept for a person to take or leave. A further check of the charge replaces what waits.
 */
export async function keepFoundCapacity({ manager, file, member, note }: ChargeWrite, check: RestCheck): Promise<void> {
  const { charge, spare, type } = file;
  const { workshopId } = charge;
  const earlier = await capacityOfCharge(manager, workshopId, charge.id);
  if (earlier !== null && earlier.state !== 'found') return;
  const found = foundCapacity(file, check);
  if (earlier !== null) await deleteSpareCapacity(manager, workshopId, earlier.id);
  if (found === null) return;
  const present = usedCapacity(spare, type);
  const both = combineFigures({ mean: present.capacityAh, sd: present.sdAh }, found);
  await insertSpareCapacity(manager, {
    id: newId(),
    workshopId,
    spareId: spare.id,
    ampHours: found.mean,
    sdAh: found.sd,
    source: 'two readings',
    state: both.agree ? 'used' : 'found',
    apart: both.apart,
    chargeId: charge.id,
    at: check.at,
    personId: member.personId,
  });
  if (both.agree) {
    const patch = { capacityAh: both.mean, capacitySdAh: both.sd, capacitySource: 'measured' as const };
    await updateSpare(manager, workshopId, spare.id, patch);
    Object.assign(spare, patch);
  }
  const known = figureText({ mean: present.capacityAh, sd: present.sdAh });
  note(
    'capacity',
    both.agree
      ? `The readings before and after give ${figureText(found)} a group. With the ${known} of before: ${figureText(both)}.`
      : `The readings before and after give ${figureText(found)} a group, ${known} were known. Take it or leave it at ${spare.label}.`,
    check.at,
  );
}

/** '61.2 Ah ± 1.4 Ah', one standard deviation. */
const figureText = ({ mean, sd }: Figure): string => `${ampHoursText(mean)} ± ${ampHoursText(sd)}`;
