/** Writes the weekly digests and brings them out of the house: on Monday morning by the workshop's clock. */
import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import { backoffMs, MOST_TRIES } from '../../alerts/backoff';
import type { Ways } from '../../alerts/ways/all';
import type { Deps } from '../../deps';
import type { WeeklyDigest } from '../../entities/weekly-digest';
import type { Workshop } from '../../entities/workshop';
import { makeDueLoop, type DueLoop } from '../../live/due-loop';
import { findPerson } from '../../repositories/people.repository';
import { waitGroupRows, waitStageRows, waitTotals } from '../../repositories/wait-figures.repository';
import {
  dueDigests,
  earliestDigestDueAt,
  insertDigests,
  listWorkshops,
  managersWithoutDigest,
  settleDigest,
  wantsDigest,
} from '../../repositories/weekly-digest.repository';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { newId } from '../ids';
import { inTransaction } from '../unit-of-work';
import { digestFacts, type WeekFigures } from './digest-facts';
import { digestLetter, digestToken, letterId } from './digest-letter';
import { stageNames } from '@/shared/contract/wait-names';
import { waitNames } from './wait-names';

/** Hour of Monday by the workshop's clock at which the last week is told. */
const HOUR = 7;
const AT_ONCE = 20;

export interface DigestDeps extends Pick<Deps, 'dataSource' | 'clock' | 'log' | 'config' | 'secrets'> {
  ways: Pick<Ways, 'eMail'>;
  /** 0…1, for the waits between tries; seeded in tests. */
  random: () => number;
}

/** Without a mail server nothing is written: what could not be read would only pile up. */
export function makeWeeklyDigests(deps: DigestDeps): DueLoop {
  const { dataSource, clock, log } = deps;
  /** The week that each workshop was seen to have had, so that a look at the clock costs nothing in between. */
  const seen = new Map<string, string>();

  async function work(): Promise<number> {
    if (deps.ways.eMail === null) return 0;
    let done = 0;
    for (const workshop of await listWorkshops(dataSource.manager)) done += await write(workshop);
    for (const digest of await dueDigests(dataSource.manager, clock.now(), AT_ONCE)) {
      await bring(digest);
      done += 1;
    }
    return done;
  }

  async function write(workshop: Workshop): Promise<number> {
    const now = clock.now();
    const monday = DateTime.fromMillis(now, { zone: workshop.zone }).startOf('week');
    const since = monday.set({ hour: HOUR }).toMillis();
    const week = monday.minus({ weeks: 1 }).toFormat('yyyy-MM-dd');
    if (now < since || seen.get(workshop.id) === week) return 0;
    const written = await inTransaction(deps, async (manager) => {
      const managers = await managersWithoutDigest(manager, workshop.id, week, since);
      if (managers.length === 0) return 0;
      const words = await wordsOf(manager, workshop, monday);
      const base = { workshopId: workshop.id, monday: week, dueAt: now, tries: 0, createdAt: now };
      await insertDigests(
        manager,
        managers.map((personId): WeeklyDigest => ({
          ...{ ...base, id: newId(), personId, words: words ?? { week: '', facts: [] } },
          ...(words === null
            ? { state: 'dropped', reason: 'Nothing became ready in these two weeks.', endedAt: now }
            : { state: 'waiting', reason: null, endedAt: null }),
        })),
      );
      return words === null ? 0 : managers.length;
    });
    seen.set(workshop.id, week);
    return written;
  }

  async function bring(digest: WeeklyDigest): Promise<void> {
    const { id, workshopId, personId } = digest;
    const { manager } = dataSource;
    const settle = (patch: Partial<WeeklyDigest>) => inTransaction(deps, (within) => settleDigest(within, id, patch));
    const now = clock.now();
    const person = await findPerson(manager, workshopId, personId);
    const wanted =
      person?.disabledAt === null && person.role === 'manager' && (await wantsDigest(manager, workshopId, personId));
    if (!person || !wanted) return settle({ state: 'dropped', reason: 'It is not wanted any more.', endedAt: now });
    const { name } = await workshopForPlans(manager, workshopId);
    const site = deps.config.publicUrl;
    const stop =
      site === null ? null : new URL(`/api/digest/stop?token=${digestToken(deps.secrets, personId)}`, site).href;
    const waits = site === null ? null : new URL('/waits', site).href;
    const letter = digestLetter(digest.words, name, stop === null || waits === null ? null : { waits, stop });
    const sent = await deps.ways.eMail!.sendLetter(person.email, { ...letter, id: letterId(id), stopUrl: stop });
    const tries = digest.tries + 1;
    if (sent.kind === 'sent') return settle({ state: 'sent', tries, reason: null, endedAt: clock.now() });
    const { reason } = sent;
    if (sent.kind === 'failed' && tries < MOST_TRIES)
      return settle({ tries, reason, dueAt: clock.now() + backoffMs(tries, deps.random, sent.afterMs) });
    log.warn({ workshopId, personId, reason, tries }, 'a weekly digest could not be brought to somebody');
    return settle({ state: 'dead', tries, reason, endedAt: clock.now() });
  }

  return makeDueLoop({
    clock,
    log,
    name: 'the weekly digest',
    work,
    nextDueAt: () => earliestDigestDueAt(dataSource.manager),
  });
}

/** Of the week before this Monday; null: nothing became ready in it and in the one before. */
async function wordsOf(
  manager: EntityManager,
  { id: workshopId, zone }: Workshop,
  monday: DateTime,
): Promise<WeeklyDigest['words'] | null> {
  const names = await waitNames(manager, workshopId);
  const figures = async (from: DateTime): Promise<WeekFigures> => {
    const filter = { workshopId, fromAt: from.toMillis(), toAt: from.plus({ weeks: 1 }).toMillis() };
    const stages = await waitStageRows(manager, filter);
    const types = await waitGroupRows(manager, filter, 'module-type');
    return {
      totals: await waitTotals(manager, filter),
      stages: stages.map(({ stage, row }) => ({ name: stageNames[stage], row })),
      types: types.map((row) => ({ name: names['module-type'](row.key), row })),
    };
  };
  const last = await figures(monday.minus({ weeks: 1 }));
  const before = await figures(monday.minus({ weeks: 2 }));
  if (last.totals.charges + before.totals.charges === 0) return null;
  const [first, end] = [monday.minus({ weeks: 1 }), monday.minus({ days: 1 })].map((day) => day.setZone(zone));
  const week = `${first!.toFormat('d MMMM', { locale: 'en' })} to ${end!.toFormat('d MMMM', { locale: 'en' })}`;
  return { week, facts: digestFacts(last, before) };
}
