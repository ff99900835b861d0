/** A repair as it is typed. Pure; texts and choices, read by the contract's own schema. */
import * as z from 'zod/mini';
import { changeRepairSchema, repairSchema, type RepairDto } from '@/shared/contract/repair';
import type { LocaleMarks } from '../format/marks';
import { parseTimeOfDay, timeOfDayText } from '../format/parse';
import { dayOf, instantOfDay, localTime } from '../format/zone';
import type { DayAndTime } from '../primitives/date-time-field';
import { emptyPack, packTexts, packTypedOf, type PackTyped } from './pack-form';

export interface RepairTyped {
  /** Empty: the next one. */
  number: string;
  vehicle: string;
  /** Empty: the pack's own numbers. */
  packTypeId: string;
  pack: PackTyped;
  customerName: string;
  customerContact: string;
  /** No time: nothing was promised. */
  promisedAt: DayAndTime;
  bay: string;
  personIds: string[];
  note: string;
  /** Revision the texts come from. */
  baseRev: number;
}

export const emptyRepair = (today: string, personId: string): RepairTyped => ({
  number: '',
  vehicle: '',
  packTypeId: '',
  pack: emptyPack,
  customerName: '',
  customerContact: '',
  promisedAt: { day: today, time: '' },
  bay: '',
  personIds: [personId],
  note: '',
  baseRev: 0,
});

export function repairTexts(repair: RepairDto, zone: string, today: string, marks: LocaleMarks): RepairTyped {
  const promised = repair.promisedAt === null ? null : Date.parse(repair.promisedAt);
  const { hour, minute } = localTime(promised ?? 0, zone);
  return {
    number: repair.number,
    vehicle: repair.vehicle,
    packTypeId: repair.packTypeId ?? '',
    pack: packTexts(repair.pack, marks),
    customerName: repair.customerName ?? '',
    customerContact: repair.customerContact ?? '',
    promisedAt:
      promised === null
        ? { day: today, time: '' }
        : { day: dayOf(promised, zone), time: timeOfDayText(hour * 60 + minute) },
    bay: repair.bay ?? '',
    personIds: repair.personIds,
    note: repair.note ?? '',
    baseRev: repair.rev,
  };
}

/** The promised instant; an empty time is none, what is no time is left to the contract to say so. */
function promised({ day, time }: DayAndTime, zone: string): string | null {
  if (time.trim() === '') return null;
  const minutes = parseTimeOfDay(time);
  return minutes === null ? time : new Date(instantOfDay(day, minutes, zone)).toISOString();
}

const wireOf = (zone: string) =>
  z.transform((raw: unknown): unknown => {
    const { baseRev: _, ...typed } = raw as RepairTyped;
    return {
      ...typed,
      packTypeId: typed.packTypeId === '' ? null : typed.packTypeId,
      pack: packTypedOf(typed.pack),
      promisedAt: promised(typed.promisedAt, zone),
    };
  });

export const newRepairForm = (zone: string) => z.pipe(wireOf(zone), repairSchema);
export const changeRepairForm = (zone: string) => z.pipe(wireOf(zone), changeRepairSchema);

export const repairNames = {
  vehicle: 'Vehicle',
  customerName: 'Customer',
  customerContact: 'Contact',
  promised: 'Promised',
  bay: 'Bay',
  people: 'People',
  groups: 'Groups',
  perModule: 'Groups per module',
  positions: 'Module of each group',
  bleed: 'Bleed current',
  aim: 'Aim after the fit',
  note: 'Note',
} as const;

/** The texts in one level, for what differs between two of them. */
export const flatTexts = (typed: RepairTyped, personName: (id: string) => string): Record<string, string> => ({
  vehicle: typed.vehicle,
  customerName: typed.customerName,
  customerContact: typed.customerContact,
  promised: typed.promisedAt.time.trim() === '' ? '' : `${typed.promisedAt.day} ${typed.promisedAt.time}`,
  bay: typed.bay,
  people: typed.personIds.map(personName).join(', '),
  groups: typed.pack.groupCount,
  perModule: typed.pack.groupsPerModule,
  positions: typed.pack.positionOfGroup,
  bleed: typed.pack.bleedAmps,
  aim: typed.pack.aimMillivolts,
  note: typed.note,
});
