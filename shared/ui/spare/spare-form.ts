/** Forms of the stock: what is typed, and the contract's schemas made ready for it. */
import * as z from 'zod/mini';
import { groupVoltsProblems, type TypeWindow } from '@/shared/contract/group-volts';
import {
  newSpareSchema,
  spareReadingSchema,
  spareSchema,
  type NewSpareInput,
  type SpareDto,
  type SpareInput,
  type SpareReadingInput,
} from '@/shared/contract/spare';
import { parseTimeOfDay } from '../format/parse';
import { instantOfDay } from '../format/zone';

/** As typed. '' is not chosen or left empty. */
export interface SpareTyped {
  label: string;
  moduleTypeId: string;
  shelfPlace: string;
  capacityAh: string;
  healthPercent: string;
  capacitySource: string;
  condition: string;
  note: string;
}

export interface ReadingTyped {
  groupVolts: string[];
  celsius: string;
  /** null: not known, which somebody has to say. '': not chosen yet. */
  meterId: string | null;
  note: string;
}

export interface NewSpareTyped extends SpareTyped {
  reading: ReadingTyped;
}

/** A reading entered later may be of an earlier time. */
export interface DatedReadingTyped extends ReadingTyped {
  day: string;
  time: string;
}

export const emptyReading = (groups: number, meterId: string | null): ReadingTyped => ({
  groupVolts: Array.from({ length: groups }, () => ''),
  celsius: '',
  meterId,
  note: '',
});

/** No condition is preselected: somebody has to have looked. */
export const emptySpare: SpareTyped = {
  label: '',
  moduleTypeId: '',
  shelfPlace: '',
  capacityAh: '',
  healthPercent: '',
  capacitySource: 'label',
  condition: '',
  note: '',
};

const text = (value: number | string | null): string => (value === null ? '' : String(value));

export const typedOf = (spare: SpareDto): SpareTyped => ({
  label: spare.label,
  moduleTypeId: spare.moduleTypeId,
  shelfPlace: text(spare.shelfPlace),
  capacityAh: text(spare.capacityAh),
  healthPercent: text(spare.healthPercent),
  capacitySource: spare.capacitySource,
  condition: spare.condition,
  note: text(spare.note),
});

/** The voltages resized to a type's groups; what was typed for groups that stay is kept. */
export const resized = (typed: readonly string[], groups: number): string[] =>
  Array.from({ length: groups }, (_, index) => typed[index] ?? '');

type Schema<Output> = z.ZodMiniType<Output, unknown>;
interface Issues {
  issues: unknown[];
}

/** Puts sentences of the contract at their fields. */
function put(context: Issues, input: unknown, problems: Record<string, string>): void {
  for (const [path, message] of Object.entries(problems))
    context.issues.push({
      code: 'custom',
      message,
      input,
      path: path.split('.').map((part) => (/^\d+$/.test(part) ? Number(part) : part)),
    });
}

/** A new spare, its voltages judged against the type that is chosen. */
export const newSpareForm = (typeOf: (id: string) => TypeWindow | undefined): Schema<NewSpareInput> =>
  newSpareSchema.check((context) => {
    const type = typeOf(context.value.moduleTypeId);
    if (type)
      put(
        context,
        context.value.reading,
        groupVoltsProblems(context.value.reading.groupVolts, type, 'reading.groupVolts'),
      );
  }) as Schema<NewSpareInput>;

export const spareForm = spareSchema as Schema<SpareInput>;

export type DatedReading = SpareReadingInput & { day: string; time: string };

/** A reading of a known type, with the time it was taken; an empty time is now. */
export const readingForm = (type: TypeWindow, clock: { zone: string; now: () => number }): Schema<DatedReading> =>
  z.object({ ...spareReadingSchema.shape, day: z.string(), time: z.string() }).check((context) => {
    put(context, context.value, {
      ...groupVoltsProblems(context.value.groupVolts, type, 'groupVolts'),
      ...timeProblem(context.value, clock),
    });
  }) as Schema<DatedReading>;

function timeProblem(
  { day, time }: { day: string; time: string },
  { zone, now }: { zone: string; now: () => number },
): Record<string, string> {
  if (time.trim() === '') return {};
  const minutes = parseTimeOfDay(time);
  if (minutes === null) return { time: 'This is no time. Type it like 14:05.' };
  if (instantOfDay(day, minutes, zone) > now() + 60_000)
    return { time: 'This time is still to come. Type when it was read.' };
  return {};
}

/** The request of a dated reading. */
export function readingInput({ day, time, ...reading }: DatedReading, zone: string): SpareReadingInput {
  const minutes = parseTimeOfDay(time);
  return minutes === null ? reading : { ...reading, at: new Date(instantOfDay(day, minutes, zone)).toISOString() };
}
