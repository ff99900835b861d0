/** A spare beside the charge it is on, as rows, table and page show it. Pure. */
import type { ChargeCardDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import { markOf } from '../charge/card-model';
import { stages, type StageMark } from '../stage/stages';

export interface StockItem {
  spare: SpareDto;
  /** Its open charge as the board shows it; null on the shelf, and while the board is not known. */
  card: ChargeCardDto | null;
}

const running = new Set(['charging', 'discharging', 'tapering', 'resting', 'check-due', 'ready', 'held']);

/** Rest volts per group: from the charge once it has begun, else the last reading. */
export function presentVolts({ spare, card }: StockItem): number[] {
  if (card && running.has(card.stage)) return card.groups.map(({ volts }) => volts);
  return spare.reading?.groupVolts ?? [];
}

/** When those volts were read, epoch ms; null: never. */
export function readAt({ spare, card }: StockItem): number | null {
  const at = card && running.has(card.stage) ? (card.lastReadingAt ?? card.startedAt) : spare.reading?.at;
  return at ? Date.parse(at) : null;
}

/** The stage to draw beside it; null on the shelf. Quarantine is no stage, but has the solid square. */
export function stockMark({ spare, card }: StockItem): StageMark | null {
  if (spare.where === 'quarantine') return 'stopped';
  if (card) return markOf(card);
  if (spare.where !== 'charge' || !spare.charge) return null;
  return spare.charge.stage in stages ? (spare.charge.stage as StageMark) : null;
}

/** 'Quarantine', 'Queued for R-2418', 'Charging, A2', 'shelf D4'. */
export function whereWords(item: StockItem): string {
  const { spare, card } = item;
  if (spare.where === 'quarantine') return 'Quarantine';
  if (spare.where === 'fitted') return 'fitted';
  const mark = stockMark(item);
  if (mark !== null && spare.charge) {
    const word = stages[mark].word;
    if (mark === 'queued' || mark === 'planned') return `${word} for ${spare.charge.title}`;
    const place = card ? card.channelNames.join(', ') : spare.charge.title;
    return place ? `${word}, ${place}` : word;
  }
  return spare.shelfPlace ? `shelf ${spare.shelfPlace}` : 'shelf, place not noted';
}

/** Joins stock and board by the spare. */
export function stockItems(spares: readonly SpareDto[], cards: readonly ChargeCardDto[] | undefined): StockItem[] {
  const bySpare = new Map((cards ?? []).map((card) => [card.spare.id, card]));
  return spares.map((spare) => ({
    spare,
    card: spare.charge ? (bySpare.get(spare.id) ?? null) : null,
  }));
}
