import { isBeyondCurve, slopeAtSoc } from '../curve/ocv';
import { CHEMISTRIES } from '../parameters/chemistries';
import type { Caution } from '../plan-types';
import type { PlanModel } from './plan-model';
import { celsiusText, daysText, durationText, millivoltsText, voltsText } from './words';

/** Share of the capacity for one millivolt from which on the curve is called flat: 4 mV are then over 2 %. */
const FLAT_SOC_PER_MILLIVOLT = 0.005;
/** Readings older than this are old, s. */
const OLD_READING_S = 21 * 86_400;
/** A spread beyond this inside the module is worth a word, V. */
const WIDE_SPREAD_VOLTS = 0.02;
/** Cool and warm within the window, °C. Common practice. */
const COLD_CELSIUS = 10;
const WARM_CELSIUS = 40;

/** What to know about every way of a plan: how far its numbers can be trusted. */
export function planCautions(model: PlanModel): Caution[] {
  const { module, spare, target, workshop } = model.input;
  const found: Caution[] = [];
  const chemistry = CHEMISTRIES[module.chemistry];
  const slope = slopeAtSoc(model.curve, model.targetSoc);
  const perMillivolt = 0.001 / slope;
  if (perMillivolt > FLAT_SOC_PER_MILLIVOLT)
    found.push({
      code: 'flat-curve',
      text: `The curve is flat at ${voltsText(target.volts)}: one millivolt is ${(perMillivolt * model.groups[0]!.capacityAh).toFixed(1)}\u00a0Ah. The band is wide because we cannot know better.`,
    });
  if (model.spreads.hysteresisVolts > 0)
    found.push({
      code: 'hysteresis',
      text: `${module.chemistry === 'lfp' ? 'LFP' : module.chemistry === 'nimh' ? 'NiMH' : chemistry.id} rests up to ${millivoltsText(model.spreads.hysteresisVolts)} higher after a charge and lower after a discharge. Better: count the ampere-hours from full or empty.`,
    });
  if (spare.readingAgeS > OLD_READING_S)
    found.push({
      code: 'old-reading',
      text: `The spare's readings are ${daysText(spare.readingAgeS)} old. Read it again before clipping on.`,
    });
  if (spare.meterId === null || target.meterId === null)
    found.push({
      code: 'other-meter',
      text: 'Nobody noted the meter of both readings. Read pack and spare with the same one: its offset cancels.',
    });
  else if (spare.meterId !== target.meterId)
    found.push({
      code: 'other-meter',
      text: 'Pack and spare were read with two meters. Read both with the same one: its offset cancels.',
    });
  const spread = Math.max(...model.startVolts) - Math.min(...model.startVolts);
  if (spread > Math.max(WIDE_SPREAD_VOLTS, 2 * model.toleranceVolts))
    found.push({
      code: 'group-spread',
      text: `The spare's groups are ${millivoltsText(spread)} apart. Find out why before it goes into a pack.`,
    });
  if (model.celsius < COLD_CELSIUS || model.celsius > WARM_CELSIUS)
    found.push({
      code: 'cold-or-warm',
      text:
        model.celsius < COLD_CELSIUS
          ? `The module is at ${celsiusText(model.celsius)}: charge it slower, and rest it ${durationText(workshop.minRestS * 1.5)}.`
          : `The module is at ${celsiusText(model.celsius)}: let it cool first, and watch it.`,
    });
  if (spare.capacitySource !== 'measured')
    found.push({
      code: 'unknown-health',
      text: `The capacity is ${spare.capacitySource === 'label' ? "the label's" : 'a guess'}, not measured. A measured one narrows the band.`,
    });
  if ([...model.startVolts, target.volts].some((volts) => isBeyondCurve(model.curve, volts)))
    found.push({
      code: 'curve-extended',
      text: 'A voltage lies beyond the ends of the curve. There it is only extended in a straight line.',
    });
  return found;
}
