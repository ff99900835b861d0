import type { ChargeCardDto } from '@/shared/contract/charge';
import { waitsForSwap } from '../charge/card-model';

export interface NextStep {
  title: string;
  path: string;
}

/** The one thing to do next with a charge, and where. Null: only time. */
export function nextStep(card: ChargeCardDto): NextStep | null {
  const live = `/charges/${card.id}`;
  if (waitsForSwap(card) || (card.stage === 'resting' && card.nextHand !== null))
    return { title: card.nextHand ?? '', path: live };
  switch (card.stage) {
    case 'planned':
    case 'queued':
      return { title: 'Checks before clipping on', path: `${live}/checks` };
    case 'check-due':
      return { title: 'Enter the group voltages', path: `${live}/check` };
    case 'ready':
      return { title: 'Fit it, or print its label', path: live };
    case 'held':
      return { title: 'Resume or stop', path: live };
    case 'charging':
    case 'discharging':
    case 'tapering':
      return { title: 'Log a reading', path: `${live}/log` };
    default:
      return null;
  }
}
