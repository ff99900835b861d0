import type { PackReadingDto, SecondSourceDto } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import { repairSteps } from '@/shared/contract/repair-steps';

const by = { id: 'p1', name: 'Petra Aldwin' };
const at = '2026-06-09T09:20:00.000Z';

/** An arrival reading of four groups in two modules; G3 is 80 mV low. */
export const reading = (more: Partial<PackReadingDto> = {}): PackReadingDto => ({
  ...{ id: 'read1', stage: 'arrival', balanceCount: null, groupVolts: [3.95, 3.951, 3.87, 3.95], packVolts: null },
  ...{ celsius: 20, restedMinutes: 120, meterId: null, instrument: null, source: 'typed', fileName: null, note: null },
  ...{ at, by, spreadMillivolts: 81, medianVolts: 3.95, lowestVolts: 3.87, highestVolts: 3.951, odd: [2] },
  ...{ oddPositions: ['2'], groupAmpHours: null, spreadAmpHours: null, change: null, setAside: null },
  ...more,
});

export const source = (more: Partial<SecondSourceDto> = {}): SecondSourceDto => ({
  ...{ id: 'so1', readingId: 'read1', modulePosition: '2', groupVolts: [3.949, 3.95], healthyGroup: null },
  ...{ meterId: 'm1', pointsTo: '1', at, by, agrees: false, differs: [{ group: 2, millivolts: 79 }] },
  ...{ offsetMillivolts: null, decided: null },
  ...more,
});

/** A repair of a pack with four groups in two modules, just booked. */
export const repairOf = (more: Partial<RepairPageDto> = {}): RepairPageDto => ({
  ...{ id: 'r1', number: 'R-2423', vehicle: 'Blue hatchback', bay: 'bay 2', people: [by], promisedAt: null },
  ...{ state: 'open', step: 'read', block: null, failing: null, charge: null, spreadMillivolts: null },
  ...{ needsSomebody: true, waits: false, rev: 3, bookedAt: at, packTypeId: null, customerName: null },
  ...{ customerContact: null, personIds: ['p1'], note: null, packTypeName: null, readings: [], sources: [] },
  pack: {
    ...{ moduleTypeId: 't1', groupCount: 4, groupsPerModule: 2, positionOfGroup: null },
    ...{ moduleTypeName: '2-series 66 Ah', moduleCount: 2, bleedAmps: null, aimMillivolts: 10 },
  },
  steps: repairSteps.map((step) => ({ step, state: 'to-come', at: null, by: null })),
  ...{
    computed: null,
    target: null,
    spare: null,
    charges: [],
    removed: [],
    fittedAsItIs: [],
    asItIs: null,
    photos: [],
    advised: [],
    conditions: [],
    wait: [],
    expectedAfterFit: null,
  },
  ...{ forecast: null, bookedBy: by, handedOver: null, deleted: null, erased: null, events: [] },
  ...more,
});
