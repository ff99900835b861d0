/** Everything that is done to a charge from its live screen, with one busy flag and one sentence of what went wrong. */
import { useState } from 'react';
import type { ChargeDto } from '@/shared/contract/charge';
import { isConflict, isProblem, sentenceOf } from './api-problem';
import {
  useCurrentOff,
  useDropCharge,
  useFitCharge,
  useHandOver,
  useHoldCharge,
  useNextStep,
  useQueueCharge,
  useResumeCharge,
  useShelveCharge,
  useStopCharge,
} from './charges';
import { useWaitingWrite } from './waiting/waiting';

/** What somebody else has made of it; null where the error brings none. */
const presentOf = (error: unknown): Partial<ChargeDto> | null =>
  isConflict(error) && typeof error.present === 'object' && error.present !== null
    ? (error.present as Partial<ChargeDto>)
    : null;

/** Why an act was refused; after somebody else's the server says who did what and when, and that state is on screen. */
export function actProblem(error: unknown): string {
  if (isProblem(error) && Object.keys(error.fields).length > 0) return Object.values(error.fields).join(' ');
  return isConflict(error) && error.status === 412
    ? `${sentenceOf(error)} Look at it again, then decide.`
    : sentenceOf(error);
}

/**
 * @param done after an act was taken
 * @param onStale after somebody else was first: read the charge again
 */
export function useChargeActs(charge: ChargeDto, done: () => void, onStale: () => void) {
  const stop = useStopCharge();
  const hold = useHoldCharge();
  const resume = useResumeCharge();
  const off = useCurrentOff();
  const next = useNextStep();
  const lookIn = useWaitingWrite();
  const handOver = useHandOver();
  const fit = useFitCharge();
  const shelve = useShelveCharge();
  const drop = useDropCharge();
  const queue = useQueueCharge();
  const [problem, setProblem] = useState<string | null>(null);
  const busy = [stop, hold, resume, off, next, lookIn, handOver, fit, shelve, drop, queue].some(
    (write) => write.isPending,
  );
  const base = { id: charge.id, rev: charge.rev };
  const outcome = {
    onSuccess: () => {
      setProblem(null);
      done();
    },
    onError: (error: unknown) => {
      setProblem(actProblem(error));
      if (presentOf(error)) onStale();
    },
  };
  const iso = (at: number | undefined) => (at === undefined ? undefined : new Date(at).toISOString());
  return {
    problem,
    busy,
    forget: () => setProblem(null),
    stop: (input: { reason: string; quarantine: boolean }) => stop.mutate({ ...base, ...input }, outcome),
    hold: (reason: string) => hold.mutate({ ...base, reason }, outcome),
    resume: () => resume.mutate(base, outcome),
    /** @param at epoch ms; left out: now */
    currentOff: (at?: number) => off.mutate({ ...base, at: iso(at) }, outcome),
    nextStep: () => next.mutate(base, outcome),
    /** Waits on this device where there is no connection. */
    lookIn: () => lookIn.mutate({ kind: 'look-in', chargeId: charge.id, title: charge.title, input: {} }, outcome),
    handOver: (personId: string) => handOver.mutate({ ...base, personId }, outcome),
    fit: (note: string | null) => fit.mutate({ ...base, note }, outcome),
    shelve: (shelfPlace: string | null) => shelve.mutate({ ...base, shelfPlace }, outcome),
    queue: (at: number) => queue.mutate({ ...base, clipOnAt: new Date(at).toISOString() }, outcome),
    drop: (after: () => void) => drop.mutate(base, { ...outcome, onSuccess: after }),
  };
}
