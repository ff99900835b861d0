/** The rows that hang on charges, for one charge or for a whole board at once. */
import { In, IsNull, type EntityManager, type FindOptionsOrder, type ObjectLiteral } from 'typeorm';
import { ChannelHold } from '../entities/channel-hold';
import { ChargeEvent } from '../entities/charge-event';
import { ChargeReading } from '../entities/charge-reading';
import { CheckAnswer } from '../entities/check-answer';
import { LookIn } from '../entities/look-in';
import { RestCheck } from '../entities/rest-check';
import { RunStretch } from '../entities/run-stretch';

type RowOfCharge = ObjectLiteral & { workshopId: string; chargeId: string };

function byCharge<Row extends RowOfCharge>(rows: Row[]): Map<string, Row[]> {
  const grouped = new Map<string, Row[]>();
  for (const row of rows) {
    const known = grouped.get(row.chargeId);
    if (known) known.push(row);
    else grouped.set(row.chargeId, [row]);
  }
  return grouped;
}

const listing =
  <Row extends RowOfCharge>(entity: new () => Row, order: FindOptionsOrder<Row>) =>
  async (manager: EntityManager, workshopId: string, chargeIds: readonly string[]): Promise<Map<string, Row[]>> => {
    if (chargeIds.length === 0) return new Map();
    // The generic entity hides that it has these two columns from TypeORM's own types.
    const where = { workshopId, chargeId: In([...chargeIds]) } as object;
    return byCharge(await manager.find(entity, { where, order }));
  };

/** By charge; in the order of the steps. */
export const holdsOf = listing(ChannelHold, { stepIndex: 'ASC', id: 'ASC' });
/** By charge; in the order of time, as all that follow. */
export const runsOf = listing(RunStretch, { fromAt: 'ASC', id: 'ASC' });
export const readingsOf = listing(ChargeReading, { at: 'ASC', createdAt: 'ASC', id: 'ASC' });
export const lookInsOf = listing(LookIn, { dueAt: 'ASC' });
export const restChecksOf = listing(RestCheck, { at: 'ASC', createdAt: 'ASC', id: 'ASC' });
export const answersOf = listing(CheckAnswer, { at: 'ASC', id: 'ASC' });
export const eventsOf = listing(ChargeEvent, { at: 'ASC', createdAt: 'ASC', id: 'ASC' });

export async function insertHolds(manager: EntityManager, holds: ChannelHold[]): Promise<void> {
  if (holds.length > 0) await manager.insert(ChannelHold, holds);
}
/** Puts other holds in the place of all that a charge has; only before it is begun, when none of them was ever taken. */
export async function replaceHolds(
  manager: EntityManager,
  workshopId: string,
  chargeId: string,
  holds: ChannelHold[],
): Promise<void> {
  await manager.delete(ChannelHold, { workshopId, chargeId });
  await insertHolds(manager, holds);
}
export async function updateHold(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<ChannelHold>,
): Promise<void> {
  await manager.update(ChannelHold, { workshopId, id }, patch);
}
/** The running holds on these channels, whosever they are. */
export async function runningHoldsOn(
  manager: EntityManager,
  workshopId: string,
  channelIds: readonly string[],
): Promise<ChannelHold[]> {
  if (channelIds.length === 0) return [];
  return manager.findBy(ChannelHold, { workshopId, channelId: In([...channelIds]), state: 'running' });
}
/** Holds on these channels that have ended. */
export async function releasedHoldsOn(
  manager: EntityManager,
  workshopId: string,
  channelIds: readonly string[],
): Promise<ChannelHold[]> {
  if (channelIds.length === 0) return [];
  return manager.findBy(ChannelHold, { workshopId, channelId: In([...channelIds]), state: 'released' });
}

export async function insertRun(manager: EntityManager, run: RunStretch): Promise<void> {
  await manager.insert(RunStretch, run);
}
export async function updateRun(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<RunStretch>,
): Promise<void> {
  await manager.update(RunStretch, { workshopId, id }, patch);
}

export async function insertReading(manager: EntityManager, reading: ChargeReading): Promise<void> {
  await manager.insert(ChargeReading, reading);
}
/** Many at once, a few hundred to a statement: SQLite takes only so many values in one. */
export async function insertReadings(manager: EntityManager, readings: readonly ChargeReading[]): Promise<void> {
  for (let from = 0; from < readings.length; from += 500)
    await manager.insert(ChargeReading, readings.slice(from, from + 500));
}
export async function updateReading(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<ChargeReading>,
): Promise<void> {
  await manager.update(ChargeReading, { workshopId, id }, patch);
}

export async function insertLookIns(manager: EntityManager, lookIns: LookIn[]): Promise<void> {
  if (lookIns.length > 0) await manager.insert(LookIn, lookIns);
}
export async function updateLookIn(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<LookIn>,
): Promise<void> {
  await manager.update(LookIn, { workshopId, id }, patch);
}
export async function deleteLookIns(manager: EntityManager, workshopId: string, ids: readonly string[]): Promise<void> {
  if (ids.length > 0) await manager.delete(LookIn, { workshopId, id: In([...ids]) });
}

export async function insertRestCheck(manager: EntityManager, check: RestCheck): Promise<void> {
  await manager.insert(RestCheck, check);
}

/** Puts a new answer in the place of the present one, which stays with the instant it was replaced. */
export async function replaceAnswer(manager: EntityManager, answer: CheckAnswer): Promise<void> {
  const { workshopId, chargeId, code } = answer;
  await manager.update(CheckAnswer, { workshopId, chargeId, code, replacedAt: IsNull() }, { replacedAt: answer.at });
  await manager.insert(CheckAnswer, answer);
}

/** Takes answers of a charge back: they stay with the instant until which they counted. */
export async function retireAnswers(
  manager: EntityManager,
  workshopId: string,
  chargeId: string,
  codes: readonly CheckAnswer['code'][],
  at: number,
): Promise<void> {
  await manager.update(
    CheckAnswer,
    { workshopId, chargeId, code: In([...codes]), replacedAt: IsNull() },
    { replacedAt: at },
  );
}

export async function insertEvents(manager: EntityManager, events: ChargeEvent[]): Promise<void> {
  if (events.length > 0) await manager.insert(ChargeEvent, events);
}
