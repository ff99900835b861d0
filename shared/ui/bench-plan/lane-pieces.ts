/** What is drawn in the lane of a channel: the charges that hold it, each as its wait ribbon, in as many rows as overlap. */
import type { Band, Segment } from '@/calc/plan-types';
import type { BenchPlanDto, PlanChargeDto } from '@/shared/contract/bench-plan';
import { cardRibbon, type CardRibbon } from '../charge/card-drawings';
import { isToCome, movedMs, type CardClock } from '../charge/card-model';
import type { LookIn } from '../wait-ribbon/layout';

export interface LanePiece {
  charge: PlanChargeDto;
  channelId: string;
  /** What of the charge happens on this channel; what follows the last of its channels stands there. Seconds from `zero`. */
  segments: Segment[];
  band: Band | null;
  lookIns: LookIn[];
  ribbon: CardRibbon;
  /** Since when it waits for this channel, s; null: it does not. Drawn as dots, where the lane is empty meanwhile. */
  queueFromS: number | null;
  /** First and last mark, epoch ms; the dots of the queue are none. */
  from: number;
  to: number;
}

/** The stretches within [fromS, toS], cut at its ends. */
const within = (segments: readonly Segment[], fromS: number, toS: number): Segment[] =>
  segments
    .filter((one) => one.toS > fromS && one.fromS < toS)
    .map((one) => ({ ...one, fromS: Math.max(one.fromS, fromS), toS: Math.min(one.toS, toS) }));

/**
 * The charges of a channel in the order of their begin. A charge that goes from one channel to the next is cut where it
 * changes; its rest and its band stand on the last.
 *
 * @param zero epoch ms from which the seconds of the pieces count
 */
export function lanePieces(
  plan: Pick<BenchPlanDto, 'charges'>,
  channelId: string,
  clock: CardClock,
  zero: number,
): LanePiece[] {
  const pieces = plan.charges.flatMap((charge): LanePiece[] => {
    const { card, holds } = charge;
    const moved = isToCome(card) ? movedMs(card, clock) : 0;
    const ribbon = cardRibbon(card, clock, zero);
    const end = Math.max(...holds.map(({ to }) => Date.parse(to)));
    return holds
      .filter((hold) => hold.channelId === channelId)
      .map((hold) => {
        const last = Date.parse(hold.to) >= end - 1000;
        const first = holds.every(({ from }) => Date.parse(from) >= Date.parse(hold.from) - 1000);
        const fromS = first ? -Infinity : (Date.parse(hold.from) + moved - zero) / 1000;
        const toS = last ? Infinity : (Date.parse(hold.to) + moved - zero) / 1000;
        const all = within(ribbon.segments, fromS, toS);
        const segments = all.filter(({ kind }) => kind !== 'queue');
        const band = last ? ribbon.band : null;
        const begin = segments[0]?.fromS ?? (Date.parse(hold.from) + moved - zero) / 1000;
        const stop = Math.max(segments.at(-1)?.toS ?? begin + 60, band?.p90 ?? -Infinity);
        return {
          charge,
          channelId,
          segments,
          band,
          ribbon,
          queueFromS: all.find(({ kind }) => kind === 'queue')?.fromS ?? null,
          lookIns: ribbon.lookIns.filter(({ s }) => s >= fromS && s <= toS),
          from: zero + begin * 1000,
          to: zero + stop * 1000,
        };
      });
  });
  return pieces.sort((a, b) => a.from - b.from || a.charge.card.number.localeCompare(b.charge.card.number));
}

/** A charge that still rests in the lane while the next one begins stands in a row of its own: nothing is drawn over it. */
export function packRows<P>(pieces: readonly P[], extent: (piece: P) => { left: number; right: number }): P[][] {
  const rows: { right: number; pieces: P[] }[] = [];
  for (const piece of pieces) {
    const { left, right } = extent(piece);
    const row = rows.find((one) => one.right <= left);
    if (row) {
      row.pieces.push(piece);
      row.right = right;
    } else rows.push({ right, pieces: [piece] });
  }
  return rows.map((row) => row.pieces);
}

/**
 * The dots in front of a silhouette: from when its charge is queued, but not over the charge that stands before it in its
 * row. Seconds from `zero`; null: there is no room for any.
 */
export function queueDots(row: readonly LanePiece[], index: number, zero: number): Segment | null {
  const piece = row[index];
  if (!piece || piece.queueFromS === null) return null;
  const before = row[index - 1];
  const fromS = Math.max(piece.queueFromS, before ? (before.to - zero) / 1000 + 60 : -Infinity);
  const toS = (piece.from - zero) / 1000;
  return fromS < toS ? { kind: 'queue', fromS, toS } : null;
}
