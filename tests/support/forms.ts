/** Forms as a person fills them in: text in every field. Change what a test is about. */
export const moduleTypeForm = (change: object = {}) => ({
  name: '2-series 66 Ah',
  chemistry: 'nmc',
  groupsInSeries: '2',
  cellsInParallel: '3',
  ratedAh: '66',
  chargeLimitVolts: '4.20',
  dischargeLimitVolts: '3.00',
  floorVolts: '2.50',
  maxChargeAmps: '66',
  maxDischargeAmps: '66',
  minChargeCelsius: '10',
  maxChargeCelsius: '45',
  resistanceMilliohm: '1.5',
  resistanceKind: 'pulse-10s',
  linkMilliohm: '0.2',
  shelfVolts: '3.60',
  selfDischargePercentPerMonth: '',
  note: '',
  ...change,
});

export const channelForm = (change: object = {}) => ({
  name: 'B1',
  maxAmps: '20',
  minAmps: '0.1',
  maxVolts: '30',
  maxWatts: '',
  adjustableVolts: true,
  senses: 'own-terminals',
  leadMilliohm: '5',
  displayStepMillivolts: '10',
  singleGroup: false,
  canDischarge: false,
  dischargeAmps: '',
  loadOhm: '',
  ...change,
});

export const chargerForm = (change: object = {}) => ({
  name: 'Supply B',
  place: 'bench 2',
  meterId: null,
  channels: [channelForm()],
  ...change,
});

export const spareForm = (moduleTypeId: string, change: object = {}) => ({
  label: 'S-0417',
  moduleTypeId,
  shelfPlace: 'D3',
  capacityAh: '60,4',
  healthPercent: '',
  capacitySource: 'measured',
  condition: 'sound',
  note: '',
  ...change,
});

export const readingForm = (change: object = {}) => ({
  groupVolts: ['3.612', '3,606 V'],
  celsius: '21',
  meterId: null,
  ...change,
});

export const planForm = (spareId: string, change: object = {}) => ({
  spareId,
  targetVolts: '3.968 V',
  toleranceMillivolts: '',
  meterId: null,
  packCelsius: '21',
  readyBy: '',
  clipOnAt: '',
  repairRef: 'R-2418',
  modulePosition: '17',
  ...change,
});
