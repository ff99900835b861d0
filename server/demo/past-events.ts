import { DateTime } from 'luxon';
import type { ChargeEvent } from '../entities/charge-event';
import { ampHoursText, clockText, durationText } from '../services/charge-words';
import { demoWorkshopId as workshopId } from './demo-workshop';
import type { PastCharge } from './past-charges';
import { demoPeople } from './people';
import { stopReasons } from './past-rows';

/** What the log of a past charge says. */
export function pastEvents(past: PastCharge, zone: string, wentOnAs: string | null): ChargeEvent[] {
  const { option } = past.plan;
  const person = demoPeople[past.asked.by].id;
  const clock = (at: number): string => clockText(at, zone, past.asked.askedAt);
  const likely = past.startedAt + (option.totalS.p50 - option.currentStartS) * 1000;
  const event = (kind: string, at: number, text: string, by: string | null = person): ChargeEvent => ({
    id: `${past.key}-${kind}`,
    workshopId,
    chargeId: past.key,
    at,
    kind,
    personId: by,
    text,
    createdAt: at,
  });
  const events = [
    event('planned', past.asked.askedAt, `Planned: ${option.channelText}, ${durationText(option.totalS.p50)}.`),
    event('started', past.startedAt, `Clipped on at ${past.wish.channel}: ready ${clock(likely)}.`),
  ];
  if (past.checkedAt === null) {
    const why = stopReasons[past.repair % stopReasons.length]!;
    return [...events, event('stopped', past.currentEndAt, `Stopped: ${why}. Read it again before it is planned.`)];
  }
  const rested = durationText((past.checkDueAt - past.currentEndAt) / 1000);
  const out = option.direction === 'discharge' ? 'out' : 'in';
  events.push(
    event(
      'resting',
      past.currentEndAt,
      `${ampHoursText(Math.abs(option.ampHours))} are ${out}: the current ends.`,
      null,
    ),
    event('check-due', past.checkDueAt, `Rested ${rested}. The check is due.`, null),
  );
  if (past.end === 'outside') {
    events.push(event('outside', past.checkedAt, 'The groups are outside the tolerance and need a little more.'));
    if (wentOnAs !== null) events.push(event('went-on', past.checkedAt + 4 * 60_000, `Went on as ${wentOnAs}.`));
    return events;
  }
  const fitted = DateTime.fromMillis(past.checkedAt).plus({ minutes: 25 }).toMillis();
  return [
    ...events,
    event('ready', past.checkedAt, 'Ready, in tolerance.'),
    event('fitted', fitted, `Fitted as module ${1 + (past.repair % 16)}.`),
  ];
}
