/** What screens say of a charge: its sign, its sentence, its times. Pure; instants are epoch ms. */
import type { Band } from '@/calc/plan-types';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { stages, type StageId, type StageMark } from '../stage/stages';

/** The moment a card is shown at. */
export interface CardClock {
  /** Server's clock. */
  now: number;
  /** When the server told the card: what waits has moved with the clock since then. */
  asOf: number;
}

const open: Readonly<Record<string, StageId>> = {
  planned: 'planned',
  queued: 'queued',
  charging: 'charging',
  discharging: 'discharging',
  tapering: 'tapering',
  resting: 'resting',
  'check-due': 'check-due',
  ready: 'ready',
  fitted: 'ready',
  shelved: 'planned',
  held: 'held',
  stopped: 'stopped',
};

/** The stage a drawing takes its hue from. Fitted and shelved charges have none of their own. */
export const stageOf = (card: Pick<ChargeCardDto, 'stage'>): StageId => open[card.stage] ?? 'planned';

/** The sign of a charge: its stage, or that it is overdue. */
export const markOf = (card: Pick<ChargeCardDto, 'stage' | 'overdueSince'>): StageMark =>
  card.overdueSince === null ? stageOf(card) : 'overdue';

const closedWords: Readonly<Record<string, string>> = { fitted: 'Fitted', shelved: 'Back on the shelf' };

/** 'Charging, constant current'; the stage in words. */
export function stageWords(card: Pick<ChargeCardDto, 'stage' | 'heldFrom'>): string {
  if (card.stage === 'charging' || card.stage === 'discharging') return `${stages[card.stage].word}, constant current`;
  if (card.stage === 'ready') return 'Ready, in tolerance';
  if (card.stage === 'held' && card.heldFrom)
    return `Held while ${stages[stageOf({ stage: card.heldFrom })].word.toLowerCase()}`;
  return closedWords[card.stage] ?? stages[stageOf(card)].word;
}

/** 'A1', 'A1, A2': the channels of a card in one word. */
export const channelsOf = (card: Pick<ChargeCardDto, 'channelNames'>): string => card.channelNames.join(', ');

/** 'R-2411 · A2' */
export const titleAndChannel = (card: Pick<ChargeCardDto, 'title' | 'channelNames'>): string =>
  [card.title, channelsOf(card)].filter(Boolean).join(' · ');

/** 'Ines' of 'Ines Marlow'. */
export const firstName = (name: string): string => name.split(' ')[0] ?? name;

const flowing = new Set(['charging', 'discharging', 'tapering']);
/** Current flows, as far as the server knows. */
export const isFlowing = (card: Pick<ChargeCardDto, 'stage'>): boolean => flowing.has(card.stage);
/** Clipped on and not yet proven: hold and stop make sense. */
export const isUnderWay = (card: Pick<ChargeCardDto, 'stage'>): boolean =>
  isFlowing(card) || card.stage === 'resting' || card.stage === 'check-due' || card.stage === 'held';
/** Nothing has been clipped on yet. */
export const isToCome = (card: Pick<ChargeCardDto, 'stage'>): boolean =>
  card.stage === 'planned' || card.stage === 'queued';
/** It waits for the clips to be moved: nothing flows meanwhile. */
export const waitsForSwap = (card: Pick<ChargeCardDto, 'stage' | 'nextHand'>): boolean =>
  isFlowing(card) && card.nextHand !== null;

/** A look-in that is due within this stands in front of the running ones, ms. */
export const lookInSoonMs = 10 * 60_000;

const at = (instant: string | null): number => (instant === null ? Number.POSITIVE_INFINITY : Date.parse(instant));

/**
 * How far what is still to come has moved since the server told it, ms: a charge that is held, that waits for a swap or
 * that is not clipped on at its time moves with the clock. The server has moved it up to `asOf`, but for a plan.
 */
export function movedMs(card: ChargeCardDto, { now, asOf }: CardClock): number {
  if (card.stage === 'planned') return Math.max(0, now - at(card.clipOnAt));
  if (card.stage === 'queued') return Math.max(0, now - Math.max(asOf, at(card.clipOnAt)));
  return card.stage === 'held' || waitsForSwap(card) ? Math.max(0, now - asOf) : 0;
}

/** Earliest, likely and latest finish; null where it waits for a check, or is over. */
export function readyOf(card: ChargeCardDto, clock: CardClock): Band | null {
  const band = card.ready ?? (isToCome(card) ? card.plannedReady : null);
  if (!band) return null;
  const moved = movedMs(card, clock);
  return { p10: at(band.early) + moved, p50: at(band.likely) + moved, p90: at(band.late) + moved };
}

/** Seconds to the likely finish; of what is not clipped on yet the length of its wait. */
export function leftS(card: ChargeCardDto, clock: CardClock): number | null {
  const ready = readyOf(card, clock);
  if (!ready) return null;
  const from = isToCome(card) ? Math.max(clock.now, at(card.clipOnAt)) : clock.now;
  return Math.max(0, (ready.p50 - from) / 1000);
}

/** Where a charge stands on the bench: 0 first. Within a rank the one that ends first leads. */
function rank(card: ChargeCardDto, now: number): number {
  if (card.overdueSince !== null) return 0;
  if (card.stage === 'check-due') return 1;
  if (card.nextHand !== null) return 2;
  if (isUnderWay(card) && at(card.nextLookInAt) - now <= lookInSoonMs) return 3;
  if (isFlowing(card) || card.stage === 'resting') return 4;
  if (card.stage === 'held') return 5;
  if (card.stage === 'queued') return 6;
  if (card.stage === 'planned') return 7;
  return 8;
}

/**
 * The order of the bench: overdue, check due, a hand needed, look-in within 10 min, running by likely finish, held,
 * queued, planned, ready to be fitted.
 */
export function benchOrder(cards: readonly ChargeCardDto[], clock: CardClock): ChargeCardDto[] {
  const likely = (card: ChargeCardDto) => readyOf(card, clock)?.p50 ?? at(card.plannedReady.likely);
  return [...cards].sort(
    (a, b) => rank(a, clock.now) - rank(b, clock.now) || likely(a) - likely(b) || a.number.localeCompare(b.number),
  );
}
