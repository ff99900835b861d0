import type { SpareDto } from '@/shared/contract/spare';

/** A sound spare of two groups on the shelf, measured, never read. */
export const spareOf = (more: Partial<SpareDto> = {}): SpareDto => ({
  id: 's1',
  label: 'S-0398',
  moduleTypeId: 't1',
  typeName: '2-series 66 Ah',
  shelfPlace: 'B2',
  groupsInSeries: 2,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 2.7,
  floorVolts: 2.5,
  shelfVolts: null,
  where: 'shelf',
  condition: 'sound',
  capacitySource: 'measured',
  capacityAh: 66,
  healthPercent: null,
  usedCapacityAh: 66,
  capacitySdAh: 2,
  capacities: [],
  quarantine: null,
  charge: null,
  reading: null,
  note: null,
  rev: 1,
  ...more,
});
