/** Wording of the checks before clipping on, each from the numbers of its charge (calc.md §8, mock phone-before). */
import type { CheckCode } from '@/shared/contract/charge';
import type { Channel } from '../entities/channel';
import type { ChargeFile } from './charge-file';
import { channelNamesOf } from './charge-steps';
import { lookInTimes } from './charge-look-ins';
import { cellText, clockText, groupsText, listText, setVoltsText, upperFirst } from './charge-words';

/** What a check says before anybody answers; `by` other than 'person' is locked. */
export interface CheckWords {
  by: 'person' | 'data' | 'ruled-out';
  title: string;
  question: string;
  detail: string;
  yes: string;
  no: string;
}

const GAP = '\u00a0';
const titles: Record<CheckCode, string> = {
  isolation: 'Isolation',
  polarity: 'Polarity',
  condition: 'Condition',
  temperature: 'Temperature',
  ceiling: 'Set voltage',
  ventilation: 'Ventilation',
  attendance: 'Attendance',
};
export const titleOfCheck = (code: CheckCode): string => titles[code];

/** 'data' and 'ruled-out' have no answers to give. */
export const locked = (by: 'data' | 'ruled-out', code: CheckCode, says: string, detail: string): CheckWords => ({
  by,
  title: titles[code],
  question: says,
  detail,
  yes: '',
  no: '',
});

const asked = (code: CheckCode, words: Omit<CheckWords, 'by' | 'title'>): CheckWords => ({
  by: 'person',
  title: titles[code],
  ...words,
});

export const isolationWords = (): CheckWords =>
  asked('isolation', {
    question: 'Is the module out of its circuit, with no voltage to the case?',
    detail: 'Plug out, meter from each pole to the case and to the bench.',
    yes: 'No voltage, plug out',
    no: 'Not yet',
  });

/**
 * What the meter must show between the clips of the first step.
 * @param volts of the groups by the newest reading, V
 */
export function polarityWords(file: ChargeFile, volts: readonly number[]): CheckWords {
  const { charge } = file;
  const step = charge.option.steps[0];
  const moved = (step?.groupIndexes ?? []).map((group) => volts[group] ?? 0);
  const sum = moved.reduce((total, one) => total + one, 0);
  const paralleled = step?.way === 'paralleled';
  const expected = paralleled ? sum / Math.max(1, moved.length) : sum;
  const place =
    step?.way === 'terminals'
      ? 'over the module'
      : paralleled
        ? 'over the joined groups'
        : `over ${groupsText(step?.groupIndexes ?? [])}`;
  return asked('polarity', {
    question: `Is red on plus, and does the meter show about ${cellText(expected)}?`,
    detail: `Expected ${place} from its last reading: ${cellText(expected)}. A minus sign means the leads are swapped.`,
    yes: `Red on plus, ${cellText(expected)}`,
    no: 'Something else',
  });
}

export const conditionWords = (): CheckWords =>
  asked('condition', {
    question: 'Is the module free of swelling, leak and dent?',
    detail: 'All six faces, the vents and the terminals.',
    yes: 'No swelling, leak or dent',
    no: 'Something is wrong',
  });

/** Asked only where nobody has read the temperature lately. */
export const temperatureWords = (window: string): CheckWords =>
  asked('temperature', {
    question: `Is the module at ${window}?`,
    detail: 'Nobody has read its temperature today. Lay the probe on it for two minutes.',
    yes: `Within ${window}`,
    no: 'Colder or warmer',
  });

export const ventilationWords = (): CheckWords =>
  asked('ventilation', {
    question: 'Is the fan on, and nothing over the module?',
    detail: 'Fan on, nothing over the module.',
    yes: 'Fan on, module clear',
    no: 'Not yet',
  });

export function attendanceWords(file: ChargeFile, now: number): CheckWords {
  const { charge, workshop } = file;
  const begin = Math.max(now, charge.clipOnAt) + charge.option.currentStartS * 1000;
  const rest = begin + (charge.option.currentEndS - charge.option.currentStartS + charge.option.restS) * 1000;
  const times = lookInTimes(begin, rest, charge.frozen.workshop.lookInIntervalS).map((at) =>
    clockText(at, workshop.zone, now),
  );
  const few = times.length > 3 ? [...times.slice(0, 2), `${times.length - 2} more`] : times;
  const lookIns =
    times.length === 0
      ? 'it is done before the first look-in'
      : `look-in${times.length > 1 ? 's' : ''} ${listText(few)}`;
  return asked('attendance', {
    question: 'Does somebody stay in the building and look in?',
    detail: `${upperFirst(lookIns)}.`,
    yes: `Somebody stays, ${lookIns}`,
    no: 'Nobody can stay',
  });
}

const down = (volts: number): string => setVoltsText(volts, 'charge');
const up = (volts: number): string => setVoltsText(volts, 'discharge');

/** What the charger is set to: the one number that keeps a forgotten charge safe. */
export function ceilingWords(file: ChargeFile, channel: Channel | null): CheckWords {
  const { charge } = file;
  const { option, frozen } = charge;
  const step = option.steps[0];
  const name = listText(channelNamesOf(file, 0)) || 'the resistor';
  const groupsAcross = step?.way === 'terminals' ? frozen.module.groupsInSeries : 1;
  const limit = `${(frozen.module.chargeLimitVolts * groupsAcross).toFixed(2)}${GAP}V`;
  const volts = step?.setVolts ?? option.setVolts;
  if (channel === null || volts === null)
    return asked('ceiling', {
      question: `Does somebody take ${name} off on the count?`,
      detail: 'Nothing here stops by itself. It is taken off when the alert says so.',
      yes: 'On the count',
      no: 'Nobody can',
    });
  if (step?.direction === 'discharge')
    return asked('ceiling', {
      question: `At which voltage does ${name} stop?`,
      detail: `If it is forgotten, ${up(volts)} keeps the groups near ${cellText(volts / groupsAcross)}. Not below ${(frozen.module.dischargeLimitVolts * groupsAcross).toFixed(2)}${GAP}V for this type.`,
      yes: `${up(volts)} or more`,
      no: 'Less than that',
    });
  if (!channel.adjustableVolts)
    return locked(
      'data',
      'ceiling',
      `${channel.maxVolts.toFixed(2)}${GAP}V, fixed`,
      `${name} cannot be set. The module's limit is ${limit}. Locked.`,
    );
  const forgotten =
    charge.finish === 'over-and-settle'
      ? `Charging stops on the count; if it is forgotten, ${down(volts)} keeps the groups near ${(volts / groupsAcross).toFixed(2)}${GAP}V.`
      : `The current tapers at ${down(volts)} and the groups end at the mark; more takes them past it.`;
  return asked('ceiling', {
    question: `What does ${name} show as set voltage?`,
    detail: `${forgotten} The module's limit is ${limit}.`,
    yes: `${down(volts)} or less`,
    no: 'More than that',
  });
}
