/** The form of a reading: what is typed, and what is sent of it. The same sentences as the server's. */
import * as z from 'zod/mini';
import { correctReadingSchema, type ReadingDto, type ReadingInput } from '@/shared/contract/charge';
import { groupVoltsProblem, type TypeWindow } from '@/shared/contract/group-volts';
import type { Direction } from '@/shared/contract/plan';
import { ampsProblem } from '@/shared/contract/reading-amps';
import { clock } from '../format/clock';
import type { LocaleMarks } from '../format/marks';
import { parseTimeOfDay, timeOfDayText } from '../format/parse';
import { addDays, dayOf, instantOfDay } from '../format/zone';
import { groupList, openGroups } from '../group-volts/group-form';
import { latestInstant, noTimeSentence } from './said-at';

export interface LogValues {
  terminalVolts: string;
  amps: string;
  celsius: string;
  groupVolts: string[];
  /** null: read off the charger itself. */
  meterId: string | null;
  /** Where the clips were read with a meter: 'supply', 'module', or '' where nobody says. */
  takenAt: string;
  /** Time of day; empty: now. */
  at: string;
  /** Of a correction only. */
  reason: string;
}

export type LogOutput = Partial<ReadingInput> & { reason?: string | null };

export const emptyLog = (groups: number): LogValues => ({
  terminalVolts: '',
  amps: '',
  celsius: '',
  groupVolts: Array.from({ length: groups }, () => ''),
  meterId: null,
  takenAt: '',
  at: '',
  reason: '',
});

/** What was read, of a reading that is kept or still waits on this device. */
export type AsRead = Pick<
  ReadingDto,
  'at' | 'terminalVolts' | 'amps' | 'celsius' | 'groupVolts' | 'meterId' | 'takenAt'
>;

/** A reading as it was typed, to be corrected. */
export function logOf(reading: AsRead, groups: number, zone: string, marks: LocaleMarks): LogValues {
  const text = (value: number | null) => (value === null ? '' : String(value).replace('.', marks.decimal));
  return {
    terminalVolts: text(reading.terminalVolts),
    amps: text(reading.amps),
    celsius: text(reading.celsius),
    groupVolts: Array.from({ length: groups }, (_, group) => text(reading.groupVolts?.[group] ?? null)),
    meterId: reading.meterId,
    takenAt: reading.takenAt ?? '',
    at: clock(Date.parse(reading.at), zone, marks),
    reason: '',
  };
}

/** Where the form keeps that nothing was typed at all: no field is to blame, and leaving one says nothing of it. */
export const nothingTyped = 'nothing';

/** While current flows a group may stand this far over its limit at the clips, V; beyond it is a slip. As on the server. */
const underCurrentVolts = 0.5;

/**
 * Reads the typed values. Groups are all typed or all left empty; one that is open is named.
 *
 * @param now server's epoch ms at the moment of sending
 * @param atOf the instant a time of day means; a correction keeps its day
 */
export const logSchema = ({
  window,
  direction,
  zone,
  now,
  atOf = (text) => latestInstant(text, zone, now()),
}: {
  window: TypeWindow;
  /** Of the step under way. */
  direction: Direction;
  zone: string;
  now: () => number;
  atOf?: (text: string) => number | null;
}) =>
  z.transform((raw: unknown, context): LogOutput => {
    const values = raw as LogValues;
    const issue = (message: string, ...path: (string | number)[]) =>
      context.issues.push({ code: 'custom', message, input: raw, path });
    const open = openGroups(values.groupVolts);
    const noGroups = open.length === values.groupVolts.length;
    if (open.length > 0 && !noGroups)
      for (const number of open)
        issue(
          `${groupList(open)} ${open.length === 1 ? 'is' : 'are'} open. Type all groups, or none.`,
          'groupVolts',
          number - 1,
        );
    const instant = values.at.trim() === '' ? undefined : atOf(values.at);
    if (instant === null) issue(noTimeSentence, 'at');
    const read = correctReadingSchema.safeParse({
      ...values,
      // The charger's own display is known to the server: it reads where the channel senses.
      takenAt: (values.meterId ?? null) === null ? undefined : values.takenAt || null,
      groupVolts: noGroups || open.length > 0 ? null : values.groupVolts,
      at: instant == null ? undefined : new Date(instant).toISOString(),
    });
    if (!read.success) {
      for (const found of read.error.issues) context.issues.push({ ...found, input: raw } as never);
      return {};
    }
    const { terminalVolts, amps, celsius, groupVolts } = read.data;
    if (
      terminalVolts === null &&
      amps === null &&
      celsius === null &&
      (groupVolts ?? null) === null &&
      open.length === values.groupVolts.length
    )
      issue('Type at least one number that was read.', nothingTyped);
    const wrongWay = amps === null ? null : ampsProblem(amps, direction);
    if (wrongWay !== null) issue(wrongWay, 'amps');
    groupVolts?.forEach((volts, group) => {
      if (volts <= window.chargeLimitVolts + underCurrentVolts) return;
      const problem = groupVoltsProblem(volts, window);
      if (problem !== null) issue(problem, 'groupVolts', group);
    });
    return read.data;
  });

/** A correction keeps the day of its reading: the time of day nearest to when it was. */
export const correctedInstant =
  (reading: Pick<AsRead, 'at'>, zone: string) =>
  (text: string): number | null => {
    const minutes = parseTimeOfDay(text);
    if (minutes === null) return null;
    const was = Date.parse(reading.at);
    // The typed minute is the old one: the second is kept too, so that nothing moves.
    if (clock(was, zone) === timeOfDayText(minutes)) return was;
    const day = dayOf(was, zone);
    const near = [-1, 0, 1].map((shift) => instantOfDay(addDays(day, shift), minutes, zone));
    return near.reduce((best, at) => (Math.abs(at - was) < Math.abs(best - was) ? at : best));
  };
