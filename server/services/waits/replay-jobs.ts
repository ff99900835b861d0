import type { ReplayJobDto } from '@/shared/contract/waits-replay';
import { conflict, notFound } from '../../errors/domain-error';
import { newId } from '../ids';
import { toInstant } from '../instants';
import { jobControl, newControl, type JobControl } from './job-control';

/** At once for one workshop: the thread does one after the other. */
const MOST_GOING_ON = 3;
/** Answers kept of one workshop, and for how long, ms. */
const MOST_KEPT = 20;
const KEPT_MS = 30 * 60_000;

type Result = Pick<ReplayJobDto, 'whatIf' | 'shelf' | 'channels'>;
const noResult: Result = { whatIf: null, shelf: null, channels: null };

interface Job {
  id: string;
  workshopId: string;
  kind: ReplayJobDto['kind'];
  beganAt: number;
  control: JobControl;
  /** Null while it goes on. */
  over: 'done' | 'cancelled' | 'failed' | null;
  result: Result;
  problem: string | null;
}

/** A reason that a person can do something about. */
export class ReplayProblem extends Error {}

/**
 * Calculations over the history that go on beside the request which began them. Kept in memory: what a restart ends is
 * asked again in seconds.
 */
export class ReplayJobs {
  private readonly jobs = new Map<string, Job>();

  /**
   * Begins one.
   * @param work gives the result; null: it was told to stop
   * @throws DomainError 409 where the workshop has three going on
   */
  begin(
    workshopId: string,
    kind: Job['kind'],
    now: number,
    work: (control: SharedArrayBuffer) => Promise<Partial<Result> | null>,
    /** Of what went wrong otherwise. */
    failed: (error: unknown) => void,
  ): ReplayJobDto {
    this.forgetOld(now);
    const own = [...this.jobs.values()].filter((job) => job.workshopId === workshopId);
    if (own.filter(({ over }) => over === null).length >= MOST_GOING_ON)
      throw conflict('replays-going-on', 'Three calculations go on already. Cancel one, or wait until one is done.');
    const ended = own.filter(({ over }) => over !== null);
    for (const { id } of ended.slice(0, Math.max(0, own.length - MOST_KEPT + 1))) this.jobs.delete(id);
    const control = newControl();
    const job: Job = {
      ...{ id: newId(), workshopId, kind, beganAt: now, control: jobControl(control) },
      ...{ over: null, result: noResult, problem: null },
    };
    this.jobs.set(job.id, job);
    void work(control).then(
      (result) => {
        if (job.over !== null) return;
        job.over = result === null ? 'cancelled' : 'done';
        job.result = { ...noResult, ...result };
      },
      (error: unknown) => {
        if (job.over !== null) return;
        job.over = 'failed';
        job.problem = error instanceof ReplayProblem ? error.message : 'It went wrong here. Try again.';
        if (!(error instanceof ReplayProblem)) failed(error);
      },
    );
    return jobDto(job);
  }

  /** @throws DomainError 404 where the workshop has no such one, or has it no more */
  find(workshopId: string, id: string): ReplayJobDto {
    return jobDto(this.own(workshopId, id));
  }

  /** Ends one; one that is over stays as it is. @throws DomainError 404 */
  cancel(workshopId: string, id: string): ReplayJobDto {
    const job = this.own(workshopId, id);
    job.control.stop();
    job.over ??= 'cancelled';
    return jobDto(job);
  }

  private own(workshopId: string, id: string): Job {
    const job = this.jobs.get(id);
    if (!job || job.workshopId !== workshopId) throw notFound('calculation');
    return job;
  }

  private forgetOld(now: number): void {
    for (const { id, over, beganAt } of this.jobs.values())
      if (over !== null && beganAt < now - KEPT_MS) this.jobs.delete(id);
  }
}

const jobDto = ({ id, kind, over, control, beganAt, result, problem }: Job): ReplayJobDto => ({
  id,
  kind,
  state: over ?? (control.isBegun() ? 'running' : 'queued'),
  beganAt: toInstant(beganAt),
  progress: over === 'done' ? 1 : control.progress(),
  ...result,
  problem,
});
