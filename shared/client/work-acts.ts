/** Everything that is done with a piece of other work, with one busy flag and one sentence of what went wrong. */
import { useState } from 'react';
import type { StintDto, TakeWorkInput, WorkDto } from '@/shared/contract/work';
import { isProblem, sentenceOf } from './api-problem';
import { useBeginStint, useDropWork, useEndStint, useGiveBack, useReopenWork, useTakeWork } from './work';

/** Why an act was refused; sentences at fields in place of the general one. */
const workProblem = (error: unknown): string =>
  isProblem(error) && Object.keys(error.fields).length > 0 ? Object.values(error.fields).join(' ') : sentenceOf(error);

/** @param onRefused after a refusal: somebody else may have been first, so what is shown is read again */
export function useWorkActs(onRefused: () => void = () => {}) {
  const take = useTakeWork();
  const begin = useBeginStint();
  const end = useEndStint();
  const giveBack = useGiveBack();
  const drop = useDropWork();
  const reopen = useReopenWork();
  const [refused, setRefused] = useState<{ workId: string; text: string; error: Error } | null>(null);
  const writes = [take, begin, end, giveBack, drop, reopen];
  const running = writes.find(({ isPending }) => isPending);
  const outcome = (workId: string, done?: (work: WorkDto) => void) => ({
    onSuccess: (work: WorkDto) => {
      setRefused(null);
      done?.(work);
    },
    onError: (error: Error) => {
      setRefused({ workId, text: workProblem(error), error });
      onRefused();
    },
  });
  return {
    busy: running !== undefined,
    /** Which piece the act under way is about. */
    busyWith: running?.variables?.id ?? null,
    /** Why the last act was refused, and on which piece. */
    refused,
    forget: () => setRefused(null),
    take: (id: string, input: TakeWorkInput, done?: (work: WorkDto) => void) =>
      take.mutate({ id, ...input }, outcome(id, done)),
    begin: (id: string, stintId: string, done?: (work: WorkDto) => void) =>
      begin.mutate({ id, stintId }, outcome(id, done)),
    /** @param minutesLeft of the likely estimate; 0: the work is done */
    end: (id: string, stintId: string, minutesLeft: number, done?: (work: WorkDto) => void) =>
      end.mutate({ id, stintId, minutesLeft }, outcome(id, done)),
    giveBack: (id: string, stintId: string, done?: (work: WorkDto) => void) =>
      giveBack.mutate({ id, stintId }, outcome(id, done)),
    drop: (id: string, reason: string, done?: (work: WorkDto) => void) =>
      drop.mutate({ id, reason }, outcome(id, done)),
    reopen: (id: string, done?: (work: WorkDto) => void) => reopen.mutate({ id }, outcome(id, done)),
  };
}
export type WorkActs = ReturnType<typeof useWorkActs>;

/** The stint that an act has made: the one that was not there before. */
export const newStint = (before: Pick<WorkDto, 'stints'>, after: Pick<WorkDto, 'stints'>): StintDto | null =>
  after.stints.find(({ id }) => !before.stints.some((known) => known.id === id)) ?? null;
