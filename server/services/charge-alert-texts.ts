/** What each alert says: what was seen, then what to check first (look: §1, §8). */
import type { OddSeen } from '@/calc/live-types';
import { oddCheckFirst } from '@/shared/contract/odd-check';
import type { ChargeFile } from './charge-file';
import { isChecked, promisedAt } from './charge-due';
import { lastVisitAt } from './charge-look-ins';
import { restedS } from './charge-progress';
import { isRunning, type SwapWait } from './charge-stages';
import { channelNamesOf, handText, stepsOfSwap, titleAtChannel } from './charge-steps';
import {
  ampHoursText,
  ampsText,
  celsiusText,
  cellText,
  clipText,
  clockText,
  durationText,
  listText,
  millivoltsText,
  plainAmpsText,
  setVoltsText,
  titleOf,
  upperFirst,
} from './charge-words';

export interface AlertText {
  title: string;
  seen: string;
  checkFirst: string;
}

const lastStep = (file: ChargeFile): number => file.charge.option.steps.length - 1;
const presentStep = (file: ChargeFile): number => file.charge.reckoning?.reckoning.stepIndex ?? 0;
const channelsOfLast = (file: ChargeFile): string => {
  const { option } = file.charge;
  const starts = stepsOfSwap(option, lastStep(file));
  return listText([...new Set(starts.flatMap((index) => channelNamesOf(file, index)))]);
};

/** The end of current: over and settle does not end by itself, on the mark has all but ended. */
export function chargeDoneText(file: ChargeFile, now: number): AlertText {
  const { charge, workshop } = file;
  const delivered = ampHoursText(Math.abs(charge.reckoning?.reckoning.deliveredAh ?? 0));
  const channels = channelsOfLast(file);
  const direction = charge.direction === 'discharge' ? 'out' : 'in';
  const due = charge.checkDueAt === null ? '' : `, check due ${clockText(charge.checkDueAt, workshop.zone, now)}`;
  const off = channels === '' ? 'Take the resistor off' : `Switch ${channels} off`;
  if (charge.finish === 'over-and-settle')
    return {
      title: titleAtChannel(file, lastStep(file)),
      seen: `${off}: ${delivered} are ${direction}. It does not stop by itself.`,
      checkFirst: `That ${channels === '' ? 'the resistor' : channels} is off, then say when. It rests from then on${due}.`,
    };
  return {
    title: titleAtChannel(file, lastStep(file)),
    seen: `${delivered} are ${direction} and the current has tapered to the mark. Resting${due}.`,
    checkFirst: `${off}, then say when.`,
  };
}

export function checkDueText(file: ChargeFile): AlertText {
  const { charge } = file;
  const unsaid =
    charge.currentOffSaid || charge.finish === 'on-the-mark'
      ? ''
      : ` Nobody has said that ${channelsOfLast(file) || 'the resistor'} is off: look at that before you measure.`;
  return {
    title: titleAtChannel(file, lastStep(file)),
    seen: `Rested ${durationText(restedS(file))}.${settledText(file)}`,
    checkFirst: `Each group with the meter, three decimals, against ${cellText(charge.frozen.target.volts)}.${unsaid}`,
  };
}

/** The readings of the rest say that it has settled, before the workshop's minimum rest is over. */
export const isSettledEarly = (file: ChargeFile): boolean => restedS(file) < file.charge.frozen.workshop.minRestS - 1;

const settledText = (file: ChargeFile): string =>
  isSettledEarly(file) ? ' Its readings say that it has settled.' : '';

export function stepSwapText(file: ChargeFile, wait: SwapWait): AlertText {
  const { charge } = file;
  const { reckoning } = charge.reckoning!;
  return {
    title: titleAtChannel(file, reckoning.stepIndex),
    seen: `Step ${reckoning.stepIndex + 1} of ${charge.option.steps.length} has its charge. ${handText(file, wait.stepIndex)}.`,
    checkFirst: swapCheck(file, wait),
  };
}

function swapCheck(file: ChargeFile, wait: SwapWait): string {
  const before = channelNamesOf(file, presentStep(file));
  const step = file.charge.option.steps[wait.stepIndex]!;
  const off = before.length === 0 ? 'That the resistor is off' : `That ${listText(before)} is off`;
  const names = channelNamesOf(file, wait.stepIndex);
  const volts = step.setVolts === null ? null : setVoltsText(step.setVolts, step.direction);
  const amps = step.setAmps === null ? null : plainAmpsText(step.setAmps);
  const set = [volts, amps].filter((part) => part !== null).join(', ');
  const dial = names.length === 0 || set === '' ? '' : ` Then set ${listText(names)} to ${set}.`;
  return `${off}, before a clip is moved.${dial}`;
}

export function lookInText(file: ChargeFile): AlertText {
  const { charge } = file;
  const reckoning = charge.reckoning?.reckoning;
  const title = `Look-in at ${titleOf(charge)}`;
  if (!reckoning || !isRunning(charge.stage))
    return {
      title,
      seen: 'A look-in is due. It rests, nothing flows.',
      checkFirst: 'Warmth, smell, the shape of the module.',
    };
  const stands = `${ampsText(Math.abs(reckoning.amps))} and ${clipText(reckoning.terminalVolts)} are expected`;
  const joined = charge.option.steps[presentStep(file)]?.way === 'paralleled' ? ', the joined links' : '';
  return {
    title,
    seen: `A look-in is due. ${stands}.`,
    checkFirst: `Warmth, smell${joined} and the clips, then log what the charger shows.`,
  };
}

export function lookInMissedText(file: ChargeFile, now: number): AlertText {
  const since = clockText(lastVisitAt(file), file.workshop.zone, now);
  return { ...lookInText(file), seen: `Nobody has looked in since ${since}.` };
}

/** A reading that nothing explains: what was seen, what was expected, what to look at first. */
export function oddText(file: ChargeFile, odd: OddSeen): AlertText {
  const valueOf = (value: number): string =>
    odd.quantity === 'amps'
      ? ampsText(Math.abs(value))
      : odd.quantity === 'celsius'
        ? celsiusText(value)
        : odd.quantity === 'group-volts'
          ? cellText(value)
          : clipText(value);
  const names = listText(channelNamesOf(file, presentStep(file)));
  return {
    title: titleAtChannel(file, presentStep(file)),
    seen: `${oddSeen(odd, valueOf(odd.seen))} ${valueOf(odd.expected)} was expected.`,
    checkFirst: upperFirst(oddCheckFirst(odd, names === '' ? 'the resistor' : names)),
  };
}

function oddSeen({ kind, quantity, group }: OddSeen, seen: string): string {
  if (kind === 'no-current') return 'No current flows.';
  if (kind === 'stuck-current') return `The current has stood at ${seen}.`;
  if (kind === 'too-warm') return `It has warmed to ${seen}.`;
  if (group !== null) return `Group ${group + 1} reads ${seen}.`;
  return quantity === 'terminal-volts' ? `The clips read ${seen}.` : `${seen} was read.`;
}

/** The group that is behind by more than the workshop lets pass; null: none is. */
function oddGroup({ charge }: ChargeFile): { name: string; lagVolts: number } | null {
  const reckoning = charge.reckoning?.reckoning;
  if (!reckoning || reckoning.laggingGroup === null) return null;
  if (Math.abs(reckoning.lagVolts) <= charge.frozen.lagLimitVolts) return null;
  return { name: `group ${reckoning.laggingGroup + 1}`, lagVolts: reckoning.lagVolts };
}

/** Late against the plan: what stands in its way, as far as the numbers know. */
export function overdueText(file: ChargeFile, now: number): AlertText {
  const { charge, workshop } = file;
  const promised = `It was to be ready by ${clockText(promisedAt(file), workshop.zone, now)}.`;
  if (charge.stage === 'queued') {
    const names = listText(channelNamesOf(file, 0));
    return {
      title: titleAtChannel(file, 0),
      seen: `${promised} It is not clipped on yet.`,
      checkFirst: `${names === '' ? 'What it waits for' : `Whether ${names} is free`}, then clip on or stop waiting for it.`,
    };
  }
  const title = titleAtChannel(file, presentStep(file));
  if (charge.stage === 'check-due')
    return isChecked(file)
      ? {
          title,
          seen: `${promised} The check found it outside.`,
          checkFirst: 'The top-up: plan it, or shelve the spare.',
        }
      : {
          title,
          seen: `Its check has waited since ${clockText(charge.checkDueAt ?? now, workshop.zone, now)}.`,
          checkFirst: 'The group voltages: enter them, and it is known.',
        };
  const likely = charge.likelyAt === null ? '' : ` Now ${clockText(charge.likelyAt, workshop.zone, now)}.`;
  const odd = oddGroup(file);
  const lag = odd === null ? '' : ` ${upperFirst(odd.name)} lags ${millivoltsText(odd.lagVolts)}.`;
  return { title, seen: `${promised}${likely}${lag}`, checkFirst: overdueCheck(file) };
}

function overdueCheck(file: ChargeFile): string {
  const { charge } = file;
  const names = listText(channelNamesOf(file, presentStep(file)));
  if (charge.stage === 'held') return `What ${titleOf(charge)} is held for, then resume or stop it.`;
  if (charge.stage === 'resting') return 'Nothing at the clips: it rests. Tell who waits for it.';
  const odd = oddGroup(file);
  const clips = odd === null ? 'The clips' : `Warmth at ${odd.name}, then its clips`;
  return `${clips}, then what ${names === '' ? 'the meter' : names} shows in amps. Log it.`;
}
