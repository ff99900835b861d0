/**
 * With whom an alert is: raised for somebody, taken, passed on by a hand or by the clock, cleared. Each step is written
 * with its turn and with what goes out for it, in the transaction of whoever calls.
 */
import type { EntityManager } from 'typeorm';
import type { Alert } from '../entities/alert';
import type { Workshop } from '../entities/workshop';
import { insertTurn, turnsOf, updateTurn } from '../repositories/alert-turns.repository';
import { insertAlert, updateAlert } from '../repositories/alerts.repository';
import { dropWaitingEntries } from '../repositories/outbox.repository';
import { newId } from '../services/ids';
import { audiencePeople, type Audience } from './audience';
import { passOnMs } from './pass-on-minutes';
import { writeOutbox } from './write-outbox';

type Goes = Pick<Workshop, 'passOnTellMinutes' | 'passOnAmberMinutes' | 'passOnAlarmMinutes'>;

export const firstAudience = (alert: Pick<Alert, 'personId' | 'forRole'>): Audience =>
  alert.forRole === 'manager'
    ? 'managers'
    : alert.forRole === 'foreman'
      ? 'foremen'
      : alert.personId === null
        ? 'everybody'
        : 'person';

/** Raises an alert for whom it names. Sets its turn and when it goes on. */
export async function raiseAlert(manager: EntityManager, alert: Alert, workshop: Goes, now: number): Promise<void> {
  alert.turn = 0;
  alert.passDueAt = dueFrom(alert, workshop, now);
  await insertAlert(manager, alert);
  await openTurn(manager, alert, firstAudience(alert), null, now);
}

/** An alert is somebody's: nothing more goes out for it, and it goes on to nobody. */
export async function takeAlertNow(
  manager: EntityManager,
  alert: Alert,
  personId: string,
  now: number,
): Promise<Partial<Alert>> {
  const patch = { takenById: personId, takenAt: now, passDueAt: null };
  await updateAlert(manager, alert.workshopId, alert.id, patch);
  await updateTurn(manager, alert.workshopId, alert.id, alert.turn, { takenById: personId, takenAt: now });
  await dropWaitingEntries(manager, alert.workshopId, alert.id, 'Somebody has it.', now);
  return patch;
}

/**
 * Gives an alert to somebody else, who has not taken it yet.
 * @param byId who passes it on
 * @param heardFrom when it rings anew for whom it is for now; null: it was theirs already
 */
export async function giveAlert(
  manager: EntityManager,
  alert: Alert,
  to: { personId: string | null; byId: string; heardFrom: number | null },
  workshop: Goes,
  now: number,
): Promise<Partial<Alert>> {
  await endTurn(manager, alert, 'passed', now);
  const patch = {
    personId: to.personId,
    takenById: null,
    takenAt: null,
    passedAt: to.heardFrom,
    forRole: null,
    turn: alert.turn + 1,
    passDueAt: dueFrom(alert, workshop, now),
  };
  await updateAlert(manager, alert.workshopId, alert.id, patch);
  await dropWaitingEntries(manager, alert.workshopId, alert.id, 'It was passed on.', now, patch.turn);
  await openTurn(manager, { ...alert, ...patch }, firstAudience(patch), to.byId, now);
  return patch;
}

/** The cause is gone: nothing more goes out. */
export async function clearAlert(manager: EntityManager, alert: Alert, now: number): Promise<void> {
  await updateAlert(manager, alert.workshopId, alert.id, { clearedAt: now, passDueAt: null });
  alert.clearedAt = now;
  alert.passDueAt = null;
  await endTurn(manager, alert, 'cleared', now);
  await dropWaitingEntries(manager, alert.workshopId, alert.id, 'Its cause is gone.', now);
}

/** The steps that an alert goes when nobody takes it. */
const steps = [
  { audience: 'foremen', forRole: 'foreman' },
  { audience: 'managers', forRole: 'manager' },
] as const;

/**
 * Nobody has taken an alert in its time: it goes on to the foremen, then to the managers. A step that reaches nobody new is
 * left out; after the last one it stays where it is.
 * @returns what has changed and whom it reaches now; null: there is nobody left to whom it could go
 */
export async function passOver(
  manager: EntityManager,
  alert: Alert,
  workshop: Goes,
  now: number,
): Promise<{ patch: Partial<Alert>; audience: Audience; personIds: string[] } | null> {
  const told = new Set<string>();
  const { workshopId } = alert;
  for (const turn of await turnsOf(manager, workshopId, alert.id))
    for (const person of await audiencePeople(manager, workshopId, turn)) told.add(person.id);
  const from = steps.findIndex(({ forRole }) => forRole === alert.forRole) + 1;
  for (const { audience, forRole } of steps.slice(from)) {
    const people = await audiencePeople(manager, workshopId, { audience, personId: null });
    const fresh = people.filter((person) => !told.has(person.id));
    if (fresh.length === 0) continue;
    await endTurn(manager, alert, 'not-taken', now);
    const last = forRole === 'manager';
    const patch = {
      forRole,
      passedAt: now,
      turn: alert.turn + 1,
      passDueAt: last ? null : dueFrom(alert, workshop, now),
    };
    await updateAlert(manager, workshopId, alert.id, patch);
    await openTurn(manager, { ...alert, ...patch }, audience, null, now);
    return { patch, audience, personIds: fresh.map((person) => person.id) };
  }
  await updateAlert(manager, workshopId, alert.id, { passDueAt: null });
  return null;
}

function dueFrom(alert: Pick<Alert, 'level'>, workshop: Goes, now: number): number | null {
  const wait = passOnMs(workshop, alert.level);
  return wait === null ? null : now + wait;
}

async function openTurn(
  manager: EntityManager,
  alert: Alert,
  audience: Audience,
  passedById: string | null,
  now: number,
): Promise<void> {
  const { workshopId, id: alertId, turn: number } = alert;
  const personId = audience === 'person' ? alert.personId : null;
  await insertTurn(manager, {
    id: newId(),
    workshopId,
    alertId,
    number,
    audience,
    personId,
    passedById,
    fromAt: now,
    takenById: null,
    takenAt: null,
    endedAt: null,
    endedBy: null,
  });
  const people = await audiencePeople(manager, workshopId, { audience, personId });
  // Who passes it to themselves knows of it.
  const hearing = people.filter((person) => person.id !== passedById);
  await writeOutbox(manager, alert, hearing, now);
}

const endTurn = (
  manager: EntityManager,
  alert: Alert,
  endedBy: 'passed' | 'not-taken' | 'cleared',
  now: number,
): Promise<void> => updateTurn(manager, alert.workshopId, alert.id, alert.turn, { endedAt: now, endedBy });
