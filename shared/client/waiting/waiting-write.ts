/** What is done at the bench without a connection, and how it is sent once it is back. */
import type { AnswerCheckInput, ReadingInput, RestCheckInput } from '@/shared/contract/charge';
import type { Instant } from '@/shared/contract/common';

/** Why the server did not take it; such a one is not sent again by itself. */
export interface Refusal {
  /** The server's code; 'clock': the device's clock was set meanwhile; 'too-old': it has waited for weeks. */
  code: string;
  /** In words, with what is there now. */
  text: string;
  /** 'clock': the instant by the clock as it is set now. */
  otherAt?: Instant;
}

/** What is sent of each kind; `at` says when it was done, not when it is sent. */
export interface WaitingInputs {
  reading: Partial<ReadingInput> & { at: Instant };
  'look-in': { at: Instant; note?: string | null };
  'rest-check': RestCheckInput & { at: Instant };
  answer: AnswerCheckInput & { at: Instant };
}
export type WaitingKind = keyof WaitingInputs;

interface Waiting<Kind extends WaitingKind> {
  kind: Kind;
  input: WaitingInputs[Kind];
  /** Also its idempotency key. */
  key: string;
  chargeId: string;
  /** Repair or number of the charge: the list names it without asking. */
  title: string;
  /** Server minus device when it was done, ms. */
  offsetMs: number;
  /** Device's epoch ms at which it was put here. */
  keptAt: number;
  refused: Refusal | null;
}
export type WaitingReading = Waiting<'reading'>;
export type WaitingLookIn = Waiting<'look-in'>;
/** Revision of the charge it was typed at, and how many checks it had then. */
export type WaitingRestCheck = Waiting<'rest-check'> & { rev: number; checks: number };
/** `said`: the check and the answer in the words of the sheet. */
export type WaitingAnswer = Waiting<'answer'> & { said: string };
export type WaitingWrite = WaitingReading | WaitingLookIn | WaitingRestCheck | WaitingAnswer;

type Draft<Write extends WaitingWrite> = Omit<Write, 'key' | 'offsetMs' | 'keptAt' | 'refused' | 'input'> & {
  input: Omit<Write['input'], 'at'> & { at?: Instant };
};
/** As a form gives it: when it was done is now, where nothing else is said. */
export type WaitingDraft =
  Draft<WaitingReading> | Draft<WaitingLookIn> | Draft<WaitingRestCheck> | Draft<WaitingAnswer>;

/** What is typed anew in the place of one that waits; a check with the revision it is typed at. */
export interface WaitingChange {
  input: WaitingInputs[WaitingKind];
  rev?: number;
  checks?: number;
}

const acts: Record<WaitingKind, string> = {
  reading: 'readings',
  'look-in': 'look-ins',
  'rest-check': 'rest-check',
  answer: 'checks',
};

/** Where it goes, and the revision it needs. */
export const pathOf = (write: WaitingWrite): string => `/charges/${write.chargeId}/${acts[write.kind]}`;
export const revOf = (write: WaitingWrite): number | undefined => (write.kind === 'rest-check' ? write.rev : undefined);

/** Whether it will still be sent by itself. */
export const isUnsent = (write: WaitingWrite): boolean => write.refused === null;
