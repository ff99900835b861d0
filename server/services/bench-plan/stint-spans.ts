import type { WorkStint } from '../../entities/work-stint';
import type { Stretch } from './spans';

/** When somebody is at a piece of work: as planned until it is begun, then as it was; one that goes on has not ended yet. */
export function stintSpan({ state, fromAt, toAt, begunAt, endedAt }: WorkStint, now: number): Stretch {
  if (state === 'taken') return { from: fromAt, to: toAt };
  const from = begunAt ?? fromAt;
  if (endedAt !== null) return { from, to: Math.max(from, endedAt) };
  return { from, to: Math.max(toAt, now) };
}
