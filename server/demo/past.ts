import type { EntityManager, EntityTarget, ObjectLiteral } from 'typeorm';
import { ChannelHold } from '../entities/channel-hold';
import { Charge } from '../entities/charge';
import { ChargeEvent } from '../entities/charge-event';
import { ChargeReading } from '../entities/charge-reading';
import { CheckAnswer } from '../entities/check-answer';
import { LookIn } from '../entities/look-in';
import { RestCheck } from '../entities/rest-check';
import { RunStretch } from '../entities/run-stretch';
import { Spare } from '../entities/spare';
import { SpareReading } from '../entities/spare-reading';
import { fillWaits } from '../services/waits/fill-waits';
import { makeNoise } from './noise';
import { makePast, type PastCharge } from './past-charges';
import { pastEvents } from './past-events';
import type { PastShop } from './past-plan';
import * as rows from './past-rows';

/** The last repair before those on the bench. */
const LAST_REPAIR = 2405;
const FIRST_SPARE = 101;

const numberOf = (place: number): string => `C-${String(place + 1).padStart(4, '0')}`;

/**
 * Writes eight weeks of charges that are over.
 * @returns how many
 */
export async function writePast(manager: EntityManager, shop: PastShop, now: number): Promise<number> {
  const past = makePast(shop, now);
  const noise = makeNoise(77);
  const repairs = Math.max(...past.map(({ repair }) => repair)) + 1;
  const numbers = new Map(past.map(({ key }, place) => [key, numberOf(place)]));
  const wentOnAs = new Map(
    past.flatMap(({ topUpOf, key }) => (topUpOf === null ? [] : [[topUpOf, numbers.get(key)!]])),
  );
  const lasts = new Map(past.map((one): [number, PastCharge] => [one.repair, one]));
  const lookIns = past.map((one) => rows.pastLookIns(one, noise));
  const label = (repair: number): string => `S-${String(FIRST_SPARE + repair).padStart(4, '0')}`;

  await insertMany(
    manager,
    Spare,
    [...lasts.values()].map((one) => rows.pastSpare(one, label(one.repair))),
  );
  await insertMany(manager, SpareReading, past.flatMap(rows.pastSpareReadings));
  await insertMany(
    manager,
    Charge,
    past.map((one) =>
      rows.pastCharge(one, {
        number: numbers.get(one.key)!,
        repairRef: `R-${LAST_REPAIR - repairs + 1 + one.repair}`,
        spareLabel: label(one.repair),
      }),
    ),
  );
  await insertMany(manager, ChannelHold, past.map(rows.pastHold));
  await insertMany(manager, RunStretch, past.map(rows.pastRun));
  await insertMany(manager, LookIn, lookIns.flat());
  await insertMany(
    manager,
    ChargeReading,
    past.flatMap((one, place) => rows.pastReadings(one, lookIns[place]!, noise)),
  );
  await insertMany(manager, CheckAnswer, past.flatMap(rows.pastAnswers));
  await insertMany(
    manager,
    RestCheck,
    past.map(rows.pastRestCheck).filter((check) => check !== null),
  );
  await insertMany(
    manager,
    ChargeEvent,
    past.flatMap((one) => pastEvents(one, shop.workshop.zone, wentOnAs.get(one.key) ?? null)),
  );
  await fillWaits(manager);
  return past.length;
}

/** Many rows a statement; SQLite binds at most some thirty thousand values. */
async function insertMany<Row extends ObjectLiteral>(
  manager: EntityManager,
  entity: EntityTarget<Row>,
  all: readonly Row[],
): Promise<void> {
  const atOnce = 100;
  for (let from = 0; from < all.length; from += atOnce)
    await manager
      .createQueryBuilder()
      .insert()
      .into(entity)
      .values(all.slice(from, from + atOnce))
      .updateEntity(false)
      .execute();
}
