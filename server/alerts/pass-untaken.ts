/** What nobody has taken in its time goes on. Called by the sleeper. */
import type { EntityManager } from 'typeorm';
import type { Deps } from '../deps';
import type { Alert } from '../entities/alert';
import { findAlert, listAlertsToPass, listAlertsToPassAfter, updateAlert } from '../repositories/alerts.repository';
import { insertEvents } from '../repositories/charge-rows.repository';
import { findWorkshop, peopleById } from '../repositories/charge-stock.repository';
import { raiseBoardRev } from '../repositories/charges.repository';
import { alertDto } from '../services/alert-dto';
import { durationText, listText, lowerFirst } from '../services/charge-words';
import { newId } from '../services/ids';
import { toInstant } from '../services/instants';
import { inTransaction } from '../services/unit-of-work';
import { passOnMs } from './pass-on-minutes';
import { passOver } from './turns';

type Waker = Pick<Deps, 'dataSource' | 'hub' | 'log' | 'outbox'>;

/**
 * Brings every alert on whose time is over, each in a transaction of its own.
 * @returns how many went on to somebody
 */
export async function passUntaken(deps: Waker, now: number): Promise<number> {
  let done = 0;
  for (const { id, workshopId } of await listAlertsToPass(deps.dataSource.manager, now, 500)) {
    try {
      const passed = await inTransaction(deps, (manager) => passOne(manager, workshopId, id, now));
      if (passed === null) continue;
      done += 1;
      const { dto, personIds, boardRev } = passed;
      const at = toInstant(now);
      for (const personId of personIds) deps.hub.toPerson(workshopId, personId, 'alert:raised', dto);
      deps.hub.toWorkshop(workshopId, 'alert:changed', { id, at });
      deps.hub.toWorkshop(workshopId, 'board:changed', { rev: boardRev, at, chargeId: dto.chargeId });
    } catch (error) {
      deps.log.error({ error, alertId: id, workshopId }, 'an alert that nobody took could not be passed on');
    }
  }
  if (done > 0) deps.outbox.poke();
  return done;
}

/** Somebody may have been quicker: what is not due any more is left alone. */
async function passOne(manager: EntityManager, workshopId: string, id: string, now: number) {
  const alert = await findAlert(manager, workshopId, id);
  const workshop = await findWorkshop(manager, workshopId);
  if (!alert || !workshop || alert.passDueAt === null || alert.passDueAt > now) return null;
  const waitedS = (now - (alert.passedAt ?? alert.raisedAt)) / 1000;
  const passed = await passOver(manager, alert, workshop, now);
  if (passed === null) return null;
  const people = await peopleById(manager, workshopId);
  const names = listText(passed.personIds.map((personId) => people.get(personId)?.name ?? 'somebody'));
  if (alert.chargeId !== null)
    await insertEvents(manager, [
      {
        id: newId(),
        workshopId,
        chargeId: alert.chargeId,
        at: now,
        kind: 'alert',
        personId: null,
        text: `Nobody took it for ${durationText(waitedS)}, it went on to ${names}: ${lowerFirst(alert.seen)}`,
        createdAt: now,
      },
    ]);
  return {
    dto: alertDto({ ...alert, ...passed.patch } as Alert, people),
    personIds: passed.personIds,
    boardRev: await raiseBoardRev(manager, workshopId),
  };
}

/** Where the clock was set back, no alert waits longer than from now on. */
export async function afterClockSetBack(deps: Pick<Deps, 'dataSource'>, now: number): Promise<void> {
  const waiting = await listAlertsToPassAfter(deps.dataSource.manager, now);
  if (waiting.length === 0) return;
  await inTransaction(deps, async (manager) => {
    const workshops = new Map<string, Awaited<ReturnType<typeof findWorkshop>>>();
    for (const { id, workshopId, level, passDueAt } of waiting) {
      if (!workshops.has(workshopId)) workshops.set(workshopId, await findWorkshop(manager, workshopId));
      const workshop = workshops.get(workshopId);
      const wait = workshop ? passOnMs(workshop, level) : null;
      if (wait !== null && passDueAt! > now + wait)
        await updateAlert(manager, workshopId, id, { passDueAt: now + wait });
    }
  });
}
