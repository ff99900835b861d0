import type { PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairCardDto, RepairPageDto } from '@/shared/contract/repair';
import { repairSteps, type RepairStep } from '@/shared/contract/repair-steps';

const ines = { id: 'p2', name: 'Ines Marlow' };
const bookedAt = '2026-06-08T12:50:00.000Z';

/** A reading of 96 groups, module 17 low. */
export function readingOf(more: Partial<PackReadingDto> = {}): PackReadingDto {
  const groupVolts = Array.from({ length: 96 }, (_, i) =>
    i === 32 ? 3.871 : i === 33 ? 3.934 : 3.968 + (i % 3) / 1000,
  );
  return {
    id: 'g1',
    stage: 'arrival',
    balanceCount: null,
    groupVolts,
    packVolts: null,
    celsius: 21,
    restedMinutes: 120,
    meterId: null,
    instrument: null,
    source: 'file',
    fileName: null,
    note: null,
    at: '2026-06-08T13:10:00.000Z',
    by: ines,
    spreadMillivolts: 99,
    medianVolts: 3.969,
    lowestVolts: 3.871,
    highestVolts: 3.97,
    odd: [32, 33],
    oddPositions: ['17'],
    groupAmpHours: null,
    spreadAmpHours: 7.4,
    change: null,
    setAside: null,
    ...more,
  };
}

/** A repair that is at a step, those before it done. */
export function repairOf(step: RepairStep | null, more: Partial<RepairPageDto> = {}): RepairPageDto {
  const at = step === null ? repairSteps.length : repairSteps.indexOf(step);
  return {
    ...cardOf('R-2418', { step: step ?? 'prove', failing: at > 0 ? '17' : null }),
    id: 'r1',
    packTypeId: null,
    packTypeName: null,
    pack: {
      moduleTypeId: 't1',
      groupCount: 96,
      groupsPerModule: 2,
      positionOfGroup: null,
      bleedAmps: null,
      aimMillivolts: 10,
      moduleTypeName: '2-series 66 Ah',
      moduleCount: 48,
    },
    customerName: null,
    customerContact: null,
    personIds: ['p2'],
    note: null,
    steps: repairSteps.map((one, i) => ({
      step: one,
      state: i < at ? 'done' : i === at ? (more.block ? 'blocked' : 'present') : 'to-come',
      at: i < at ? bookedAt : null,
      by: i < at ? ines : null,
    })),
    readings: at > 0 ? [readingOf()] : [],
    sources: [],
    computed: null,
    target: null,
    spare: null,
    charges: [],
    removed: [],
    fittedAsItIs: [],
    asItIs: null,
    photos: [],
    conditions: [],
    advised: [],
    wait: [],
    expectedAfterFit: null,
    forecast: null,
    bookedBy: ines,
    handedOver: null,
    deleted: null,
    erased: null,
    events: [{ id: 'e1', at: bookedAt, by: ines, text: 'booked Grey van' }],
    ...more,
  };
}

export function cardOf(number: string, more: Partial<RepairCardDto> = {}): RepairCardDto {
  return {
    id: number,
    number,
    vehicle: 'Grey van',
    bay: 'bay 3',
    people: [ines],
    promisedAt: null,
    state: 'open',
    step: 'read',
    block: null,
    failing: null,
    charge: null,
    spreadMillivolts: null,
    needsSomebody: false,
    waits: false,
    rev: 4,
    bookedAt,
    ...more,
  };
}
