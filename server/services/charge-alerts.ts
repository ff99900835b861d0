/**
 * Alerts follow the state of a charge: what it asks for now is compared with what is open, the missing is raised and
 * what has lost its cause is cleared, in the transaction that changed the charge. A cause has one key, so that it is
 * told once, also across restarts.
 */
import type { EntityManager } from 'typeorm';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import { askedForOnly, waysOf } from '@/shared/contract/alert-settings';
import type { Alert } from '../entities/alert';
import { clearAlert, raiseAlert } from '../alerts/turns';
import { alertSettingsOf } from '../repositories/alert-settings.repository';
import { alertsOfCharge } from '../repositories/alerts.repository';
import {
  chargeDoneText,
  checkDueText,
  isSettledEarly,
  lookInMissedText,
  lookInText,
  oddText,
  overdueText,
  stepSwapText,
  type AlertText,
} from './charge-alert-texts';
import {
  channelFaultText,
  noReadingText,
  overTemperatureText,
  overVoltageText,
  startMissedText,
  taperText,
} from './charge-cause-texts';
import { faultsOf } from './channel-fault';
import { overTemperature, overVoltage, silenceOf, startMissedSince } from './charge-causes';
import { isChecked, overdueSince, TOLD_AGAIN_MS } from './charge-due';
import type { ChargeFile } from './charge-file';
import { dueLookIn, missedLookIn } from './charge-look-ins';
import { readingInstantOf } from './charge-clock';
import { isUnderWay, swapWait } from './charge-stages';
import { durationText } from './charge-words';
import { newId } from './ids';
import { isAnybodyThere, lookInPerson } from './look-in-person';

/** An alert that comes this much after its cause says so, s. */
const LATE_S = 120;

interface Wanted {
  kind: AlertKind;
  level: Alert['level'];
  /** The instant of the cause. */
  since: number;
  /** Tells causes of one kind apart where the charge itself can; else they are counted. */
  key?: string;
  text: AlertText;
}

/** What a charge asks for at `now`. */
export function wantedAlerts(file: ChargeFile, now: number): Wanted[] {
  const { charge } = file;
  const wanted: Wanted[] = [];
  const resting = charge.stage === 'resting';
  const checkDue = charge.stage === 'check-due' && !isChecked(file);
  // Over and settle goes on until a hand switches it off, so its alert outlives the rest.
  const stillOn = !charge.currentOffSaid && (resting || (checkDue && charge.finish === 'over-and-settle'));
  if (stillOn)
    wanted.push({
      kind: 'charge-done',
      level: charge.finish === 'over-and-settle' ? 'amber' : 'tell',
      since: charge.currentEndAt ?? now,
      text: chargeDoneText(file, now),
    });
  if (checkDue)
    wanted.push({
      // By its readings before its time: nobody expects it yet.
      kind: isSettledEarly(file) ? 'rested' : 'check-due',
      level: 'amber',
      since: charge.checkDueAt ?? now,
      text: checkDueText(file),
    });
  if (charge.stage === 'tapering')
    wanted.push({
      kind: 'taper-begun',
      level: 'tell',
      since: charge.taperAt ?? now,
      key: 'taper',
      text: taperText(file, now),
    });
  const startMissed = startMissedSince(file, now);
  if (startMissed !== null)
    wanted.push({
      kind: 'latest-start-missed',
      level: 'amber',
      since: startMissed,
      key: String(startMissed),
      text: startMissedText(file, startMissed, now),
    });
  const silence = silenceOf(file);
  if (silence !== null && silence.dueAt <= now)
    wanted.push({
      kind: 'no-reading',
      level: 'amber',
      since: silence.dueAt,
      key: String(silence.lastAt),
      text: noReadingText(file, silence, now),
    });
  const swap = swapWait(file);
  if (swap !== null)
    wanted.push({
      kind: 'step-swap',
      level: 'amber',
      since: swap.since,
      text: stepSwapText(file, swap),
    });
  const lookIn = dueLookIn(file, now);
  const missed = missedLookIn(file, now);
  if (missed !== null)
    wanted.push({
      kind: 'look-in-missed',
      level: 'amber',
      since: missed.dueAt,
      key: missed.id,
      text: lookInMissedText(file, now),
    });
  // What was missed is told as that; of those due since it the last is still asked for.
  if (lookIn !== null && lookIn !== missed)
    wanted.push({ kind: 'look-in-due', level: 'tell', since: lookIn.dueAt, key: lookIn.id, text: lookInText(file) });
  for (const fault of faultsOf(file))
    wanted.push({
      kind: 'channel-fault',
      level: fault.flows ? 'alarm' : 'amber',
      since: fault.channel.faultAt,
      // Each fault of each channel, and anew where current comes from it meanwhile.
      key: `${fault.channel.id}-${fault.channel.faultAt}${fault.flows ? '-flows' : ''}`,
      text: channelFaultText(file, fault, now),
    });
  if (isUnderWay(charge.stage)) wanted.push(...readingAlerts(file));
  const late = overdueSince(file, now);
  if (late !== null) wanted.push({ kind: 'overdue', level: 'alarm', since: late, text: overdueText(file, now) });
  return wanted;
}

/** What the readings of a charge call for: over a limit of its type, or what nothing explains. */
function readingAlerts(file: ChargeFile): Wanted[] {
  const { charge } = file;
  const wanted: Wanted[] = [];
  const warm = overTemperature(file);
  // Each time over a limit is told anew.
  if (warm !== null)
    wanted.push({
      kind: 'too-warm',
      level: 'alarm',
      since: warm.since,
      key: String(warm.since),
      text: overTemperatureText(file, warm),
    });
  const volts = overVoltage(file);
  if (volts !== null)
    wanted.push({
      kind: 'over-voltage',
      level: 'alarm',
      since: volts.since,
      key: String(volts.since),
      text: overVoltageText(file, volts),
    });
  const odd = charge.reckoning?.reckoning.odd ?? null;
  if (odd === null || (odd.kind === 'too-warm' && warm !== null)) return wanted;
  // One kind is told once a charge: what comes and goes with every reading would ring with every reading.
  wanted.push({
    kind: odd.kind === 'too-warm' || odd.kind === 'no-current' ? odd.kind : 'odd-reading',
    level: 'alarm',
    since: readingInstantOf(charge, odd.sinceS),
    key: odd.kind,
    text: oddText(file, odd),
  });
  return wanted;
}

/** What is raised only for who has asked for it is left out unless the person of the charge has. */
async function askedFor(manager: EntityManager, file: ChargeFile, wanted: Wanted[]): Promise<Wanted[]> {
  const { personId, workshopId } = file.charge;
  if (!wanted.some(({ kind }) => askedForOnly.includes(kind))) return wanted;
  const ids = personId === null ? [] : [personId];
  const wishes = [...(await alertSettingsOf(manager, workshopId, ids)).values()][0]?.wishes ?? {};
  return wanted.filter((want) => !askedForOnly.includes(want.kind) || waysOf(wishes, want).length > 0);
}

export interface AlertChanges {
  /** New ones, and those told once more under the same id because nobody has taken them. */
  raised: Alert[];
  /** Ids of those that were cleared. */
  changed: string[];
}

/**
 * Raises and clears, so that the open alerts of the charge are those it asks for.
 * @param dueWas instant at which the server meant to look at the charge; an alert is as late as the server was
 */
export async function syncAlerts(
  manager: EntityManager,
  file: ChargeFile,
  now: number,
  dueWas: number | null,
): Promise<AlertChanges> {
  const { charge } = file;
  const all = await alertsOfCharge(manager, charge.workshopId, charge.id);
  const changes: AlertChanges = { raised: [], changed: [] };
  const wanted = await askedFor(manager, file, await withoutUnattended(manager, file, wantedAlerts(file, now), now));
  for (const alert of all.filter((one) => one.clearedAt === null)) {
    const match = wanted.find((one) => one.kind === alert.kind && isCauseOf(one, alert));
    if (match) {
      if (isToldAgain(match, alert, now, dueWas)) changes.raised.push(alert);
      continue;
    }
    await clearAlert(manager, alert, now);
    changes.changed.push(alert.id);
  }
  for (const want of wanted) {
    if (all.some((one) => one.clearedAt === null && one.kind === want.kind && isCauseOf(want, one))) continue;
    const cause = causeOf(charge.id, want, all);
    if (all.some((one) => one.cause === cause)) continue;
    const personId = await personFor(manager, file, want, now);
    const alert = newAlert(file, want, cause, personId, now, dueWas);
    await raiseAlert(manager, alert, file.workshop, now);
    all.push(alert);
    changes.raised.push(alert);
  }
  return changes;
}

const isCauseOf = (want: Wanted, alert: Alert): boolean =>
  want.key === undefined || alert.cause.endsWith(`:${want.key}`);

function causeOf(chargeId: string, want: Wanted, all: readonly Alert[]): string {
  const count = all.filter((one) => one.kind === want.kind).length + 1;
  return `${want.kind}:${chargeId}:${want.key ?? count}`;
}

/** A check or a swap that nobody has taken is told again after 5 and after 15 min, each time once. */
function isToldAgain(want: Wanted, alert: Alert, now: number, dueWas: number | null): boolean {
  if (alert.takenAt !== null || dueWas === null || !['check-due', 'rested', 'step-swap'].includes(want.kind))
    return false;
  return TOLD_AGAIN_MS.some((wait) => want.since + wait >= dueWas && want.since + wait <= now);
}

const isLookIn = ({ kind }: Wanted): boolean => kind === 'look-in-due' || kind === 'look-in-missed';

/** Where charges may run unattended nobody has missed a look-in while nobody is there. It is told when somebody comes. */
async function withoutUnattended(
  manager: EntityManager,
  file: ChargeFile,
  wanted: Wanted[],
  now: number,
): Promise<Wanted[]> {
  if (file.workshop.unattendedCharges !== true || !wanted.some(({ kind }) => kind === 'look-in-missed')) return wanted;
  if (await isAnybodyThere(manager, file, now)) return wanted;
  return wanted.filter(({ kind }) => kind !== 'look-in-missed');
}

/** Whom it is for: a look-in is whose the bench plan gives it to, all else the charge's own person's. */
const personFor = async (manager: EntityManager, file: ChargeFile, want: Wanted, now: number): Promise<string | null> =>
  (isLookIn(want) ? await lookInPerson(manager, file, now) : null) ?? file.charge.personId;

function newAlert(
  file: ChargeFile,
  want: Wanted,
  cause: string,
  personId: string | null,
  now: number,
  dueWas: number | null,
): Alert {
  const { charge } = file;
  const lateByS = dueWas === null ? 0 : Math.max(0, Math.round((now - Math.max(want.since, dueWas)) / 1000));
  return {
    id: newId(),
    workshopId: charge.workshopId,
    cause,
    kind: want.kind,
    level: want.level,
    chargeId: charge.id,
    wallId: null,
    personId,
    title: want.text.title,
    seen: lateByS >= LATE_S ? `${want.text.seen} Told ${durationText(lateByS)} late.` : want.text.seen,
    checkFirst: want.text.checkFirst,
    raisedAt: now,
    lateByS,
    takenById: null,
    takenAt: null,
    passedAt: null,
    turn: 0,
    forRole: null,
    passDueAt: null,
    clearedAt: null,
  };
}
