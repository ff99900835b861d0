/** The order in which charges stand on bench and wall (look: §5, §11). */
import type { ChargeCardDto } from '@/shared/contract/charge';
import { READY_ON_WALL_MS } from './charge-due';
import { LOOK_IN_WINDOW_MS } from './charge-look-ins';

const instant = (iso: string | null): number => (iso === null ? Infinity : Date.parse(iso));
const likely = (card: ChargeCardDto): number => instant(card.ready?.likely ?? null);

type Key = [group: number, at: number, number: string];

const sorted = (cards: readonly ChargeCardDto[], keyOf: (card: ChargeCardDto) => Key): ChargeCardDto[] =>
  cards
    .map((card) => ({ card, key: keyOf(card) }))
    .sort(({ key: a }, { key: b }) => a[0] - b[0] || compare(a[1], b[1]) || a[2].localeCompare(b[2]))
    .map(({ card }) => card);

/** Infinity − Infinity is no number; equal is equal. */
const compare = (one: number, other: number): number => (one === other ? 0 : one - other);

/** Longest late first, then checks by their wait, then what a look-in is near, then by likely finish. */
export function benchOrder(cards: readonly ChargeCardDto[], now: number): ChargeCardDto[] {
  return sorted(cards, (card): Key => {
    if (card.overdueSince !== null) return [0, instant(card.overdueSince), card.number];
    if (card.stage === 'check-due') return [1, instant(card.checkDueAt), card.number];
    if (instant(card.nextLookInAt) <= now + LOOK_IN_WINDOW_MS) return [2, instant(card.nextLookInAt), card.number];
    switch (card.stage) {
      case 'ready':
        return [3, instant(card.readyAt), card.number];
      case 'queued':
        return [5, likely(card), card.number];
      case 'planned':
        return [6, instant(card.clipOnAt), card.number];
      case 'stopped':
        return [7, instant(card.stoppedAt), card.number];
      default:
        return [4, likely(card), card.number];
    }
  });
}

/** Late, check due, ready, then everything else by its likely finish; what was stopped last. */
export function wallOrder(cards: readonly ChargeCardDto[]): ChargeCardDto[] {
  return sorted(cards, (card): Key => {
    if (card.overdueSince !== null) return [0, instant(card.overdueSince), card.number];
    if (card.stage === 'check-due') return [1, instant(card.checkDueAt), card.number];
    if (card.stage === 'ready') return [2, instant(card.readyAt), card.number];
    if (card.stage === 'stopped') return [4, instant(card.stoppedAt), card.number];
    return [3, likely(card), card.number];
  });
}

/** Planned ones are nobody's business across the hall; ready ones stand half an hour or until they are fitted. */
export function onTheWall(card: ChargeCardDto, now: number): boolean {
  if (card.stage === 'planned') return false;
  return card.stage !== 'ready' || now - instant(card.readyAt) < READY_ON_WALL_MS;
}
