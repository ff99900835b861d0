/** Words and settings of other work, free of its schemas: the bench needs no more of it. */

export const workPriorities = ['low', 'usual', 'high', 'urgent'] as const;
export type WorkPriority = (typeof workPriorities)[number];

export const workPriorityNames: Record<WorkPriority, string> = {
  low: 'Low',
  usual: 'Usual',
  high: 'High',
  urgent: 'Urgent',
};

/** What a minute of it is worth when waits are filled: each step twice the one before. A setting of ours. */
export const workWeights: Record<WorkPriority, number> = { low: 1, usual: 2, high: 4, urgent: 8 };

/** A part of work that is split is at least this long, min: below it, fetching and clearing away take more. A guess. */
export const leastPartMinutes = 15;
