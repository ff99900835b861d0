import type { ReactNode } from 'react';
import type { PlanOption } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import type { MeterDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PersonDto } from '@/shared/contract/people';
import type { CardClock } from './card-model';
import type { LiveAct } from './live-acts';
import type { ChargeActs, LiveSheet, LiveSheetsProps } from './live-sheets';
import type { WaitingActs, WaitingItem } from '../waiting/waiting-items';

/** What the live screen and its parts show and do. */
export interface LiveScreenProps {
  charge: ChargeDto;
  at: CardClock;
  /** The link is down: when the figures were told. */
  knownAt: number | null;
  lagLimitVolts: number | undefined;
  type: ModuleTypeDto | undefined;
  people: readonly PersonDto[] | undefined;
  /** Of the workshop: a reading names the one it was read with. */
  meters: readonly Pick<MeterDto, 'id' | 'name'>[];
  mayHandOver: boolean;
  /** Channels out of order, and the way to say so. */
  channels: ReactNode;
  acts: ChargeActs;
  sheet: LiveSheet | null;
  stopDraft: LiveSheetsProps['stopDraft'];
  endDraft: LiveSheetsProps['endDraft'];
  /** What of this charge waits on this device, and what can be done with it. */
  waiting: readonly WaitingItem[];
  waitingActs: WaitingActs;
  /** After a check outside the tolerance: the soonest way to put it right. */
  topUp: { option: PlanOption | null; ruledOut: string | null } | null;
  onBack: () => void;
  onGo: (path: string) => void;
  onAct: (act: LiveAct) => void;
  onSheet: (sheet: LiveSheet | null) => void;
}

/** Its check let it go: the verdict leads, not a time. */
export const isProven = (charge: ChargeDto): boolean => charge.stage === 'ready' || charge.stage === 'fitted';
