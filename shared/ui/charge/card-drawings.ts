/** What level column and wait ribbon of a charge need, out of its card. Seconds count from `zero` (epoch ms). */
import type { Band, Segment } from '@/calc/plan-types';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { allNear, reachScale, type ColumnScale } from '../level-column/scale';
import type { ColumnGroup } from '../level-column/groups';
import type { LookIn } from '../wait-ribbon/layout';
import { isFlowing, readyOf } from './card-model';

/** The groups as vessels. The numbers over them are wanted only where they are labelled. */
export const columnGroups = (card: ChargeCardDto, text?: (volts: number) => string): ColumnGroup[] =>
  card.groups.map((group, index) => ({
    volts: group.volts,
    beganVolts: Math.abs(group.fromVolts - group.volts) < 5e-4 ? null : group.fromVolts,
    clipVolts: isFlowing(card) ? group.clipVolts : null,
    odd: card.laggingGroup === index,
    ...(text ? { text: text(group.volts) } : {}),
  }));

/** List: the type's window, near the target once all are there. Live: the reach of the charge instead of the window. */
export function columnScale(card: ChargeCardDto, place: 'list' | 'live'): ColumnScale {
  const groups = columnGroups(card);
  if (allNear(groups, card.targetVolts)) return { kind: 'near' };
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
  nowS: number | null;
  hanging: boolean;
  heldFromS: number | null;
  stoppedAtS: number | null;
  lookIns: LookIn[];
  fromS: number;
  toS: number;
}

const waitsForPeople = new Set(['check-due', 'ready', 'fitted', 'shelved']);

/** The ribbon on the clock of `zero`, from its begin to its latest finish (with a little room). */
export function cardRibbon(card: ChargeCardDto, now: number, zero: number): CardRibbon {
  const s = (instant: number) => (instant - zero) / 1000;
  const held = card.stage === 'held' && card.heldAt !== null ? Date.parse(card.heldAt) : null;
  const moved = held === null ? 0 : Math.max(0, now - held);
  const later = (instant: string) => {
    const at = Date.parse(instant);
    return s(held !== null && at > held ? at + moved : at);
  };
  const segments = card.segments.map(({ kind, from, to }) => ({ kind, fromS: later(from), toS: later(to) }));
  const ready = waitsForPeople.has(card.stage) || card.stage === 'stopped' ? null : readyOf(card, now);
  const band = ready ? { p10: s(ready.p10), p50: s(ready.p50), p90: s(ready.p90) } : null;
  const begun = card.startedAt !== null;
  const nowS = begun ? s(now) : null;
  const begin = segments[0]?.fromS ?? s(Date.parse(card.clipOnAt));
  const end = Math.max(
    band?.p90 ?? 0,
    segments.at(-1)?.toS ?? begin + 3600,
    waitsForPeople.has(card.stage) ? (nowS ?? 0) : 0,
  );
  const next = card.lookIns.find((visit) => visit.doneAt === null)?.id;
  return {
    segments,
    band,
    nowS,
    hanging: card.direction === 'discharge',
    heldFromS: held === null ? null : s(held),
    stoppedAtS: card.stoppedAt === null ? null : s(Date.parse(card.stoppedAt)),
    lookIns: begun
      ? card.lookIns.map((visit) => ({
          s: s(Date.parse(visit.doneAt ?? visit.dueAt)),
          state: visit.doneAt !== null ? 'done' : visit.id === next ? 'next' : 'later',
        }))
      : [],
    fromS: Math.min(begin, nowS ?? begin),
    toS: end + Math.max(240, (end - begin) * 0.02),
  };
}
