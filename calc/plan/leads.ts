import type { ChannelParameters } from '../plan-types';
import { SAMPLE_AXES, type Sample } from './samples';

/** Leads of which nobody has said anything, there and back with their clips, ohm: a guess between 5 and 20 mΩ. */
const GUESSED_LEAD_OHM = 0.01;
/** Of leads that were not measured, by the logarithm: a guess, half to twice from 10 to 90 %. */
const GUESSED_LEAD_SD = 0.5;
const LEADS_AXIS = SAMPLE_AXES.indexOf('leads');

/** Ohm between a supply's own sense points and the module; 0 where it senses at the module. */
export function leadOhmOf(channel: ChannelParameters): number {
  if (channel.senses === 'module') return 0;
  if (channel.leadsMeasured !== false) return channel.leadResistanceOhm;
  return withGuessedLeads(channel).leadResistanceOhm;
}

/** The channel with the guess in place of leads that nobody has measured or entered. */
export const withGuessedLeads = (channel: ChannelParameters): ChannelParameters =>
  channel.leadsMeasured === false && !(channel.leadResistanceOhm > 0)
    ? { ...channel, leadResistanceOhm: GUESSED_LEAD_OHM }
    : channel;

/** The leads in one sample; undefined where they are known and so the same in all. */
export function leadOhmIn(channel: ChannelParameters): ((sample: Sample) => number) | undefined {
  if (channel.senses === 'module' || channel.leadsMeasured !== false) return undefined;
  const ohm = leadOhmOf(channel);
  return (sample) => ohm * Math.exp(GUESSED_LEAD_SD * sample.draws[LEADS_AXIS]!);
}
