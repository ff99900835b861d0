import type { Levers } from '@/shared/contract/waits-replay';
import { parseNumber } from '../format/parse';

export const leverKeys = [
  ...(['startAtBooking', 'shelf', 'amps', 'moreLikeChannelId'] as const),
  ...(['lookInMinutes', 'overnightAllowed', 'paralleledAllowed'] as const),
] as const;
export type LeverKey = (typeof leverKeys)[number];

export const leverNames: Record<LeverKey, { title: string; meaning: string }> = {
  startAtBooking: { title: 'Start at booking', meaning: 'the spare is brought up before the pack is opened' },
  shelf: { title: 'Another shelf voltage', meaning: 'spares of one module type kept at other volts' },
  amps: { title: 'Other amps', meaning: 'on all channels like one; within every module type’s limit' },
  moreLikeChannelId: { title: 'One more channel', meaning: 'like one of those there are' },
  lookInMinutes: { title: 'Another look-in interval', meaning: 'how long a charge may be left alone' },
  overnightAllowed: { title: 'Overnight allowed', meaning: 'charges run on while nobody is here' },
  paralleledAllowed: { title: 'Groups paralleled allowed', meaning: 'where it is the quicker way' },
};

/** What is typed and chosen for the levers; numbers as typed. */
export interface LeverTyped {
  ticked: readonly LeverKey[];
  shelfTypeId: string;
  shelfVolts: string;
  ampsChannelId: string;
  amps: string;
  moreChannelId: string;
  lookInMinutes: string;
}
export const noLevers: LeverTyped = {
  ...{ ticked: [], shelfTypeId: '', shelfVolts: '', ampsChannelId: '', amps: '', moreChannelId: '', lookInMinutes: '' },
};

export type LeverField = Exclude<keyof LeverTyped, 'ticked'>;
export interface LeverAsk {
  /** Of each ticked lever; in the order of the list. */
  questions: { key: LeverKey; levers: Levers }[];
  /** What is missing, by field. */
  errors: Partial<Record<LeverField, string>>;
}

/** Null where it is no number. */
export function numberTyped(text: string): number | null {
  const read = parseNumber(text);
  return read.ok ? read.value : null;
}

/** The questions of the ticked levers, or what is missing in them. The server checks again. */
export function leverAsk(typed: LeverTyped): LeverAsk {
  const errors: LeverAsk['errors'] = {};
  const questions: LeverAsk['questions'] = [];
  for (const key of leverKeys.filter((one) => typed.ticked.includes(one))) {
    const levers = leversOf(key, typed, errors);
    if (levers) questions.push({ key, levers });
  }
  return { questions, errors };
}

function leversOf(key: LeverKey, typed: LeverTyped, errors: LeverAsk['errors']): Levers | null {
  if (key === 'startAtBooking') return { startAtBooking: true };
  if (key === 'overnightAllowed') return { overnightAllowed: true };
  if (key === 'paralleledAllowed') return { paralleledAllowed: true };
  if (key === 'moreLikeChannelId') {
    if (typed.moreChannelId === '') errors.moreChannelId = 'Choose a channel.';
    return typed.moreChannelId === '' ? null : { moreLikeChannelId: typed.moreChannelId };
  }
  if (key === 'lookInMinutes') {
    const minutes = numberTyped(typed.lookInMinutes);
    if (minutes !== null && Number.isInteger(minutes) && minutes >= 5 && minutes <= 1440)
      return { lookInMinutes: minutes };
    errors.lookInMinutes = 'Type whole minutes, 5 to 1,440.';
    return null;
  }
  if (key === 'amps') {
    const amps = numberTyped(typed.amps);
    if (typed.ampsChannelId === '') errors.ampsChannelId = 'Choose a channel.';
    if (amps === null || amps < 0.1 || amps > 1000) errors.amps = 'Type amps, 0.1 to 1,000.';
    else if (typed.ampsChannelId !== '') return { amps: { channelId: typed.ampsChannelId, amps } };
    return null;
  }
  const volts = numberTyped(typed.shelfVolts);
  if (typed.shelfTypeId === '') errors.shelfTypeId = 'Choose a module type.';
  if (volts === null || volts <= 0 || volts > 10) errors.shelfVolts = 'Type the volts of one group.';
  else if (typed.shelfTypeId !== '') return { shelf: { moduleTypeId: typed.shelfTypeId, volts } };
  return null;
}
