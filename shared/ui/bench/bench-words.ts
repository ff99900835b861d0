/** What a row of the bench says beside its numbers. Pure; instants are epoch ms. */
import type { ChargeCardDto } from '@/shared/contract/charge';
import { isToCome } from '../charge/card-model';
import { duration } from '../format/duration';

const since = (instant: string, now: number) => duration((now - Date.parse(instant)) / 1000, 'minute');

/** Right of the tag: what comes next by the clock. `at` writes an instant. */
export function coming(card: ChargeCardDto, at: (instant: string) => string, now: number): string {
  if (isToCome(card)) return Date.parse(card.clipOnAt) <= now ? 'clip on now' : `clip on at ${at(card.clipOnAt)}`;
  if (card.stage === 'held') return card.heldAt ? `since ${at(card.heldAt)}` : '';
  if (card.stage === 'resting') return card.checkDueAt ? `check at ${at(card.checkDueAt)}` : '';
  if (card.stage === 'ready') return card.readyAt ? `since ${at(card.readyAt)}` : '';
  if (card.nextLookInAt === null) return '';
  return Date.parse(card.nextLookInAt) <= now ? 'look in now' : `look-in ${at(card.nextLookInAt)}`;
}

/** What a charge that waits for a person says of itself, beside its tag. */
export function waiting(card: ChargeCardDto, now: number): string {
  if (card.overdueSince !== null) return `${since(card.overdueSince, now)} over`;
  if (card.stage === 'check-due' && card.checkDueAt) return `${since(card.checkDueAt, now)} waiting`;
  return '';
}

/** 'S-0402 at A1, rested 1 h 45' */
export function fact(card: ChargeCardDto, words: string, now: number): string {
  const where = card.channelNames.length > 0 ? ` at ${card.channelNames.join(', ')}` : '';
  if (card.stage === 'check-due')
    return `${card.spare.label}${where}${card.currentEndAt ? `, rested ${since(card.currentEndAt, now)}` : ''}`;
  return `${card.spare.label}${where}, ${words.toLowerCase()}`;
}
