import type { Stage } from '@/shared/contract/charge';
import type { ChargeFile } from './charge-file';
import { chargeNow, instantOf, secondsOf } from './charge-clock';
import { reckonAt } from './charge-reckoning';
import { restOf, withRestEnd } from './charge-rest';
import { isUnderWay, stageFrom, swapWait } from './charge-stages';
import { channelNamesOf, handText } from './charge-steps';
import { ampHoursText, ampsText, clockText, durationText, listText } from './charge-words';

/** Something that happened, for the log of the charge. */
export interface Note {
  at: number;
  kind: string;
  personId: string | null;
  text: string;
}

const rank = (stage: Stage): number => ['charging', 'tapering', 'resting', 'check-due'].indexOf(plain(stage));
const plain = (stage: Stage): Stage => (stage === 'discharging' ? 'charging' : stage);

/** Reckons a started charge for `now` and sets what follows from it but the stage: its instants and its band. */
export function reckonTo(file: ChargeFile, now: number): void {
  const { charge } = file;
  const at = chargeNow(charge, now);
  const reckoned = reckonAt(file, at);
  const nowS = Math.max(0, secondsOf(charge, at));
  const rest = restOf(file, reckoned, nowS);
  const reckoning = withRestEnd(reckoned, rest?.enoughAtS ?? null, nowS);
  charge.reckoning = { at, reckoning, rest };
  charge.taperAt = reckoning.taperAtS === null ? null : instantOf(charge, reckoning.taperAtS);
  if (!charge.currentOffSaid) charge.currentEndAt = instantOf(charge, reckoning.currentEndS);
  charge.checkDueAt = instantOf(charge, reckoning.restEndS);
  charge.earlyAt = instantOf(charge, reckoning.readyS.p10);
  charge.likelyAt = instantOf(charge, reckoning.readyS.p50);
  charge.lateAt = instantOf(charge, reckoning.readyS.p90);
}

/**
 * Brings a charge to the stage its plan and its readings say for `now`: reckons it, sets stage and instants, and gives
 * what happened on the way, each at the instant it happened. Leaves a charge alone that is not under way.
 */
export function progress(file: ChargeFile, now: number): Note[] {
  const { charge } = file;
  if (charge.startedAt === null || !isUnderWay(charge.stage)) return [];
  const stageBefore = charge.stage;
  const stepBefore = charge.reckoning?.reckoning.stepIndex ?? 0;
  const waitedBefore = swapWait(file) !== null;

  reckonTo(file, now);
  const reckoning = charge.reckoning!.reckoning;
  if (stageBefore === 'held') return [];

  charge.stage = stageFrom(reckoning, charge.direction);
  const notes = stageNotes(file, stageBefore, stepBefore, now);
  const wait = swapWait(file);
  if (wait !== null && !waitedBefore)
    notes.push({
      at: wait.since,
      kind: 'step-end',
      personId: null,
      text: `${stepEndText(file)} ${handText(file, wait.stepIndex)}.`,
    });
  return notes;
}

function stageNotes(file: ChargeFile, before: Stage, stepBefore: number, now: number): Note[] {
  const { charge } = file;
  const from = rank(before);
  const to = rank(charge.stage);
  const notes: Note[] = [];
  const note = (at: number | null, kind: string, text: string): void => {
    notes.push({ at: Math.min(at ?? now, now), kind, personId: null, text });
  };
  if (to < from) {
    const nextStep = charge.reckoning!.reckoning.stepIndex > stepBefore;
    if (!nextStep && from >= 2) note(now, 'back', backText(file, now));
    return notes;
  }
  if (from < 1 && to >= 1 && charge.taperAt !== null && charge.taperAt <= (charge.currentEndAt ?? Infinity))
    note(charge.taperAt, 'tapering', 'A voltage limit rules from here: the current tapers.');
  if (from < 2 && to >= 2) note(charge.currentEndAt, 'resting', restText(file, now));
  if (from < 3 && to >= 3)
    note(charge.checkDueAt, 'check-due', `Rested ${durationText(restedS(file))}. The check is due.`);
  return notes;
}

/** Seconds from the end of current to the end of the rest. */
export const restedS = ({ charge }: ChargeFile): number =>
  charge.currentEndAt === null || charge.checkDueAt === null ? 0 : (charge.checkDueAt - charge.currentEndAt) / 1000;

function restText(file: ChargeFile, now: number): string {
  const { charge, workshop } = file;
  const delivered = ampHoursText(Math.abs(charge.reckoning!.reckoning.deliveredAh));
  const until = charge.checkDueAt === null ? '' : ` Rest until ${clockText(charge.checkDueAt, workshop.zone, now)}.`;
  const way = charge.direction === 'discharge' ? 'out' : 'in';
  return `${delivered} ${way === 'in' ? 'are in' : 'are out'}: the current ends.${until}`;
}

function backText(file: ChargeFile, now: number): string {
  const { charge, workshop } = file;
  if (charge.stage === 'resting')
    return `The rest goes on until ${clockText(charge.checkDueAt ?? now, workshop.zone, now)}.`;
  return `By the readings ${ampsText(Math.abs(charge.reckoning!.reckoning.amps))} still flow.`;
}

function stepEndText(file: ChargeFile): string {
  const { charge } = file;
  const index = charge.reckoning!.reckoning.stepIndex;
  const names = channelNamesOf(file, index);
  const step = `Step ${index + 1} of ${charge.option.steps.length} ends`;
  return names.length === 0 ? `${step}.` : `${step} on ${listText(names)}.`;
}
