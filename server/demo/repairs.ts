/** The repairs of the demo: one for each charge on the bench, and one that is being proven. */
import { In, type EntityManager } from 'typeorm';
import { groupsAt, type PackInput } from '@/shared/contract/pack';
import type { PackReadingInput } from '@/shared/contract/pack-reading';
import type { Deps } from '../deps';
import { Charge } from '../entities/charge';
import { PackType } from '../entities/pack-type';
import { Spare } from '../entities/spare';
import { updateCharge } from '../repositories/charges.repository';
import { recordRemoved } from '../services/finish-repair.service';
import { addPackReading } from '../services/pack-readings.service';
import { packColumnsOf } from '../services/pack-rules';
import { loadRepairFile } from '../services/repair-file';
import { takeTarget } from '../services/repair-targets.service';
import { settleRepair } from '../services/repair-write';
import { addRepair } from '../services/repairs.service';
import { addSecondSource } from '../services/second-sources.service';
import { inTransaction } from '../services/unit-of-work';
import { demoWorkshopId as workshopId } from './demo-workshop';
import { handMeterId, typeId, type DemoType } from './equipment';
import { packVoltsOf } from './pack-volts';
import { demoPeople, memberOf, type DemoName } from './people';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

const GROUPS = 96;
const packs: Record<DemoType, { name: string; perModule: number }> = {
  two: { name: '96 groups in 48 modules', perModule: 2 },
  three: { name: '96 groups in 32 modules', perModule: 3 },
  six: { name: '96 groups in 16 modules', perModule: 6 },
  flat: { name: '96 groups in 24 modules, flat curve', perModule: 4 },
};
/** Typed by the manager, V per group; of the others the workshop's own arrivals tell. */
const usualArrivals: Partial<Record<DemoType, number>> = { three: 3.9 };
const packTypeId = (type: DemoType): string => `demo-pack-${type}`;
const packOf = (type: DemoType): PackInput => ({
  moduleTypeId: typeId(type),
  groupCount: GROUPS,
  groupsPerModule: packs[type].perModule,
  positionOfGroup: null,
});

export async function writePackTypes(manager: EntityManager, setUpAt: number): Promise<void> {
  const rows = (Object.keys(packs) as DemoType[]).map((type): PackType => ({
    id: packTypeId(type),
    workshopId,
    name: packs[type].name,
    ...packColumnsOf(packOf(type)),
    usualArrivalVolts: usualArrivals[type] ?? null,
    note: null,
    rev: 1,
    createdAt: setUpAt,
  }));
  await manager.insert(PackType, rows);
}

/** Invented vehicles by the repair's number; hours from now to the promise. */
const cars: Record<string, { vehicle: string; bay: string | null; promisedH: number }> = {
  'R-2406': { vehicle: 'White estate', bay: 'bay 6', promisedH: 3 },
  'R-2408': { vehicle: 'Grey saloon', bay: 'bay 5', promisedH: 5 },
  'R-2409': { vehicle: 'Red hatchback', bay: 'bay 11', promisedH: 4 },
  'R-2411': { vehicle: 'White van', bay: 'bay 8', promisedH: 5 },
  'R-2412': { vehicle: 'Green van', bay: 'bay 7', promisedH: 6 },
  'R-2413': { vehicle: 'Silver hatchback', bay: 'bay 9', promisedH: 7 },
  'R-2415': { vehicle: 'Black estate', bay: 'bench 2', promisedH: 20 },
  'R-2417': { vehicle: 'Yellow van', bay: 'yard', promisedH: 24 },
  'R-2418': { vehicle: 'Grey van', bay: 'bay 3', promisedH: 6 },
  'R-2423': { vehicle: 'Blue hatchback', bay: 'bay 2', promisedH: 22 },
};
const provenCar = { vehicle: 'Brown hatchback', bay: 'bay 10' };

const demoTypeOf = (moduleTypeId: string): DemoType =>
  (Object.keys(packs) as DemoType[]).find((type) => typeId(type) === moduleTypeId) ?? 'two';

const book = (
  deps: Deps,
  by: DemoName,
  number: string,
  type: DemoType,
  car: { vehicle: string; bay: string | null },
  promisedAt: number,
  at: number,
) =>
  addRepair(
    deps,
    memberOf(by),
    {
      number,
      ...car,
      packTypeId: packTypeId(type),
      pack: packOf(type),
      customerName: null,
      customerContact: null,
      promisedAt: new Date(promisedAt).toISOString(),
      personIds: [demoPeople[by].id],
      note: null,
    },
    at,
  );

const reading = (groupVolts: number[], change: Partial<PackReadingInput> = {}): PackReadingInput => ({
  stage: 'arrival',
  balanceCount: null,
  groupVolts,
  packVolts: Number(groupVolts.reduce((sum, volts) => sum + volts, 0).toFixed(1)),
  celsius: 21,
  restedMinutes: 600,
  meterId: handMeterId,
  instrument: null,
  source: 'file',
  fileName: 'pack.csv',
  note: null,
  ...change,
});

/** A hand meter at the module, and at a group of another one: a millivolt beside what the pack says. */
function atModule(readingId: string, volts: readonly number[], pack: PackInput, position: string) {
  const metered = (group: number): number => Number((volts[group]! + 0.001).toFixed(3));
  const groups = groupsAt(pack, position);
  const healthy = groups.includes(GROUPS - 1) ? 0 : GROUPS - 1;
  return {
    readingId,
    modulePosition: position,
    groupVolts: groups.map(metered),
    healthyGroup: { group: healthy, volts: metered(healthy) },
    meterId: handMeterId,
  };
}

/** The one whose two sources disagree: nothing is taken from its reading before somebody has decided. */
const DISAGREES = 'R-2423';

/** Books the repair of a charge that is about to be planned, and reads its pack: yesterday, and its module this morning. */
export async function bookRepairOf(
  deps: Deps,
  by: DemoName,
  wish: { repairRef: string | null; modulePosition: string | null; spareId: string; targetVolts: number | null },
  plannedAt: number,
): Promise<void> {
  const { repairRef, modulePosition, targetVolts } = wish;
  const car = cars[repairRef ?? ''];
  if (repairRef === null || modulePosition === null || targetVolts === null || !car) return;
  const spare = await deps.dataSource.manager.findOneByOrFail(Spare, { workshopId, id: wish.spareId });
  const type = demoTypeOf(spare.moduleTypeId);
  const member = memberOf(by);
  const promisedAt = Math.ceil((deps.clock.now() + car.promisedH * HOUR) / (30 * MINUTE)) * 30 * MINUTE;
  const bookedAt = plannedAt - 17 * HOUR;
  const { id } = await book(deps, by, repairRef, type, { vehicle: car.vehicle, bay: car.bay }, promisedAt, bookedAt);
  const volts = packVoltsOf(packOf(type), modulePosition, targetVolts, repairRef);
  const read = await addPackReading(deps, member, id, reading(volts), bookedAt + 20 * MINUTE);
  if (repairRef === DISAGREES) return;
  const readingId = read.readings[0]!.id;
  const source = { ...atModule(readingId, volts, packOf(type), modulePosition), pointsTo: null };
  await addSecondSource(deps, member, id, source, plannedAt - 25 * MINUTE);
  const target = { readingId, volts: null, toleranceMillivolts: 5, reason: null };
  await takeTarget(deps, member, id, target, plannedAt - 4 * MINUTE);
}

/** The hand meter points one module on: three minutes ago, and nobody has decided yet. */
export async function letSourcesDisagree(deps: Deps, now: number): Promise<void> {
  const charge = await deps.dataSource.manager.findOneByOrFail(Charge, { workshopId, repairRef: DISAGREES });
  const file = await loadRepairFile(deps.dataSource.manager, workshopId, charge.repairId ?? '');
  const { repair, readings } = file;
  const position = charge.modulePosition ?? '1';
  const next = String(Number(position) + 1);
  const [arrival] = readings;
  const groups = groupsAt(repair, position);
  const source = {
    ...atModule(arrival!.id, arrival!.groupVolts, packOf(demoTypeOf(repair.moduleTypeId ?? '')), position),
    // The meter sees a healthy module there.
    groupVolts: groups.map(() => charge.targetVolts),
    pointsTo: next,
  };
  await addSecondSource(deps, memberOf('suri'), repair.id, source, now - 3 * MINUTE);
}

/** Booked, and due to come onto the stand later: nobody has read these packs yet. */
const unread = [
  { number: 'R-2424', type: 'three', by: 'ines', vehicle: 'Orange estate', bay: 'yard', promisedH: 26, bookedMin: 55 },
  { number: 'R-2425', type: 'two', by: 'suri', vehicle: 'White hatchback', bay: 'yard', promisedH: 29, bookedMin: 35 },
] as const;

export async function bookUnread(deps: Deps, now: number): Promise<void> {
  for (const { number, type, by, vehicle, bay, promisedH, bookedMin } of unread) {
    const promisedAt = Math.ceil((now + promisedH * HOUR) / (30 * MINUTE)) * 30 * MINUTE;
    await book(deps, by, number, type, { vehicle, bay }, promisedAt, now - bookedMin * MINUTE);
  }
}

const PROVEN_AMONG = ['R-2404', 'R-2403', 'R-2402', 'R-2401', 'R-2400', 'R-2399', 'R-2398'];

/** A past charge whose module is fitted, and whose pack is read after the fit and after a balance charge: 102 → 38 → 11 mV. */
export async function proveOne(deps: Deps, now: number): Promise<void> {
  const fitted = await deps.dataSource.manager.findBy(Charge, {
    workshopId,
    repairRef: In(PROVEN_AMONG),
    stage: 'fitted',
  });
  // The last one that has had a night on the charger since.
  const charge = fitted
    .filter(({ closedAt }) => (closedAt ?? now) < now - 16 * HOUR)
    .sort((one, other) => other.createdAt - one.createdAt)[0];
  if (!charge) return;
  const { repairRef, modulePosition, createdAt, closedAt } = charge;
  const by = (Object.keys(demoPeople) as DemoName[]).find((name) => demoPeople[name].id === charge.personId) ?? 'ines';
  const member = memberOf(by);
  const type = demoTypeOf(charge.moduleTypeId);
  const position = modulePosition ?? '1';
  const { id } = await book(deps, by, repairRef!, type, provenCar, now + 4 * HOUR, createdAt - 17 * HOUR);
  const levelled = (spread: number): number[] =>
    packVoltsOf(packOf(type), position, charge.targetVolts, repairRef!, spread);
  const arrival = await addPackReading(deps, member, id, reading(levelled(0.102)), createdAt - 17 * HOUR + 20 * MINUTE);
  const readingId = arrival.readings[0]!.id;
  const source = { ...atModule(readingId, levelled(0.102), packOf(type), position), pointsTo: null };
  await addSecondSource(deps, member, id, source, createdAt - 40 * MINUTE);
  const target = { readingId, volts: null, toleranceMillivolts: 5, reason: null };
  await takeTarget(deps, member, id, target, createdAt - 5 * MINUTE);
  await linkPast(deps, charge, id);
  await recordRemoved(
    deps,
    member,
    id,
    { modulePosition: position, fate: 'scrap', note: null },
    closedAt! + 10 * MINUTE,
  );
  const stages = [
    { at: closedAt! + HOUR, spread: 0.038, change: { stage: 'after-fit' as const, restedMinutes: 30 } },
    { at: closedAt! + 15 * HOUR, spread: 0.011, change: { stage: 'after-balance' as const, balanceCount: 1 } },
  ];
  for (const { at, spread, change } of stages)
    await addPackReading(deps, member, id, reading(levelled(spread), change), at);
}

/** Gives a charge of the past to its repair, with the lines that it would have left there. */
async function linkPast(deps: Deps, charge: Charge, repairId: string): Promise<void> {
  const { id, personId, createdAt, readyAt, closedAt } = charge;
  await inTransaction(deps, async (manager) => {
    await updateCharge(manager, workshopId, id, { repairId });
    const file = await loadRepairFile(manager, workshopId, repairId);
    const label = file.charges[0]!.spare.label;
    await settleRepair(manager, file, closedAt!, personId, [
      { text: `planned ${label}`, at: createdAt },
      { text: `checked ${label}: ready`, at: readyAt! },
      { text: `fitted ${label} as module ${charge.modulePosition}`, at: closedAt! },
    ]);
  });
}
