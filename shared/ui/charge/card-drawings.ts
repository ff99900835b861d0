/** What level column and wait ribbon of a charge need, out of its card. Seconds count from `zero` (epoch ms). */
import type { Band, Segment } from '@/calc/plan-types';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { allNear, reachScale, type ColumnScale } from '../level-column/scale';
import type { ColumnGroup } from '../level-column/groups';
import type { LookIn } from '../wait-ribbon/layout';
import { isFlowing, isToCome, movedMs, readyOf, waitsForSwap, type CardClock } from './card-model';

/** Closer than this to where it began no line is drawn across the fill, V. */
const sameVolts = 5e-4;

/** The lag limit a workshop begins with, V; places that do not know the workshop's own go by it. */
const usualLagLimitVolts = 0.02;

/** The group that lags by more than the workshop's limit; null: none is odd, whichever lags a little. */
export const oddGroup = (card: ChargeCardDto, lagLimitVolts = usualLagLimitVolts): number | null =>
  card.lagVolts > lagLimitVolts ? card.laggingGroup : null;

/** The groups as vessels. The numbers over them are wanted only where they are labelled. */
export const columnGroups = (
  card: ChargeCardDto,
  { lagLimitVolts, text }: { lagLimitVolts?: number; text?: (volts: number) => string } = {},
): ColumnGroup[] =>
  card.groups.map((group, index) => ({
    volts: group.volts,
    beganVolts: Math.abs(group.fromVolts - group.volts) < sameVolts ? null : group.fromVolts,
    clipVolts: isFlowing(card) ? group.clipVolts : null,
    odd: oddGroup(card, lagLimitVolts) === index,
    ...(text ? { text: text(group.volts) } : {}),
  }));

/** List: the type's window, near the target once all are there. Live: the reach of the charge instead of the window. */
export function columnScale(card: ChargeCardDto, place: 'list' | 'live', lagLimitVolts?: number): ColumnScale {
  if (allNear(columnGroups(card, { lagLimitVolts }), card.targetVolts)) return { kind: 'near' };
  if (place === 'list') return { kind: 'window', lowVolts: card.dischargeLimitVolts, highVolts: card.chargeLimitVolts };
  return reachScale(
    card.groups.map((group) => group.fromVolts),
    card.groups.map((group) => group.volts),
    card.targetVolts,
  );
}

export interface CardRibbon {
  segments: Segment[];
  band: Band | null;
  /** null: not clipped on yet. Of what is over its end: all of it is done. */
  nowS: number | null;
  /** It still runs or waits, so that now has its mark. */
  showsNow: boolean;
  hanging: boolean;
  heldFromS: number | null;
  stoppedAtS: number | null;
  lookIns: LookIn[];
  fromS: number;
  toS: number;
}

const proven = new Set(['check-due', 'ready', 'fitted', 'shelved', 'stopped']);
const over = new Set(['ready', 'fitted', 'shelved', 'stopped']);

/** The ribbon on the clock of `zero`, from its begin to its latest finish (with a little room). */
export function cardRibbon(card: ChargeCardDto, clock: CardClock, zero: number): CardRibbon {
  const s = (instant: number) => (instant - zero) / 1000;
  const moved = movedMs(card, clock);
  // A charge that waits: what is done keeps its place, what is to come moves.
  const movesFrom = isToCome(card)
    ? -Infinity
    : card.stage === 'held' && card.heldAt !== null
      ? Date.parse(card.heldAt)
      : waitsForSwap(card)
        ? clock.asOf - 1000
        : Infinity;
  const segments = card.segments.map(({ kind, from, to }) => {
    const [begin, end] = [Date.parse(from), Date.parse(to)];
    return {
      kind,
      fromS: s(begin >= movesFrom ? begin + moved : begin),
      toS: s(end > movesFrom ? end + moved : end),
    };
  });
  const ready = proven.has(card.stage) ? null : readyOf(card, clock);
  const band = ready ? { p10: s(ready.p10), p50: s(ready.p50), p90: s(ready.p90) } : null;
  const nowS = card.startedAt === null ? null : s(clock.now);
  const begin = segments[0]?.fromS ?? s(Date.parse(card.stoppedAt ?? card.clipOnAt));
  const drawnEnd = segments.at(-1)?.toS ?? begin + 3600;
  const end = Math.max(band?.p90 ?? drawnEnd, drawnEnd, over.has(card.stage) ? drawnEnd : (nowS ?? begin));
  const next = card.lookIns.find((visit) => visit.doneAt === null)?.id;
  return {
    segments,
    band,
    nowS: over.has(card.stage) ? end : nowS,
    showsNow: nowS !== null && !over.has(card.stage),
    hanging: card.direction === 'discharge',
    heldFromS: card.stage === 'held' && card.heldAt !== null ? s(Date.parse(card.heldAt)) : null,
    stoppedAtS: card.stoppedAt === null ? null : s(Date.parse(card.stoppedAt)),
    lookIns: nowS === null ? [] : card.lookIns.flatMap((visit) => lookInPeg(visit, next, over.has(card.stage), s)),
    fromS: begin,
    toS: end + Math.max(240, (end - begin) * 0.02),
  };
}

/** Done where it was done, the next larger, the later hollow; of what is over only the done ones. */
function lookInPeg(
  { id, doneAt, dueAt }: ChargeCardDto['lookIns'][number],
  next: string | undefined,
  isOver: boolean,
  s: (instant: number) => number,
): LookIn[] {
  if (doneAt !== null) return [{ s: s(Date.parse(doneAt)), state: 'done' }];
  return isOver ? [] : [{ s: s(Date.parse(dueAt)), state: id === next ? 'next' : 'later' }];
}
