/** What screens say of a charge: its sign, its sentence, its times. Pure; instants are epoch ms. */
import type { Band } from '@/calc/plan-types';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { stages, type StageId, type StageMark } from '../stage/stages';

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
  shelved: 'stopped',
  held: 'held',
  stopped: 'stopped',
};

/** The stage a drawing takes its hue from. Fitted and shelved charges have none of their own. */
export const stageOf = (card: Pick<ChargeCardDto, 'stage'>): StageId => open[card.stage] ?? 'stopped';

/** The sign of a charge: its stage, or that it is overdue. */
export const markOf = (card: Pick<ChargeCardDto, 'stage' | 'overdueSince'>): StageMark =>
  card.overdueSince === null ? stageOf(card) : 'overdue';

const closedWords: Readonly<Record<string, string>> = { fitted: 'Fitted', shelved: 'Back on the shelf' };

/** 'Charging, constant current'; the stage in words. */
export function stageWords(card: Pick<ChargeCardDto, 'stage' | 'heldFrom'>): string {
  if (card.stage === 'charging' || card.stage === 'discharging') return `${stages[card.stage].word}, constant current`;
  if (card.stage === 'held' && card.heldFrom)
    return `Held while ${stages[stageOf({ stage: card.heldFrom })].word.toLowerCase()}`;
  return closedWords[card.stage] ?? stages[stageOf(card)].word;
}

/** 'R-2411 · A2' */
export const titleAndChannel = (card: Pick<ChargeCardDto, 'title' | 'channelNames'>): string =>
  [card.title, card.channelNames.join(', ')].filter(Boolean).join(' · ');

const flowing = new Set(['charging', 'discharging', 'tapering']);
/** Current flows, as far as the server knows. */
export const isFlowing = (card: Pick<ChargeCardDto, 'stage'>): boolean => flowing.has(card.stage);
/** Clipped on and not yet proven: hold and stop make sense. */
export const isUnderWay = (card: Pick<ChargeCardDto, 'stage'>): boolean =>
  isFlowing(card) || card.stage === 'resting' || card.stage === 'check-due' || card.stage === 'held';

/** Minutes from which a look-in stands in front of the running ones. */
export const lookInSoonMs = 10 * 60_000;

const at = (instant: string | null): number => (instant === null ? Number.POSITIVE_INFINITY : Date.parse(instant));

/** Where a charge stands on the bench: 0 first. Within a rank the one that ends first leads. */
function rank(card: ChargeCardDto, now: number): number {
  if (card.overdueSince !== null) return 0;
  if (card.stage === 'check-due') return 1;
  if (card.nextHand !== null) return 2;
  if (isUnderWay(card) && at(card.nextLookInAt) - now <= lookInSoonMs) return 3;
  if (isFlowing(card) || card.stage === 'resting') return 4;
  if (card.stage === 'ready') return 5;
  if (card.stage === 'held') return 6;
  if (card.stage === 'queued') return 7;
  return 8;
}

/** The order of the bench: overdue, check due, a hand needed, look-in soon, running by likely finish, ready, held, queued, planned. */
export function benchOrder(cards: readonly ChargeCardDto[], now: number): ChargeCardDto[] {
  const likely = (card: ChargeCardDto) => at(card.ready?.likely ?? card.plannedReady.likely);
  return [...cards].sort(
    (a, b) => rank(a, now) - rank(b, now) || likely(a) - likely(b) || a.number.localeCompare(b.number),
  );
}

/** Likely finish and band of a charge, epoch ms; a held one moves with the clock since nothing is reckoned anew. */
export function readyOf(card: ChargeCardDto, now: number): Band | null {
  const band = card.ready ?? (card.stage === 'planned' || card.stage === 'queued' ? card.plannedReady : null);
  if (!band) return null;
  const moved = card.stage === 'held' && card.heldAt !== null ? Math.max(0, now - Date.parse(card.heldAt)) : 0;
  return { p10: at(band.early) + moved, p50: at(band.likely) + moved, p90: at(band.late) + moved };
}
