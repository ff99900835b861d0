import type { SolveLimits } from './bench-types';

const ASK_EVERY = 256;

/** What a search may still spend. */
export interface SearchBudget {
  /** Counts a node, or so many; false: stop and give the best so far. */
  spend: (count?: number) => boolean;
  /** Whether it was told to stop, or has nothing left. */
  over: () => boolean;
}

/** A budget of `limits.maxNodes` nodes, or of `usualNodes` where nothing is said, that also ends when `shouldStop` says so. */
export function searchBudget(limits: SolveLimits, usualNodes: number): SearchBudget {
  const most = limits.maxNodes ?? usualNodes;
  let nodes = 0;
  let askAt = 0;
  let stopped = false;
  const over = () => stopped || nodes >= most;
  return {
    over,
    spend: (count = 1) => {
      if (over()) return false;
      nodes += count;
      if (nodes < askAt) return true;
      askAt = nodes + ASK_EVERY;
      stopped = limits.shouldStop?.() ?? false;
      return !stopped;
    },
  };
}

/** So many nodes at most of another budget. */
export function budgetPart(whole: SearchBudget, nodes: number): SearchBudget {
  const part = searchBudget({ maxNodes: nodes }, nodes);
  return { over: () => part.over() || whole.over(), spend: (count) => part.spend(count) && whole.spend(count) };
}
