import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { BenchJob, BenchProblem, FillProblem, FillWork } from '@/calc/index';

interface Published {
  knapsack: { name: string; capacity: number; weights: number[]; values: number[]; optimum: number }[];
  parallel_machines_makespan: { machines: number; times: number[]; optimum: number; longest_first_gives: number }[];
  one_machine: [
    { jobs_time_weight: [number, number][]; optimum: number },
    { jobs_time_due: [number, number][]; optimum: number },
    { jobs_time_due: [number, number][]; optimum: number },
    { times: number[]; weights: number[]; due: number[]; optimum: number },
  ];
}

/** Small published instances with their optima; the file says where they are from. */
export const published = JSON.parse(
  readFileSync(path.join(import.meta.dirname, 'reference/scheduling-instances.json'), 'utf8'),
) as Published;

/** From now on, without end. */
export const always = [{ fromS: 0, toS: Infinity }];

/** A charge that any of the channels carries out in so long, with nothing before or after. */
export function benchJob(id: string, busyS: number, channels: number, over: Partial<BenchJob> = {}): BenchJob {
  return {
    id,
    dueS: null,
    weight: 1,
    alternatives: Array.from({ length: channels }, (_, channel) => ({
      channels: [channel],
      busyS,
      readyS: busyS,
      guardS: busyS,
      mayStart: always,
    })),
    ...over,
  };
}

/** Jobs on channels that nothing has yet. */
export const benchProblem = (channels: number, jobs: BenchJob[]): BenchProblem => ({
  taken: Array.from({ length: channels }, () => []),
  jobs,
});

export const fillWork = (id: string, over: Partial<FillWork> = {}): FillWork => ({
  id,
  likelyS: 1200,
  longS: 1800,
  weight: 1,
  personIds: ['A'],
  placeId: null,
  releaseS: 0,
  dueS: null,
  splittable: false,
  leastPartS: 600,
  ...over,
});

/** One person, one window from now on. */
export const fillProblem = (windowS: number, work: FillWork[], over: Partial<FillProblem> = {}): FillProblem => ({
  windows: [{ personId: 'A', fromS: 0, toS: windowS, lookInsS: [] }],
  work,
  placesTaken: {},
  lookInS: 120,
  ...over,
});
