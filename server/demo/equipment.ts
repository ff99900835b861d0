/** The invented equipment of the demo workshop: four module types over three chemistries, six chargers, meters, resistors. */
import type { EntityManager } from 'typeorm';
import { Channel } from '../entities/channel';
import { Charger } from '../entities/charger';
import { LevellingResistor } from '../entities/levelling-resistor';
import { Meter } from '../entities/meter';
import { ModuleType } from '../entities/module-type';
import { nothingMore } from '../services/module-type-defaults';
import { demoWorkshopId as workshopId } from './demo-workshop';

const DAY = 86_400_000;

export type DemoType = 'two' | 'three' | 'six' | 'flat';
export const typeId = (type: DemoType): string => `demo-type-${type}`;
export const channelId = (name: string): string => `demo-channel-${name}`;
export const handMeterId = 'demo-meter-hand-1';

type TypeColumns = Omit<ModuleType, 'id' | 'workshopId' | 'rev' | 'createdAt'>;

const lithium = {
  ...nothingMore,
  dischargeLimitVolts: 3,
  floorVolts: 2.5,
  minChargeCelsius: 10,
  maxChargeCelsius: 45,
  resistanceKind: 'pulse-10s',
  selfDischargePercentPerMonth: null,
} as const;

const types: Record<DemoType, TypeColumns> = {
  two: {
    ...lithium,
    name: '2-series 66 Ah',
    chemistry: 'nmc',
    groupsInSeries: 2,
    cellsInParallel: 3,
    ratedAh: 66,
    chargeLimitVolts: 4.2,
    maxChargeAmps: 66,
    maxDischargeAmps: 66,
    resistanceMilliohm: 1.5,
    linkMilliohm: 0.2,
    shelfVolts: 3.6,
    note: 'Plastic end plates: no clamp on the long sides.',
  },
  three: {
    ...lithium,
    name: '3-series 78 Ah',
    chemistry: 'lmo-blend',
    groupsInSeries: 3,
    cellsInParallel: 3,
    ratedAh: 78,
    chargeLimitVolts: 4.2,
    maxChargeAmps: 60,
    maxDischargeAmps: 60,
    resistanceMilliohm: 1.4,
    linkMilliohm: 0.3,
    shelfVolts: 3.6,
    note: null,
  },
  six: {
    ...lithium,
    name: '6-series 52 Ah',
    chemistry: 'nmc',
    groupsInSeries: 6,
    cellsInParallel: 2,
    ratedAh: 52,
    chargeLimitVolts: 4.2,
    maxChargeAmps: 52,
    maxDischargeAmps: 52,
    resistanceMilliohm: 1.9,
    linkMilliohm: 0.6,
    shelfVolts: 3.6,
    note: null,
  },
  flat: {
    ...lithium,
    name: '4-series 105 Ah, flat curve',
    chemistry: 'lfp',
    groupsInSeries: 4,
    cellsInParallel: 1,
    ratedAh: 105,
    chargeLimitVolts: 3.6,
    dischargeLimitVolts: 2.5,
    floorVolts: 2,
    maxChargeAmps: 100,
    maxDischargeAmps: 100,
    resistanceMilliohm: 0.9,
    linkMilliohm: 0.3,
    shelfVolts: 3.25,
    note: 'On the plateau count ampere-hours from a known end.',
  },
};

/** Meters with the days since their last cross-check; C1's display is overdue for one. */
const meters: [key: string, name: string, offsetMillivolts: number, checkedDaysAgo: number][] = [
  ['hand-1', 'Hand meter 1', 0, 12],
  ['hand-2', 'Hand meter 2', -1.5, 34],
  ['A1', 'Display of A1', 0.5, 55],
  ['A2', 'Display of A2', 0, 55],
  ['B1', 'Display of B1', 0.5, 24],
  ['B2', 'Display of B2', -0.5, 24],
  ['C1', 'Display of C1', 1, 113],
  ['C2', 'Display of C2', 0, 20],
];

interface ChannelSpec {
  name: string;
  charger: string;
  place: string;
  maxAmps: number;
  maxVolts: number;
  maxWatts: number | null;
  leadMilliohm: number;
  dischargeAmps?: number;
}

const channels: ChannelSpec[] = [
  {
    name: 'A1',
    charger: 'Small supply, left',
    place: 'bench 1',
    maxAmps: 10,
    maxVolts: 15,
    maxWatts: null,
    leadMilliohm: 4,
  },
  {
    name: 'A2',
    charger: 'Small supply, right',
    place: 'bench 1',
    maxAmps: 10,
    maxVolts: 15,
    maxWatts: null,
    leadMilliohm: 4,
  },
  {
    name: 'B1',
    charger: 'Tall supply, left',
    place: 'bench 2',
    maxAmps: 20,
    maxVolts: 30,
    maxWatts: 600,
    leadMilliohm: 3,
  },
  {
    name: 'B2',
    charger: 'Tall supply, right',
    place: 'bench 2',
    maxAmps: 20,
    maxVolts: 30,
    maxWatts: 600,
    leadMilliohm: 3,
  },
  { name: 'C1', charger: 'Heavy supply', place: 'bench 3', maxAmps: 60, maxVolts: 10, maxWatts: 600, leadMilliohm: 1 },
  {
    name: 'C2',
    charger: 'Two-way supply',
    place: 'bench 3',
    maxAmps: 10,
    maxVolts: 30,
    maxWatts: null,
    leadMilliohm: 3,
    dischargeAmps: 10,
  },
];

const resistors: [key: string, name: string, ohm: number, maxWatts: number][] = [
  ['05', '0.5 Ω, 100 W', 0.5, 100],
  ['2', '2 Ω, 50 W', 2, 50],
  ['10', '10 Ω, 25 W', 10, 25],
];

export interface DemoEquipment {
  types: Map<DemoType, ModuleType>;
  channels: Map<string, Channel>;
  meters: Map<string, Meter>;
}

/** Writes the equipment as it was set up before the first of the demo's charges. */
export async function writeEquipment(manager: EntityManager, now: number, setUpAt: number): Promise<DemoEquipment> {
  const typeRows = (Object.keys(types) as DemoType[]).map((type): ModuleType => ({
    ...types[type],
    id: typeId(type),
    workshopId,
    rev: 1,
    createdAt: setUpAt,
  }));
  const meterRows = meters.map(([key, name, offsetMillivolts, daysAgo]): Meter => ({
    id: `demo-meter-${key}`,
    workshopId,
    name,
    offsetMillivolts,
    checkedAt: now - daysAgo * DAY,
    rev: 1,
  }));
  const chargerRows = channels.map(({ name, charger, place }): Charger => ({
    id: `demo-charger-${name}`,
    workshopId,
    name: charger,
    place,
    meterId: `demo-meter-${name}`,
    retired: false,
    rev: 1,
    createdAt: setUpAt,
  }));
  const channelRows = channels.map(channelRow);
  await manager.insert(ModuleType, typeRows);
  await manager.insert(Meter, meterRows);
  await manager.insert(Charger, chargerRows);
  await manager.insert(Channel, channelRows);
  await manager.insert(
    LevellingResistor,
    resistors.map(([key, name, ohm, maxWatts]) => ({
      id: `demo-resistor-${key}`,
      workshopId,
      name,
      ohm,
      maxWatts,
      rev: 1,
    })),
  );
  return {
    types: new Map((Object.keys(types) as DemoType[]).map((type, place) => [type, typeRows[place]!])),
    channels: new Map(channelRows.map((row) => [row.name, row])),
    meters: new Map(meterRows.map((row) => [row.id, row])),
  };
}

const channelRow = (spec: ChannelSpec): Channel => ({
  id: channelId(spec.name),
  workshopId,
  chargerId: `demo-charger-${spec.name}`,
  name: spec.name,
  maxAmps: spec.maxAmps,
  minAmps: 0.05,
  maxVolts: spec.maxVolts,
  maxWatts: spec.maxWatts,
  adjustableVolts: true,
  senses: 'own-terminals',
  leadMilliohm: spec.leadMilliohm,
  displayStepMillivolts: 1,
  singleGroup: false,
  canDischarge: spec.dischargeAmps !== undefined,
  dischargeAmps: spec.dischargeAmps ?? null,
  loadOhm: null,
  displayStepAmps: null,
  leadsMeasured: null,
  deratingAboveCelsius: null,
  deratingPercent: null,
  dutyPercent: null,
  faultAt: null,
  faultSeen: null,
  faultById: null,
  retired: false,
});
