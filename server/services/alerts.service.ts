import type { EntityManager } from 'typeorm';
import type { AlertDto } from '@/shared/contract/alert';
import { giveAlert, takeAlertNow } from '../alerts/turns';
import type { Deps, Member } from '../deps';
import type { Alert } from '../entities/alert';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { findAlert, listAlerts } from '../repositories/alerts.repository';
import { insertEvents } from '../repositories/charge-rows.repository';
import { findWorkshop, peopleById, type PersonName } from '../repositories/charge-stock.repository';
import { raiseBoardRev } from '../repositories/charges.repository';
import { alertDto } from './alert-dto';
import { lowerFirst } from './charge-words';
import { newId } from './ids';
import { toInstant } from './instants';
import { inTransaction } from './unit-of-work';

/** Alerts whose cause is gone are shown for this long, ms. */
const SHOWN_AFTER_MS = 24 * 3600_000;
const urgency: Alert['level'][] = ['alarm', 'amber', 'tell'];

/** Open ones first, the most urgent on top, then what is over, newest first. */
export async function alerts(deps: Deps, member: Member, now: number): Promise<AlertDto[]> {
  const { manager } = deps.dataSource;
  const rows = await listAlerts(manager, member.workshopId, now - SHOWN_AFTER_MS);
  const people = await peopleById(manager, member.workshopId);
  const place = (alert: Alert): number => (alert.clearedAt === null ? urgency.indexOf(alert.level) : urgency.length);
  return rows
    .sort((one, other) => place(one) - place(other) || other.raisedAt - one.raisedAt)
    .map((alert) => alertDto(alert, people));
}

/**
 * 'I have it': the sound stops everywhere. Taking one's own again changes nothing.
 * @throws DomainError 409 where a colleague has it, or its cause is gone
 */
export function takeAlert(deps: Deps, member: Member, id: string, now: number): Promise<AlertDto> {
  return changeAlert(deps, member, id, now, (alert, people) => {
    refuseCleared(alert, people);
    if (alert.takenById === member.personId) return null;
    if (alert.takenById !== null)
      throw conflict(
        'taken_already',
        `${people.get(alert.takenById)?.name ?? 'Somebody'} has it already.`,
        alertDto(alert, people),
      );
    return {
      write: (manager) => takeAlertNow(manager, alert, member.personId, now),
      text: `${member.name} has it: ${lowerFirst(alert.seen)}`,
    };
  });
}

/**
 * Passes an alert to a colleague, who has not taken it yet and hears it anew.
 * @throws DomainError 409 where its cause is gone
 */
export async function passAlert(
  deps: Deps,
  member: Member,
  id: string,
  personId: string,
  now: number,
): Promise<AlertDto> {
  const passed = await changeAlert(deps, member, id, now, (alert, people) => {
    refuseCleared(alert, people);
    const other = people.get(personId);
    if (!other) throw notFound('This person');
    if (other.disabledAt !== null) throw invalid({ personId: `${other.name} is disabled. Choose somebody else.` });
    return {
      write: async (manager) => {
        const workshop = await findWorkshop(manager, member.workshopId);
        if (!workshop) throw notFound('This workshop');
        return giveAlert(manager, alert, { personId, byId: member.personId, heardFrom: now }, workshop, now);
      },
      text: `${member.name} passed it to ${other.name}: ${lowerFirst(alert.seen)}`,
    };
  });
  deps.hub.toPerson(member.workshopId, personId, 'alert:raised', passed);
  return passed;
}

function refuseCleared(alert: Alert, people: ReadonlyMap<string, PersonName>): void {
  if (alert.clearedAt !== null)
    throw conflict('alert_over', 'This is settled already. There is nothing to take.', alertDto(alert, people));
}

interface Change {
  write: (manager: EntityManager) => Promise<Partial<Alert>>;
  /** For the log of its charge. */
  text: string;
}

async function changeAlert(
  deps: Deps,
  member: Member,
  id: string,
  now: number,
  decide: (alert: Alert, people: ReadonlyMap<string, PersonName>) => Change | null,
): Promise<AlertDto> {
  const { workshopId } = member;
  const { dto, boardRev } = await inTransaction(deps, async (manager: EntityManager) => {
    const alert = await findAlert(manager, workshopId, id);
    if (!alert) throw notFound('This alert');
    const people = await peopleById(manager, workshopId);
    const change = decide(alert, people);
    if (change === null) return { dto: alertDto(alert, people), boardRev: null };
    const patch = await change.write(manager);
    const { chargeId } = alert;
    const line = {
      id: newId(),
      workshopId,
      at: now,
      kind: 'alert',
      personId: member.personId,
      text: change.text,
      createdAt: now,
    };
    if (chargeId !== null) await insertEvents(manager, [{ ...line, chargeId }]);
    return {
      dto: alertDto({ ...alert, ...patch }, people),
      boardRev: await raiseBoardRev(manager, workshopId),
    };
  });
  deps.outbox.poke();
  if (boardRev !== null) {
    const at = toInstant(now);
    deps.hub.toWorkshop(workshopId, 'alert:changed', { id, at });
    deps.hub.toWorkshop(workshopId, 'board:changed', { rev: boardRev, at, chargeId: dto.chargeId });
  }
  return dto;
}
