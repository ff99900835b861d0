/** The season of a repair: from its booking to its hand-over, where its time went. */
import type { Instant } from './common';

export const seasonParts = [
  'unread',
  'deciding',
  'unplanned',
  'queue',
  'charging',
  'tapering',
  'resting',
  'check-due',
  'held',
  'unfitted',
  'balancing',
  'done',
] as const;
export type SeasonPart = (typeof seasonParts)[number];
export const seasonPartNames: Record<SeasonPart, string> = {
  unread: 'Not read yet',
  deciding: 'Module and target',
  unplanned: 'No charge yet',
  queue: 'Queue',
  charging: 'Charging',
  tapering: 'Tapering',
  resting: 'Resting',
  'check-due': 'Check due',
  held: 'Held',
  unfitted: 'Ready, not fitted',
  balancing: 'After the fit',
  done: 'Balanced, not handed over',
};

export interface SeasonStretchDto {
  part: SeasonPart;
  from: Instant;
  to: Instant;
  /** The charge it was; null: none. */
  chargeId: string | null;
}

export interface RepairSeasonDto {
  repairId: string;
  number: string;
  from: Instant;
  /** Its hand-over, or now. */
  to: Instant;
  over: boolean;
  /** Without a gap, each after the one before. */
  stretches: SeasonStretchDto[];
  /** Of each part that there was: on the clock and within working hours, s. */
  totals: { part: SeasonPart; seconds: number; openSeconds: number }[];
  /** Of the waits for its module, within working hours: used for other work, and not, s. */
  usedS: number;
  lostS: number;
}
