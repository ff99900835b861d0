import type { Instant } from './common';
import type { ChargeCardDto } from './charge';

export interface BoardChannelDto {
  id: string;
  name: string;
  maxAmps: number;
  chargeTitle: string | null;
}

/** All that the bench and the wall show. `rev` rises by one with every change of the workshop's charges. */
export interface BoardDto {
  rev: number;
  at: Instant;
  workshop: { id: string; name: string; zone: string };
  charges: ChargeCardDto[];
  channels: BoardChannelDto[];
  /** The soonest charge that is only planned: what comes first while the bench is empty. */
  next: { title: string; clipOnAt: Instant; channelNames: string[] } | null;
  /** Night dimming of the wall outside these hours today; null: closed today. */
  openToday: { from: Instant; to: Instant } | null;
}

/**
 * What a wall's board shows otherwise than it did at the revision `from`. A wall that has another one reads its board anew.
 */
export interface WallChangeDto extends Omit<BoardDto, 'charges' | 'channels'> {
  from: number;
  /** Charges that are new or that look otherwise. */
  cards: ChargeCardDto[];
  /** Ids of all charges in their order; null: they stand as they stood. */
  order: string[] | null;
  /** Null: as they were. */
  channels: BoardChannelDto[] | null;
}
