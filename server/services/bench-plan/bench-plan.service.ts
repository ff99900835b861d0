import { DateTime } from 'luxon';
import type { BenchPlanDto, BenchPlanQuery, MyDayDto } from '@/shared/contract/bench-plan';
import type { Deps, Member } from '../../deps';
import { forbidden } from '../../errors/domain-error';
import { lastBenchChange } from '../../repositories/bench-changes.repository';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { overdueSince } from '../charge-due';
import { isUnderWay } from '../charge-stages';
import { toInstant } from '../instants';
import { openingOf } from '../working-hours';
import { benchChangeDto } from './bench-changes';
import { benchModel } from './bench-model';
import { daysOf, startOfDay } from './days';
import { loadGround, type BenchGround } from './ground';
import { planChannels, planCharges } from './lanes';
import { linesOf, personDto } from './people-lines';
import { queueRows } from './queue';
import { waitsToday } from './waits-today';

/** The ground of the days that a member asks for. @throws DomainError 400 for a day that is in no calendar */
export async function groundFor(
  deps: Deps,
  member: Member,
  query: { day?: string; days?: number },
  now: number,
): Promise<BenchGround> {
  const { manager } = deps.dataSource;
  const { zone } = await workshopForPlans(manager, member.workshopId);
  return loadGround(manager, member.workshopId, daysOf(zone, query.day, query.days ?? 1, now), now);
}

/** The workshop's day, or seven of them: channels and people on one time line. */
export async function benchPlan(deps: Deps, member: Member, query: BenchPlanQuery, now: number): Promise<BenchPlanDto> {
  const { manager } = deps.dataSource;
  const ground = await groundFor(deps, member, { day: query.day, days: Number(query.days ?? 1) }, now);
  const model = await benchModel(manager, deps.bench, ground);
  const all = linesOf(ground);
  const { days, workshop, files } = ground;
  const change = await lastBenchChange(manager, member.workshopId, startOfDay(workshop.zone, now));
  const running = files.filter(({ charge }) => isUnderWay(charge.stage));
  const queue = queueRows(model);
  return {
    at: toInstant(now),
    zone: workshop.zone,
    day: days.day,
    days: days.days,
    from: toInstant(days.from),
    to: toInstant(days.to),
    open: openingsOf(ground),
    channels: planChannels(ground),
    charges: planCharges(ground, model.stuck, all.lookIns),
    people: all.lines.map((line) => personDto(ground, all, line)),
    queue,
    counts: {
      charges: running.length + queue.length,
      late: files.filter((file) => overdueSince(file, now) !== null).length,
    },
    waitsToday: waitsToday(ground),
    lastChange: change === null ? null : await benchChangeDto(manager, change),
  };
}

/** Opening hours of the days shown. */
function openingsOf({ days, workshop }: BenchGround): BenchPlanDto['open'] {
  const first = DateTime.fromMillis(days.from, { zone: workshop.zone }).set({ hour: 12 });
  return Array.from({ length: days.days }, (_, day) =>
    openingOf(workshop, first.plus({ days: day }).toMillis()),
  ).flatMap((opening) => (opening === null ? [] : [{ from: toInstant(opening.from), to: toInstant(opening.to) }]));
}

/** The day of the one who asks. @throws DomainError 403 for somebody who is no longer on the list */
export async function myDay(deps: Deps, member: Member, day: string | undefined, now: number): Promise<MyDayDto> {
  const ground = await groundFor(deps, member, { day }, now);
  const all = linesOf(ground);
  const own = all.lines.find(({ person }) => person.id === member.personId);
  if (!own) throw forbidden('You are not on the list of people any more.');
  return {
    ...personDto(ground, all, own),
    at: toInstant(now),
    zone: ground.workshop.zone,
    day: ground.days.day,
  };
}
