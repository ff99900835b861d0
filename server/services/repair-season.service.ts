/** The season of a repair: from its booking to its hand-over, where its time went. */
import { aimOf } from '@/shared/contract/pack';
import type { RepairSeasonDto, SeasonPart } from '@/shared/contract/repair-season';
import type { Deps, Member } from '../deps';
import { listStints } from '../repositories/work.repository';
import { common, lengthOf, united, type Stretch } from './bench-plan/spans';
import { stintSpan } from './bench-plan/stint-spans';
import type { ChargeFile } from './charge-file';
import { SWAP_REASON } from './charge-steps';
import { toInstant } from './instants';
import { packVerdict } from './pack-numbers';
import { presentSpans } from './presence';
import { loadRepairFile, type RepairFile } from './repair-file';
import { usesWaitOf } from './waits/uses-wait';

interface Part extends Stretch {
  part: SeasonPart;
  chargeId: string | null;
}

/** @throws DomainError 404 where the workshop has no such repair */
export async function repairSeason(deps: Deps, member: Member, id: string, now: number): Promise<RepairSeasonDto> {
  const { manager } = deps.dataSource;
  const file = await loadRepairFile(manager, member.workshopId, id);
  const { repair, workshop, waits, personIds } = file;
  const from = repair.createdAt;
  const to = Math.max(from, repair.handedOverAt ?? repair.deletedAt ?? now);
  const parts = seasonParts(file, from, to);
  const open = presentSpans(workshop, null, from, to);
  const waited = united(waits.map((wait) => ({ from: wait.fromAt, to: wait.toAt ?? to })));
  const worked = (await listStints(manager, member.workshopId, from, to))
    .filter(({ state }) => state === 'begun' || state === 'done')
    .filter(
      usesWaitOf(
        personIds,
        file.charges.map(({ charge }) => charge),
      ),
    )
    .map((stint) => stintSpan(stint, to));
  const openWaits = common(waited, open);
  const usedMs = lengthOf(common(openWaits, united(worked)));
  return {
    ...{ repairId: repair.id, number: repair.number, from: toInstant(from), to: toInstant(to) },
    over: repair.handedOverAt !== null || repair.deletedAt !== null,
    stretches: parts.map((one) => ({
      ...{ part: one.part, from: toInstant(one.from), to: toInstant(one.to), chargeId: one.chargeId },
    })),
    totals: [...new Set(parts.map(({ part }) => part))].map((part) => {
      const own = parts.filter((one) => one.part === part);
      return { part, seconds: lengthOf(own) / 1000, openSeconds: lengthOf(common(united(own), open)) / 1000 };
    }),
    usedS: usedMs / 1000,
    lostS: (lengthOf(openWaits) - usedMs) / 1000,
  };
}

/**
 * The parts of `[from, to)` without a gap. Each moment has what the furthest thing had come to that had begun by then: a
 * charge's own stages, and outside of charges what the repair waited for.
 */
export function seasonParts(
  file: Pick<RepairFile, 'repair' | 'readings' | 'charges' | 'fittedAsItIs'>,
  from: number,
  to: number,
): Part[] {
  const marks = [...repairMarks(file), ...file.charges.flatMap(chargeMarks)]
    .filter(({ at }) => at < to)
    .sort((one, other) => one.at - other.at || one.rank - other.rank);
  const parts: Part[] = [];
  let present: Omit<Part, 'from' | 'to'> = { part: 'unread', chargeId: null };
  let since = from;
  const end = (at: number): void => {
    if (at <= since) return;
    const last = parts.at(-1);
    if (last && last.part === present.part && last.chargeId === present.chargeId) last.to = at;
    else parts.push({ ...present, from: since, to: at });
    since = at;
  };
  for (const { at, part, chargeId } of marks) {
    end(Math.max(from, at));
    present = { part, chargeId };
  }
  end(to);
  return parts;
}

/** From here on it is in this part, until the next mark. */
interface Mark {
  at: number;
  part: SeasonPart;
  chargeId: string | null;
  /** Of marks of one instant the last counts. */
  rank: number;
}

/** What happens to the repair itself: read, decided, fitted, proven. */
function repairMarks({ repair, readings, charges, fittedAsItIs }: Parameters<typeof seasonParts>[0]): Mark[] {
  const mark = (at: number | null | undefined, part: SeasonPart, rank: number): Mark[] =>
    at === null || at === undefined ? [] : [{ at, part, chargeId: null, rank }];
  const arrival = readings.filter(({ stage, setAsideAt }) => stage === 'arrival' && setAsideAt === null).at(-1);
  const fits = [
    ...charges.flatMap(({ charge }) =>
      charge.stage === 'fitted' && charge.closedAt !== null ? [charge.closedAt] : [],
    ),
    ...fittedAsItIs.map(({ at }) => at),
  ];
  const fittedAt = fits.length === 0 ? null : Math.max(...fits);
  const proven = readings
    .filter(({ stage, setAsideAt, at }) => stage !== 'arrival' && setAsideAt === null && at >= (fittedAt ?? Infinity))
    .filter(({ groupVolts }) => packVerdict(groupVolts, repair).spreadMillivolts <= aimOf(repair))
    .at(-1);
  return [
    ...mark(arrival?.at, 'deciding', 0),
    ...mark(repair.target?.at, 'unplanned', 1),
    ...fits.flatMap((at) => mark(at, 'balancing', 8)),
    ...mark(proven?.at, 'done', 9),
  ];
}

/** The stages of a charge as its instants have them; what ends it without a fit leaves the repair without one. */
function chargeMarks({ charge, runs }: ChargeFile): Mark[] {
  // What was reckoned before a hold goes on standing in the row, and does not come while it lasts.
  const heldAt = charge.stage === 'held' ? charge.heldAt : null;
  const stage = (at: number | null, part: SeasonPart, rank: number): Mark[] =>
    at === null || at > (heldAt ?? Infinity) ? [] : [{ at, part, chargeId: charge.id, rank }];
  const endedUnfit = charge.stage === 'stopped' || charge.stage === 'shelved' ? charge.closedAt : null;
  const unplannedAt = charge.stoppedAt ?? endedUnfit;
  return [
    ...stage(charge.createdAt, 'queue', 2),
    ...stage(charge.startedAt, 'charging', 3),
    ...stage(charge.taperAt, 'tapering', 4),
    ...stage(charge.currentEndAt, 'resting', 5),
    ...stage(charge.checkDueAt, 'check-due', 6),
    ...stage(charge.readyAt, 'unfitted', 7),
    ...stage(heldAt, 'held', 7),
    ...pastHolds(runs).flatMap(({ from, to }) => [
      ...stage(from, 'held', 7),
      ...stage(to, charge.taperAt !== null && charge.taperAt <= from ? 'tapering' : 'charging', 3),
    ]),
    ...(unplannedAt === null ? [] : [{ at: unplannedAt, part: 'unplanned' as const, chargeId: null, rank: 7 }]),
  ];
}

/** The holds that are over: a hold ends a stretch of current, its resume begins the next; a swap of clips is none. */
const pastHolds = (runs: ChargeFile['runs']): Stretch[] =>
  runs.flatMap(({ toAt, reason }, place) => {
    const next = runs[place + 1];
    return toAt === null || reason === SWAP_REASON || !next || next.fromAt <= toAt
      ? []
      : [{ from: toAt, to: next.fromAt }];
  });
