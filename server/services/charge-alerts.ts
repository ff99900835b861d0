/**
 * Alerts follow the state of a charge: what it asks for now is compared with what is open, the missing is raised and
 * what has lost its cause is cleared, in the transaction that changed the charge. A cause has one key, so that it is
 * told once, also across restarts.
 */
import type { EntityManager } from 'typeorm';
import type { AlertKind } from '@/shared/contract/alert';
import type { Alert } from '../entities/alert';
import { clearAlert, raiseAlert } from '../alerts/turns';
import { alertsOfCharge } from '../repositories/alerts.repository';
import {
  chargeDoneText,
  checkDueText,
  lookInText,
  oddText,
  overdueText,
  stepSwapText,
  type AlertText,
} from './charge-alert-texts';
import { isChecked, overdueSince, TOLD_AGAIN_MS } from './charge-due';
import type { ChargeFile } from './charge-file';
import { dueLookIn } from './charge-look-ins';
import { readingInstantOf } from './charge-clock';
import { isUnderWay, swapWait } from './charge-stages';
import { durationText } from './charge-words';
import { newId } from './ids';

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
    wanted.push({ kind: 'check-due', level: 'amber', since: charge.checkDueAt ?? now, text: checkDueText(file) });
  const swap = swapWait(file);
  if (swap !== null)
    wanted.push({
      kind: 'step-swap',
      level: 'amber',
      since: swap.since,
      text: stepSwapText(file, swap),
    });
  const lookIn = dueLookIn(file, now);
  if (lookIn !== null)
    wanted.push({ kind: 'look-in-due', level: 'tell', since: lookIn.dueAt, key: lookIn.id, text: lookInText(file) });
  const odd = isUnderWay(charge.stage) ? (charge.reckoning?.reckoning.odd ?? null) : null;
  if (odd !== null)
    // One kind is told once a charge: what comes and goes with every reading would ring with every reading.
    wanted.push({
      kind: 'odd-reading',
      level: 'alarm',
      since: readingInstantOf(charge, odd.sinceS),
      key: odd.kind,
      text: oddText(file, odd),
    });
  const late = overdueSince(file, now);
  if (late !== null) wanted.push({ kind: 'overdue', level: 'alarm', since: late, text: overdueText(file, now) });
  return wanted;
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
  const wanted = wantedAlerts(file, now);
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
    if (all.some((one) => one.clearedAt === null && one.kind === want.kind)) continue;
    const cause = causeOf(charge.id, want, all);
    if (all.some((one) => one.cause === cause)) continue;
    const alert = newAlert(file, want, cause, now, dueWas);
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
  if (alert.takenAt !== null || dueWas === null || (want.kind !== 'check-due' && want.kind !== 'step-swap'))
    return false;
  return TOLD_AGAIN_MS.some((wait) => want.since + wait >= dueWas && want.since + wait <= now);
}

function newAlert(file: ChargeFile, want: Wanted, cause: string, now: number, dueWas: number | null): Alert {
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
    personId: charge.personId,
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
