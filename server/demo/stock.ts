/** Thirty invented spares: those of the open charges, those on the shelf, and two that nobody may plan. */
import type { EntityManager } from 'typeorm';
import type { NumberSource, SpareCondition } from '@/calc/plan-types';
import type { SpareInput } from '@/shared/contract/spare';
import { Spare } from '../entities/spare';
import { SpareReading } from '../entities/spare-reading';
import { demoWorkshopId as workshopId } from './demo-workshop';
import { handMeterId, typeId, type DemoType } from './equipment';
import { demoPeople, type DemoName } from './people';

const DAY = 86_400_000;

export const spareId = (label: string): string => `demo-spare-${label}`;

interface SpareSpec {
  label: string;
  type: DemoType;
  place: string;
  groups: number[];
  /** Ah of a group; null: nobody knows. */
  capacityAh: number | null;
  source: NumberSource;
  /** Days since the reading; a fraction is today. */
  age: number;
  by: DemoName;
  celsius?: number;
  condition?: Exclude<SpareCondition, 'quarantined'>;
  quarantine?: { reason: string; daysAgo: number; by: DemoName };
  note?: string;
  otherMeter?: boolean;
}

const two = (label: string, place: string, groups: number[], rest: Partial<SpareSpec>): SpareSpec =>
  spec('two', label, place, groups, rest);
const spec = (type: DemoType, label: string, place: string, groups: number[], rest: Partial<SpareSpec>): SpareSpec => ({
  type,
  label,
  place,
  groups,
  capacityAh: null,
  source: 'measured',
  age: 10,
  by: 'suri',
  ...rest,
});

export const demoSpares: SpareSpec[] = [
  two('S-0417', 'D3', [3.612, 3.606], { capacityAh: 60.4, age: 12, by: 'ines' }),
  two('S-0408', 'D4', [3.571, 3.57], { capacityAh: 61, source: 'label', age: 71 }),
  two('S-0422', 'D3', [3.602, 3.588], { capacityAh: 59.2, age: 19 }),
  two('S-0391', 'box', [2.41, 2.894], {
    source: 'guessed',
    age: 1,
    by: 'hella',
    quarantine: { reason: '2.41 V at its reading, under 2.50 V', daysAgo: 1, by: 'hella' },
  }),
  two('S-0402', 'D2', [3.618, 3.614], { capacityAh: 60.9, age: 0.32, by: 'ines' }),
  two('S-0420', 'rack 2', [3.812, 3.811], { capacityAh: 58.7, age: 0.2 }),
  two('S-0381', 'D2', [3.914, 3.915], { capacityAh: 59.8, age: 0.15 }),
  two('S-0424', 'rack 2', [3.704, 3.703], { capacityAh: 61.2, age: 0.25, by: 'bram' }),
  two('S-0411', 'D4', [3.655, 3.654], { capacityAh: 58.9, age: 0.12, by: 'marek' }),
  two('S-0425', 'D4', [3.598, 3.599], { capacityAh: 60.1, age: 2, by: 'bram' }),
  two('S-0426', 'D5', [3.604, 3.603], { capacityAh: 57.9, age: 27, by: 'marek' }),
  two('S-0428', 'D5', [3.606, 3.61], { capacityAh: 61.5, age: 36, otherMeter: true }),
  spec('three', 'S-0398', 'A2', [3.658, 3.657, 3.655], { capacityAh: 73.1, age: 0.2, by: 'ines' }),
  spec('three', 'S-0404', 'H1', [3.601, 3.6, 3.602], { capacityAh: 72.5, age: 26 }),
  spec('three', 'S-0410', 'H1', [3.598, 3.599, 3.597], { capacityAh: 71, source: 'label', age: 44 }),
  spec('three', 'S-0431', 'H2', [3.604, 3.603, 3.603], { capacityAh: 74.2, age: 8, by: 'bram' }),
  spec('three', 'S-0433', 'H2', [3.612, 3.61, 3.611], { capacityAh: 70.8, age: 16 }),
  spec('three', 'S-0436', 'H2', [3.596, 3.597, 3.595], {
    source: 'guessed',
    age: 95,
    by: 'marek',
    note: 'From a write-off, history unknown.',
  }),
  spec('six', 'S-0371', 'B2', [3.648, 3.648, 3.647, 3.647, 3.648, 3.647], { capacityAh: 48, age: 0.3, by: 'bram' }),
  spec('six', 'S-0388', 'C2', [4.059, 4.06, 4.058, 4.06, 4.059, 4.06], { capacityAh: 47.2, age: 0.1, by: 'marek' }),
  spec('six', 'S-0376', 'box', [3.604, 3.603, 3.605, 3.604, 3.602, 3.603], {
    capacityAh: 49.1,
    age: 7,
    condition: 'dented',
    quarantine: { reason: 'dented at the corner', daysAgo: 7, by: 'suri' },
  }),
  spec('six', 'S-0379', 'H3', [3.611, 3.609, 3.61, 3.612, 3.61, 3.608], { capacityAh: 48.6, age: 15 }),
  spec('six', 'S-0383', 'H3', [3.6, 3.601, 3.599, 3.6, 3.602, 3.6], { capacityAh: 47.7, age: 23, by: 'bram' }),
  spec('six', 'S-0384', 'H4', [3.588, 3.587, 3.589, 3.588, 3.561, 3.588], {
    capacityAh: 46.9,
    age: 41,
    note: 'Group 5 falls behind: watch it.',
  }),
  spec('six', 'S-0390', 'H4', [3.615, 3.614, 3.616, 3.615, 3.614, 3.615], {
    capacityAh: 49,
    source: 'label',
    age: 5,
    by: 'marek',
  }),
  spec('flat', 'S-0440', 'F1', [3.251, 3.25, 3.252, 3.251], { capacityAh: 98.5, age: 9 }),
  spec('flat', 'S-0441', 'F1', [3.249, 3.25, 3.249, 3.248], { capacityAh: 97.2, age: 18, by: 'ines' }),
  spec('flat', 'S-0443', 'F2', [3.253, 3.254, 3.253, 3.252], { capacityAh: 96, source: 'label', age: 30 }),
  spec('flat', 'S-0444', 'F2', [3.262, 3.261, 3.262, 3.263], { capacityAh: 99.4, age: 13 }),
  spec('flat', 'S-0447', 'F2', [3.24, 3.241, 3.24, 3.239], { source: 'guessed', age: 62, by: 'marek' }),
];

/** Writes the spares with their last readings, and one earlier reading each. */
export async function writeStock(manager: EntityManager, now: number, setUpAt: number): Promise<void> {
  await manager.insert(
    Spare,
    demoSpares.map((one) => spareRow(one, now, setUpAt)),
  );
  await manager.insert(
    SpareReading,
    demoSpares.flatMap((one) => readingRows(one, now)),
  );
}

const spareRow = (one: SpareSpec, now: number, setUpAt: number): Spare => ({
  id: spareId(one.label),
  workshopId,
  label: one.label,
  moduleTypeId: typeId(one.type),
  shelfPlace: one.place,
  capacityAh: one.capacityAh,
  healthPercent: null,
  capacitySource: one.source,
  capacitySdAh: null,
  condition: (one.condition ?? 'sound') satisfies SpareInput['condition'],
  quarantineReason: one.quarantine?.reason ?? null,
  quarantinedAt: one.quarantine ? now - one.quarantine.daysAgo * DAY : null,
  quarantinedById: one.quarantine ? demoPeople[one.quarantine.by].id : null,
  fittedAt: null,
  note: one.note ?? null,
  rev: 1,
  createdAt: Math.min(setUpAt, now - (one.age + 60) * DAY),
});

/** A few millivolts lie between the two: what a module loses in a month or two on the shelf. */
function readingRows(one: SpareSpec, now: number): SpareReading[] {
  const row = (at: number, groupVolts: number[], celsius: number, key: string): SpareReading => ({
    id: `demo-reading-${one.label}-${key}`,
    workshopId,
    spareId: spareId(one.label),
    at,
    groupVolts,
    celsius,
    meterId: one.otherMeter ? 'demo-meter-hand-2' : handMeterId,
    personId: demoPeople[one.by].id,
    note: null,
    createdAt: at,
  });
  const before = one.groups.map((volts) => Number((volts + (volts < 3 ? 0.062 : 0.004)).toFixed(3)));
  return [
    row(now - (one.age + 34) * DAY, before, 19, 'earlier'),
    row(now - one.age * DAY, one.groups, one.celsius ?? 21, 'last'),
  ];
}
