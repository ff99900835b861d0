/** The three facts of the waits that changed most from one week to the next; pure. */
import { FEW_CHARGES } from '@/shared/contract/waits';
import type { PlanRow, SpreadRow, StageRow } from '../../repositories/wait-figures.repository';
import { durationText } from '../charge-words';

export interface WeekFigures {
  totals: SpreadRow & PlanRow;
  stages: { name: string; row: StageRow }[];
  /** By module type. */
  types: { name: string; row: SpreadRow }[];
}

interface Fact {
  text: string;
  /** How many times as much, or as little, on a scale on which both count alike. */
  size: number;
}

const FACTS = 3;
/** Added to both sides, so that from 1 min to 3 is no great change: what is small stays small, ms. */
const SMALL_MS = 10 * 60_000;

/** Three sentences, the greatest change first; fewer where fewer figures have five charges in both weeks. */
export function digestFacts(last: WeekFigures, before: WeekFigures): string[] {
  const [now, then] = [last.totals, before.totals];
  const counted = `${charges(now.charges)} became ready, after ${then.charges} in the week before.`;
  if (Math.min(now.charges, then.charges) < FEW_CHARGES)
    return [counted, `Fewer than ${FEW_CHARGES} in a week say too little to compare it.`];
  const found: (Fact | null)[] = [
    { text: counted, size: Math.abs(Math.log(now.charges / then.charges)) },
    timeFact('Working hours lost in waiting:', now.lostMs, then.lostMs),
    timeFact('Working hours of waiting used for other work:', now.usedMs, then.usedMs),
    timeFact('Half of the waits were over within', now.medianMs, then.medianMs),
    timeFact('Nine of ten waits were over within', now.p90Ms, then.p90Ms),
    timeFact('Half of the finishes lay off the plan by at most', now.errorMs, then.errorMs),
    ...paired(last.stages, before.stages).map(({ name, now: one, then: other }) =>
      timeFact(`${name}, the middle of it took`, one.medianMs, other.medianMs),
    ),
    ...paired(last.types, before.types).map(({ name, now: one, then: other }) =>
      timeFact(`${name}: half of the waits were over within`, one.medianMs, other.medianMs),
    ),
  ];
  return found
    .filter((fact) => fact !== null)
    .sort((one, other) => other.size - one.size)
    .slice(0, FACTS)
    .map(({ text }) => text);
}

/** Those of both weeks with enough charges in each. */
const paired = <Row extends { charges: number }>(
  last: readonly { name: string; row: Row }[],
  before: readonly { name: string; row: Row }[],
): { name: string; now: Row; then: Row }[] =>
  last.flatMap(({ name, row }) => {
    const then = before.find((one) => one.name === name)?.row;
    return then && Math.min(row.charges, then.charges) >= FEW_CHARGES ? [{ name, now: row, then }] : [];
  });

function timeFact(name: string, now: number | null, then: number | null): Fact | null {
  if (now === null || then === null) return null;
  const difference = now - then;
  const size = Math.abs(Math.log((now + SMALL_MS) / (then + SMALL_MS)));
  const change =
    Math.round(difference / 60_000) === 0
      ? 'as in the week before'
      : `${lengthText(Math.abs(difference))} ${difference < 0 ? 'less' : 'more'} than in the week before`;
  return { text: `${name} ${lengthText(now)}, ${change}.`, size };
}

const charges = (count: number): string => (count === 1 ? '1 charge' : `${count} charges`);

const DAY_MS = 86_400_000;
/** Sums of a week are hours, however many. */
const lengthText = (ms: number): string =>
  ms < DAY_MS ? durationText(ms / 1000) : `${Math.round(ms / 3_600_000)}\u00a0h`;
