/** What waits on this device for the connection, as the screens show it. */
import type { AnswerCheckInput, CheckItemDto, ReadingInput } from '@/shared/contract/charge';
import type { Instant, PersonRef } from '@/shared/contract/common';
import type { LocaleMarks } from '../format/marks';
import { voltsNumber } from '../format/quantities';

export interface WaitingRefusal {
  code: string;
  text: string;
  /** The device's clock was set meanwhile: when it was by the clock as it is now. */
  otherAt?: Instant;
}

interface Common {
  key: string;
  chargeId: string;
  title: string;
  refused: WaitingRefusal | null;
}
export type WaitingItem = Common &
  (
    | { kind: 'reading'; input: Partial<ReadingInput> & { at: Instant } }
    | { kind: 'look-in'; input: { at: Instant; note?: string | null } }
    | { kind: 'rest-check'; input: { at: Instant; groupVolts: number[] } }
    | { kind: 'answer'; input: AnswerCheckInput & { at: Instant }; said: string }
  );
export type WaitingReadingItem = Extract<WaitingItem, { kind: 'reading' }>;

/** What can be done with what waits. */
export interface WaitingActs {
  onRemove: (key: string) => void;
  /** Opens the form it was typed in. */
  onEdit: (item: WaitingItem) => void;
  /** A person says when it was, or has it sent once more as it is. */
  onSettle: (key: string, at?: Instant) => void;
}

/** Where a kind is typed anew; null: there is nothing to type, only to remove. */
export function editPath(item: WaitingItem): string | null {
  if (item.kind === 'reading') return `/charges/${item.chargeId}/log?waiting=${item.key}`;
  if (item.kind === 'rest-check') return `/charges/${item.chargeId}/check?waiting=${item.key}`;
  if (item.kind === 'answer') return `/charges/${item.chargeId}/checks`;
  return null;
}

/** 'Looked in: clips cool', 'Check after rest: 3.957, 3.958 V'. */
export function waitingWords(item: WaitingItem, marks: LocaleMarks): string {
  switch (item.kind) {
    case 'reading':
      return 'Reading';
    case 'look-in':
      return item.input.note ? `Looked in: ${item.input.note}` : 'Looked in';
    case 'rest-check':
      return `Check after rest: ${item.input.groupVolts.map((volts) => voltsNumber(volts, marks)).join(', ')}\u00a0V`;
    case 'answer':
      return item.said;
  }
}

/** The checks with what was answered here and is not sent yet. */
export const withWaitingAnswers = (
  checks: readonly CheckItemDto[],
  waiting: readonly WaitingItem[],
  by: PersonRef,
): CheckItemDto[] =>
  checks.map((item) => {
    const given = waiting.findLast(
      (one) => one.kind === 'answer' && one.refused === null && one.input.code === item.code,
    );
    return given?.kind === 'answer' && item.by === 'person'
      ? { ...item, answer: given.input.answer, answeredBy: by, answeredAt: given.input.at, note: 'kept on this device' }
      : item;
  });
