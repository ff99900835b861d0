import type { SolveLimits } from './bench-types';

const ASK_EVERY = 256;

/** What a search may still spend. */
export interface SearchBudget {
  /** Counts one node; false: stop and give the best so far. */
  spend: () => boolean;
  /** Whether it was told to stop, or has nothing left. */
  over: () => boolean;
}

/** A budget of `limits.maxNodes` nodes, or of `usualNodes` where nothing is said, that also ends when `shouldStop` says so. */
export function searchBudget(limits: SolveLimits, usualNodes: number): SearchBudget {
  const most = limits.maxNodes ?? usualNodes;
  let nodes = 0;
  let stopped = false;
  const over = () => stopped || nodes >= most;
  return {
    over,
    spend: () => {
      if (over()) return false;
      nodes += 1;
      if (nodes % ASK_EVERY === 1 && limits.shouldStop?.()) stopped = true;
      return !stopped;
    },
  };
}
