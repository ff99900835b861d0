/** A pack reading as it is being entered, and what is sent of it. Pure. */
import { groupList } from '../group-volts/group-form';
import { packReadingSchema, type PackReadingInput, type ReadingStage } from '@/shared/contract/pack-reading';
import type { Separator, VoltsUnit } from './reading-text';

export type Way = 'type' | 'paste' | 'upload';

export interface ReadingTyped {
  way: Way;
  /** One for each group, as typed. */
  typed: string[];
  /** Group in the hand, 0-based. */
  present: number;
  pasted: string;
  file: { name: string; text: string } | null;
  separator: Separator | null;
  unit: VoltsUnit | null;
  stage: ReadingStage;
  balanceCount: string;
  packVolts: string;
  celsius: string;
  restedMinutes: string;
  /** Id of a meter; '': the pack's own instrument. */
  meterId: string;
  instrument: string;
  note: string;
}

export const emptyReadingTyped = (
  groupCount: number,
  stage: ReadingStage,
  balanceCount: number | null,
): ReadingTyped => ({
  ...{ way: 'type', typed: Array.from({ length: groupCount }, () => ''), present: 0, pasted: '', file: null },
  ...{ separator: null, unit: null, stage, balanceCount: String(balanceCount ?? 1) },
  ...{ packVolts: '', celsius: '', restedMinutes: '', meterId: '', instrument: '', note: '' },
});

export const stageNames: Record<ReadingStage, string> = {
  arrival: 'Arrival',
  'after-fit': 'After the fit, before the lid is sealed',
  'after-balance': 'After a balance charge',
};

/** The stage that comes next: the first reading is the arrival's, the second the one after the fit. */
export function nextStage(
  readings: readonly { stage: ReadingStage; balanceCount: number | null; setAside: unknown }[],
  fitted: boolean,
): { stage: ReadingStage; balanceCount: number | null } {
  const counted = readings.filter(({ setAside }) => setAside === null);
  if (!fitted && !counted.some(({ stage }) => stage !== 'arrival')) return { stage: 'arrival', balanceCount: null };
  if (!counted.some(({ stage }) => stage === 'after-fit')) return { stage: 'after-fit', balanceCount: null };
  const last = Math.max(0, ...counted.map(({ balanceCount }) => balanceCount ?? 0));
  return { stage: 'after-balance', balanceCount: Math.min(99, last + 1) };
}

/** 'G5 and G7 are open.'; null: every group is typed. Groups 0-based. */
export function openSentence(open: readonly number[]): string | null {
  if (open.length === 0) return null;
  return `${groupList(open.map((group) => group + 1))} ${open.length === 1 ? 'is' : 'are'} open. Type ${open.length === 1 ? 'it' : 'them'} before you save.`;
}

export type Checked = { ok: true; input: PackReadingInput } | { ok: false; fields: Record<string, string> };

/** The reading as it is sent, or the sentence of each field that is wrong. */
export function checkedReading(typed: ReadingTyped, groupVolts: readonly (string | number)[]): Checked {
  const balanced = typed.stage === 'after-balance';
  const count = Number(typed.balanceCount);
  if (balanced && !(Number.isInteger(count) && count >= 1 && count <= 99))
    return { ok: false, fields: { balanceCount: 'Balance charges are counted from 1 to 99.' } };
  const read = packReadingSchema.safeParse({
    stage: typed.stage,
    balanceCount: balanced ? count : null,
    groupVolts: [...groupVolts],
    packVolts: typed.packVolts,
    celsius: typed.celsius,
    restedMinutes: typed.restedMinutes,
    meterId: typed.meterId || null,
    instrument: typed.meterId ? null : typed.instrument,
    source: ({ type: 'typed', paste: 'pasted', upload: 'file' } as const)[typed.way],
    fileName: typed.way === 'upload' ? (typed.file?.name.slice(-120) ?? null) : null,
    note: typed.note,
  });
  if (read.success) return { ok: true, input: read.data };
  const fields: Record<string, string> = {};
  for (const { path, message } of read.error.issues) fields[path.join('.')] ??= message;
  return { ok: false, fields };
}
