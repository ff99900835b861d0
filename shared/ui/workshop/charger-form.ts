import type { ChannelDto, ChargerDto } from '@/shared/contract/equipment';
import type { LocaleMarks } from '../format/marks';
import { typedNumber } from './numbers-typed';

/** A channel as typed. `id` is left out for a new one. */
export interface ChannelTexts {
  id?: string;
  name: string;
  maxAmps: string;
  minAmps: string;
  maxVolts: string;
  maxWatts: string;
  adjustableVolts: boolean;
  senses: 'own-terminals' | 'module';
  leadMilliohm: string;
  displayStepMillivolts: string;
  displayStepAmps: string;
  leadsMeasured: boolean;
  deratingAboveCelsius: string;
  deratingPercent: string;
  dutyPercent: string;
  singleGroup: boolean;
  canDischarge: boolean;
  dischargeAmps: string;
  loadOhm: string;
}

/** A charger as typed; an empty `meterId` is no meter. `baseRev`: the revision that was changed here. */
export interface ChargerTexts {
  name: string;
  place: string;
  meterId: string;
  channels: ChannelTexts[];
  baseRev: number;
}

/** Names of a channel's fields, as its form and its differences show them. */
export const channelFieldNames: Readonly<Record<Exclude<keyof ChannelTexts, 'id'>, string>> = {
  name: 'Name',
  maxAmps: 'Current',
  minAmps: 'Least current',
  maxVolts: 'Up to',
  maxWatts: 'Power',
  adjustableVolts: 'Set voltage can be adjusted',
  senses: 'Senses at',
  leadMilliohm: 'Leads',
  displayStepMillivolts: 'Display step',
  displayStepAmps: 'Current step',
  leadsMeasured: 'Leads are measured',
  deratingAboveCelsius: 'Less above',
  deratingPercent: 'Then gives',
  dutyPercent: 'Gives current',
  singleGroup: 'Can charge a single group',
  canDischarge: 'Can discharge',
  dischargeAmps: 'Discharge current',
  loadOhm: 'Load resistor',
};

export const senseNames = { 'own-terminals': 'its own terminals', module: 'the module' } as const;

/** An empty channel; the numbers every supply has stand at their usual value (common practice). */
export const emptyChannel: ChannelTexts = {
  name: '',
  maxAmps: '',
  minAmps: '0',
  maxVolts: '',
  maxWatts: '',
  adjustableVolts: true,
  senses: 'own-terminals',
  leadMilliohm: '5',
  displayStepMillivolts: '10',
  displayStepAmps: '',
  leadsMeasured: false,
  deratingAboveCelsius: '',
  deratingPercent: '',
  dutyPercent: '',
  singleGroup: false,
  canDischarge: false,
  dischargeAmps: '',
  loadOhm: '',
};

const channelTexts = (channel: ChannelDto, marks: LocaleMarks): ChannelTexts => ({
  id: channel.id,
  name: channel.name,
  maxAmps: typedNumber(channel.maxAmps, 0, marks),
  minAmps: typedNumber(channel.minAmps, 0, marks),
  maxVolts: typedNumber(channel.maxVolts, 0, marks),
  maxWatts: typedNumber(channel.maxWatts, 0, marks),
  adjustableVolts: channel.adjustableVolts,
  senses: channel.senses,
  leadMilliohm: typedNumber(channel.leadMilliohm, 0, marks),
  displayStepMillivolts: typedNumber(channel.displayStepMillivolts, 0, marks),
  displayStepAmps: typedNumber(channel.displayStepAmps, 0, marks),
  // Nobody has said: as given, as the plan takes it.
  leadsMeasured: channel.leadsMeasured ?? true,
  deratingAboveCelsius: typedNumber(channel.deratingAboveCelsius, 0, marks),
  deratingPercent: typedNumber(channel.deratingPercent, 0, marks),
  dutyPercent: typedNumber(channel.dutyPercent, 0, marks),
  singleGroup: channel.singleGroup,
  canDischarge: channel.canDischarge,
  dischargeAmps: typedNumber(channel.dischargeAmps, 0, marks),
  loadOhm: typedNumber(channel.loadOhm, 0, marks),
});

/** The form's texts of a charger; without one, an empty form with one channel to fill in. */
export const chargerTexts = (charger: ChargerDto | null, marks: LocaleMarks): ChargerTexts =>
  charger
    ? {
        name: charger.name,
        place: charger.place ?? '',
        meterId: charger.meterId ?? '',
        channels: charger.channels.map((channel) => channelTexts(channel, marks)),
        baseRev: charger.rev,
      }
    : { name: '', place: '', meterId: '', channels: [emptyChannel], baseRev: 0 };

/** The same in one flat set of names and words, for the table of what differs. */
export function chargerWords(
  texts: ChargerTexts,
  meters: readonly { id: string; name: string }[],
): { names: Record<string, string>; words: Record<string, unknown> } {
  const names: Record<string, string> = { name: 'Name', place: 'Place', meterId: 'Meter', channels: 'Channels' };
  const words: Record<string, unknown> = {
    name: texts.name,
    place: texts.place,
    meterId: meters.find((meter) => meter.id === texts.meterId)?.name ?? '',
    channels: texts.channels.map((channel) => channel.name).join(', '),
  };
  for (const channel of texts.channels) {
    const of = channel.id ?? channel.name;
    for (const [key, title] of Object.entries(channelFieldNames)) {
      names[`${of}.${key}`] = `${channel.name}: ${title.toLowerCase()}`;
      const value = channel[key as keyof ChannelTexts];
      words[`${of}.${key}`] = key === 'senses' ? senseNames[channel.senses] : value;
    }
  }
  return { names, words };
}
