/** Who has changed a charge last, for the one who comes too late: the log of the charge knows it. */
import type { EntityManager } from 'typeorm';
import type { ChangedDto } from '@/shared/contract/common';
import type { Member } from '../deps';
import type { ChargeEvent } from '../entities/charge-event';
import { DomainError } from '../errors/domain-error';
import { eventsOf } from '../repositories/charge-rows.repository';
import type { ChargeFile } from './charge-file';
import { clockText } from './charge-words';
import { toInstant } from './instants';

/** What a person did, after the name: 'Ines Ortega held it at 14:32'. */
const deeds: Readonly<Record<string, string>> = {
  planned: 'planned it',
  queued: 'queued it',
  moved: 'moved it',
  check: 'answered a check',
  started: 'started it',
  reading: 'logged a reading',
  corrected: 'corrected a reading',
  'look-in': 'looked in',
  held: 'held it',
  resumed: 'resumed it',
  'next-step': 'began its next step',
  'current-off': 'switched it off',
  ready: 'checked it',
  outside: 'checked it',
  fitted: 'fitted it',
  shelved: 'put it back on the shelf',
  'handed-over': 'handed it over',
  'went-on': 'topped it up',
  stopped: 'stopped it',
};

/** Person, deed and instant of the last change of a charge. */
export interface LastChange {
  changed: ChangedDto;
  /** 'Ines Ortega held it at 14:32', 'You held it at 14:32', 'It went on by the clock at 14:32'. */
  text: string;
}

/**
 * The last change that the log of a charge tells of; null where it tells of none.
 * @param member who asks: told as 'You' where it was the same person, on another screen
 * @param kinds only changes of these kinds count
 */
export async function lastChange(
  manager: EntityManager,
  file: Pick<ChargeFile, 'charge' | 'people' | 'workshop'>,
  member: Member,
  now: number,
  kinds?: readonly string[],
): Promise<LastChange | null> {
  const { charge, people, workshop } = file;
  const events = (await eventsOf(manager, charge.workshopId, [charge.id])).get(charge.id) ?? [];
  // Who takes an alert changes the alert: the charge keeps its revision.
  const event = causeOf(events.filter(({ kind }) => (kinds ? kinds.includes(kind) : kind !== 'alert')));
  if (event === null) return null;
  const name = event.personId === null ? null : (people.get(event.personId)?.name ?? 'Somebody');
  const by = event.personId === null || name === null ? null : { id: event.personId, name };
  const did = by === null ? 'went on by the clock' : (deeds[event.kind] ?? 'changed it');
  const who = by === null ? 'It' : by.id === member.personId ? 'You' : by.name;
  return {
    changed: { by, at: toInstant(event.at), did },
    text: `${who} ${did} at ${clockText(event.at, workshop.zone, now)}`,
  };
}

/** The line written last. What followed from a person's act is written with it, one millisecond on: the act is meant. */
function causeOf(events: readonly ChargeEvent[]): ChargeEvent | null {
  const written = [...events].sort((one, other) => one.createdAt - other.createdAt);
  let place = written.length - 1;
  while (place > 0 && written[place]!.personId === null && follows(written[place]!, written[place - 1]!)) place -= 1;
  return written[place] ?? null;
}

const follows = (line: ChargeEvent, before: ChargeEvent): boolean => line.createdAt - before.createdAt <= 1;

/** 412 with the present state and who made it so. */
export const staleCharge = (present: unknown, last: LastChange | null): DomainError =>
  new DomainError(
    412,
    'stale',
    last === null
      ? 'Somebody else has changed this meanwhile. Here is how it stands now.'
      : `${last.text}; this is how it stands now.`,
    { present, ...(last ? { changed: last.changed } : {}) },
  );

/** The same refusal, with who brought the charge to the stage that refuses. */
export const toldBy = (refusal: DomainError, last: LastChange | null): DomainError =>
  last === null
    ? refusal
    : new DomainError(refusal.status, refusal.code, `${refusal.message} ${last.text}.`, {
        ...refusal.extra,
        changed: last.changed,
      });
