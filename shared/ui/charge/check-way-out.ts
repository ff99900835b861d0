/** What to do where the numbers rule a charge out, its spare has moved, or its channel is taken. Pure. */
import type { ChargeDto, CheckCode } from '@/shared/contract/charge';
import { otherSparePath, replanPath } from './top-up';

export type WayOut =
  /** A new reading of the spare changes what the numbers say. */
  { kind: 'read-again'; title: string } | { kind: 'plan'; title: string; path: string };

/** Which way leads on from a check that the numbers rule out. */
const byCode: Partial<Record<CheckCode, 'read-again' | 'other-spare' | 'replan'>> = {
  temperature: 'read-again',
  polarity: 'read-again',
  condition: 'other-spare',
  ceiling: 'replan',
};

/** The way on from what is ruled out, moved or taken; null: nothing stands in the way but answers to come. */
export function wayOut(charge: ChargeDto): WayOut | null {
  const out = charge.checks.find((item) => item.by === 'ruled-out');
  if (out) {
    const way = byCode[out.code] ?? 'replan';
    if (way === 'read-again') return { kind: 'read-again', title: 'Read it again' };
    return way === 'other-spare'
      ? { kind: 'plan', title: 'Take another spare', path: otherSparePath(charge) }
      : { kind: 'plan', title: 'Plan another way', path: replanPath(charge) };
  }
  if (charge.planAgain) return { kind: 'plan', title: 'Plan it again', path: replanPath(charge) };
  const allYes = charge.checks.every((item) => item.answer === 'yes');
  return allYes && charge.startBlockedBy !== null
    ? { kind: 'plan', title: 'Plan another way', path: replanPath(charge) }
    : null;
}
