/** What column and ribbon of a row need, out of its card. Seconds count from `zero` (epoch ms). */
import type { Band, Segment } from '@/calc/plan-types';
import { allNear, type ColumnScale } from '../level-column/scale';
import type { ColumnGroup } from '../level-column/groups';
import type { LookIn } from '../wait-ribbon/layout';
import type { StageId } from '../stage/stages';
import { movedBy, type WallCard, type WallClock } from './wall-model';

export interface ColumnOfCard {
  groups: ColumnGroup[];
  targetVolts: number;
  toleranceVolts: number;
  scale: ColumnScale;
  stage: StageId;
  reckoned: boolean;
}

/** The level column: near the target once every healthy group is within 40 mV. */
export function columnOf(card: WallCard): ColumnOfCard {
  const groups = card.groups.map((group, index) => ({
    volts: group.volts,
    beganVolts: group.fromVolts === group.volts ? null : group.fromVolts,
    odd: card.laggingGroup === index,
  }));
  return {
    groups,
    targetVolts: card.targetVolts,
    toleranceVolts: card.toleranceVolts,
    scale: allNear(groups, card.targetVolts)
      ? { kind: 'near' }
      : { kind: 'window', lowVolts: card.dischargeLimitVolts, highVolts: card.chargeLimitVolts },
    stage: card.stage,
    reckoned: card.groups.some((group) => group.reckoned),
  };
}

export interface RibbonOfCard {
  segments: Segment[];
  band: Band | null;
  nowS: number;
  hanging: boolean;
  heldFromS: number | null;
  stoppedAtS: number | null;
  lookIns: LookIn[];
}

/** The wait ribbon on the clock of `zero`. Only a look-in that is due has its peg, on the now line. */
export function ribbonOf(card: WallCard, { now, boardAt }: WallClock, zero: number): RibbonOfCard {
  const moved = movedBy(card, boardAt, now);
  const s = (instant: string, extra = 0) => (Date.parse(instant) + extra - zero) / 1000;
  const held = card.heldAt === null || card.stage !== 'held' ? null : Date.parse(card.heldAt);
  const runs = card.stage !== 'check-due' && card.stage !== 'ready';
  const due = card.nextLookInAt !== null && Date.parse(card.nextLookInAt) <= now;
  return {
    segments: card.segments.map(({ kind, from, to }) => {
      const later = held !== null && Date.parse(from) >= held ? moved : 0;
      return { kind, fromS: s(from, later), toS: s(to, held !== null && Date.parse(to) > held ? moved : 0) };
    }),
    band:
      card.ready && runs
        ? { p10: s(card.ready.early, moved), p50: s(card.ready.likely, moved), p90: s(card.ready.late, moved) }
        : null,
    nowS: (now - zero) / 1000,
    hanging: card.direction === 'discharge',
    heldFromS: held === null ? null : (held - zero) / 1000,
    stoppedAtS: card.stage === 'stopped' && card.stoppedAt ? s(card.stoppedAt) : null,
    lookIns: due ? [{ s: (now - zero) / 1000, state: 'next' }] : [],
  };
}

/** A row's own axis, for the narrow cells: from its begin, or now, to its latest finish. */
export function ownAxis({ segments, band, nowS }: RibbonOfCard): { fromS: number; toS: number } {
  const begin = segments[0]?.fromS ?? nowS;
  const end = band?.p90 ?? (segments.at(-1)?.toS ?? nowS) + 600;
  return { fromS: Math.min(begin, nowS), toS: Math.max(nowS + 240, end) };
}
