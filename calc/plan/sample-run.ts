import type { ChannelParameters } from '../plan-types';
import type { Source } from '../types';
import { currentSeconds, type CurrentLaw } from './current-seconds';
import type { PlanModel } from './plan-model';
import type { Sample } from './samples';
import { ampHoursToFirst, ampHoursToVolts, stringVolts, type StringCharge } from './string-charge';

/** The least current of a sample that would never end, as a share of the set one. */
const LEAST_SHARE = 0.01;

export interface SampleRunInput {
  model: PlanModel;
  source: Source;
  sign: 1 | -1;
  /** Groups in series between the clips. */
  count: number;
  linkOhm: number;
  /** Standard deviation of the charger's voltmeter, V between the clips. */
  chargerSd: number;
  /** Summed rest voltage aimed at, as the target's meter reads it. */
  aimVolts: number;
  /** Ends when the first group is at the target, and not by the sum. */
  first: boolean;
  /** Current at which a taper ends; null: ends at the target. */
  endAmps: number | null;
  /** In a taper that has been seen: the current with which every sample begins, in place of the set voltage; else null. */
  startAmps?: number | null;
  /** Leads of the source in one sample, ohm, where they differ between samples. */
  leadOhmIn?: (sample: Sample) => number;
  /** How much wider this source's current is off than the spread says (ampsWidening). */
  currentWidening?: number;
  /** The string between the clips where the current begins, in one sample. */
  stringIn: (sample: Sample) => { string: StringCharge; ohm: number };
}

/** Seconds and ampere-hours of current in one sample. */
export type SampleRun = (sample: Sample) => { seconds: number; ampHours: number };

/**
 * One step in one sample, by quadrature: until the sample's own target (over and settle), or until the current has fallen as
 * far as it falls at the nominal end (on the mark: the charger's voltmeter decides, and people go by the amps).
 */
export function sampleRun(input: SampleRunInput): SampleRun {
  const { source, sign, count, aimVolts, endAmps } = input;
  const known = new Map<Sample, { seconds: number; ampHours: number }>();
  // Made once and not in each of hundreds of samples: a law is done with before the next sample comes.
  let string: StringCharge;
  const openVolts = (ampHours: number): number => stringVolts(string, ampHours);
  const ampHoursTo = (volts: number): number => ampHoursToVolts(string, volts);
  return (sample) => {
    const before = known.get(sample);
    if (before) return before;
    const found = input.stringIn(sample);
    string = found.string;
    const { ohm } = found;
    const resistanceOhm = ohm + (input.leadOhmIn?.(sample) ?? source.leadResistanceOhm) + input.linkOhm;
    const asSet =
      source.setVolts === null
        ? null
        : source.setVolts + count * sample.curveShiftVolts + input.chargerSd * sample.chargerDraw;
    const startAmps = input.startAmps ?? null;
    const law: CurrentLaw = {
      openVolts,
      ampHoursTo,
      sign,
      maxAmps: (source.maxAmps ?? Infinity) * sample.currentFactor ** (input.currentWidening ?? 1),
      setVolts: startAmps === null ? asSet : stringVolts(string, 0) + sign * startAmps * resistanceOhm,
      maxWatts: source.maxWatts,
      resistanceOhm,
      loadOhm: source.loadOhm,
      leastAmps: endAmps ?? (source.maxAmps ?? 1) * LEAST_SHARE,
    };
    const goal =
      endAmps !== null && law.setVolts !== null
        ? law.setVolts - sign * endAmps * law.resistanceOhm
        : aimVolts + count * sample.targetShiftVolts;
    const ampHours =
      input.first && endAmps === null
        ? Math.max(0, ampHoursToFirst(string, sample.targetSoc))
        : ampHoursToVolts(string, goal);
    const run = { seconds: currentSeconds(law, ampHours), ampHours };
    known.set(sample, run);
    return run;
  };
}

/** What a channel's own voltmeter may be off, V between the clips: as checked, else the default a group. */
export function chargerSd(model: PlanModel, channel: ChannelParameters, count: number): number {
  const asked = model.input.spreads?.chargerVolts;
  if (asked !== undefined) return asked * count;
  return channel.offsetSdVolts ?? model.spreads.chargerVolts * count;
}
