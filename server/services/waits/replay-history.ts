/** What a replay is made from, as plain numbers that go to its thread. */
import type { OcvTable } from '@/calc/types';
import type { Way } from '@/calc/plan-types';
import type { DayHours } from '@/shared/contract/workshop';

/** Channels that are alike in all that decides how long a charge takes. */
export interface ReplayKind {
  /** In use now; 0: there were such ones. */
  count: number;
  maxAmps: number;
  maxVolts: number;
  maxWatts: number | null;
  leadOhm: number;
  singleGroup: boolean;
  adjustableVolts: boolean;
  /** Null: it cannot discharge by itself. */
  dischargeAmps: number | null;
  loadOhm: number | null;
}

export interface ReplayType {
  curve: OcvTable;
  groups: number;
  /** Long resistance of one group with its link. */
  groupOhm: number;
  ratedAh: number;
  maxChargeAmps: number;
  maxDischargeAmps: number;
  capVolts: number;
  floorVolts: number;
}

/** A finished charge; instants are epoch ms. */
export interface HistoryCharge {
  id: string;
  /** Indexes of its module type and of the kind of its first channel. */
  type: number;
  kind: number;
  way: Way;
  askedAt: number;
  bookedAt: number | null;
  dueAt: number | null;
  heldFromAt: number;
  heldToAt: number;
  readyAt: number;
  usedShare: number;
  fromVolts: number;
  toVolts: number;
  groupAh: number;
}

export interface ReplayHistory {
  charges: HistoryCharge[];
  kinds: ReplayKind[];
  types: ReplayType[];
  hours: { zone: string; workingHours: DayHours[] };
  lookInMinutes: number;
  /** The workshop lets charges run while nobody is there. */
  unattended: boolean;
  hands: { clipOnS: number; clipOffS: number; busbarsS: number };
}

/** Levers by the indexes of a history; none is changed where all is left out. */
export interface ReplayChange {
  moreOfKind?: number;
  amps?: { kind: number; amps: number };
  startAtBooking?: boolean;
  shelf?: { type: number; volts: number };
  lookInMinutes?: number;
  overnightAllowed?: boolean;
  paralleledAllowed?: boolean;
}
