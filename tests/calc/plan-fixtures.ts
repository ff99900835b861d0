import type {
  ChannelParameters,
  ModuleParameters,
  PlanInput,
  SpareState,
  TargetState,
  WorkshopParameters,
} from '@/calc/plan-types';

/** Invented equipment and modules for the tests of planner and running charge. */
export const channel = (name: string, over: Partial<ChannelParameters> = {}): ChannelParameters => ({
  channelId: `id-${name}`,
  name,
  maxAmps: 10,
  minAmps: 0,
  maxVolts: 60,
  maxWatts: null,
  adjustableVolts: true,
  senses: 'module',
  leadResistanceOhm: 0,
  displayStepVolts: 0.001,
  singleGroup: false,
  canDischarge: false,
  dischargeAmps: null,
  loadOhm: null,
  freeInS: 0,
  offsetSdVolts: 0.002,
  ...over,
});

export const lmoModule: ModuleParameters = {
  chemistry: 'lmo-blend',
  groupsInSeries: 2,
  cellsInParallel: 2,
  ratedAh: 66,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 2.7,
  floorVolts: 2.5,
  maxChargeAmps: 33,
  maxDischargeAmps: 60,
  minChargeCelsius: 0,
  maxChargeCelsius: 45,
  resistanceOhm: 0.002,
  resistanceKind: 'long',
  linkResistanceOhm: 0,
  curve: null,
  selfDischargePerMonth: 0,
};

export const lmoSpare: SpareState = {
  groupVolts: [3.75, 3.75],
  readingAgeS: 0,
  celsius: 25,
  meterId: 'm1',
  capacityAh: 66,
  capacitySource: 'measured',
  capacityRelativeSd: null,
  condition: 'sound',
  quarantineReason: null,
};

export const target: TargetState = { volts: 3.92, toleranceVolts: 0.005, meterId: 'm1', celsius: 25, sdVolts: null };

export const workshop: WorkshopParameters = {
  minRestS: 3600,
  lookInIntervalS: 3600,
  inrushLimitC: 1,
  clipOnS: 300,
  clipOffS: 300,
  checkS: 300,
  busbarsS: 1200,
  closesInS: null,
};

export const planInput = (over: Partial<PlanInput> = {}): PlanInput => ({
  module: lmoModule,
  spare: lmoSpare,
  target,
  channels: [channel('A1')],
  resistors: [],
  neighbour: null,
  workshop,
  readyByS: null,
  clipOnAtS: 0,
  celsius: 25,
  seed: 11,
  ...over,
});

/** One of each kind: terminals at 10 and 20 A, two single-group channels, one with a fixed voltage, one busy. */
export const sixChannels: ChannelParameters[] = [
  channel('A1', { senses: 'own-terminals', leadResistanceOhm: 0.002, displayStepVolts: 0.01 }),
  channel('A2', { freeInS: 2400, canDischarge: true, dischargeAmps: 12 }),
  channel('B1', { maxAmps: 20, displayStepVolts: 0.01 }),
  channel('C1', { maxAmps: 60, maxVolts: 5, singleGroup: true }),
  channel('C2', { maxVolts: 5, singleGroup: true, canDischarge: true, dischargeAmps: 10 }),
  channel('F1', { adjustableVolts: false, maxVolts: 8.4 }),
];
