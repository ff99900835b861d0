import type { EntityManager } from 'typeorm';
import type { WaitsQuery } from '@/shared/contract/waits';
import type { Workshop } from '../../entities/workshop';
import type { WaitFilter } from '../../repositories/wait-figures.repository';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { waitPeriod, type DayPeriod } from './wait-period';

/** What was asked for, with the instants that it means in the workshop's zone. */
export interface WaitAsk {
  workshop: Workshop;
  period: DayPeriod;
  filter: WaitFilter;
}

/** @throws DomainError 400 with the day at fault */
export async function waitAsk(
  manager: EntityManager,
  workshopId: string,
  query: WaitsQuery & { week?: string | undefined },
  now: number,
): Promise<WaitAsk> {
  const workshop = await workshopForPlans(manager, workshopId);
  const period = waitPeriod(query, workshop.zone, now);
  const { moduleTypeId, chargerId, channelId, technicianId, way, stage, week } = query;
  return {
    workshop,
    period,
    filter: {
      ...{ workshopId, fromAt: period.fromAt, toAt: period.toAt },
      ...{ moduleTypeId, chargerId, channelId, technicianId, way, stage, monday: week },
      weekday: query.weekday === undefined ? undefined : Number(query.weekday),
    },
  };
}
