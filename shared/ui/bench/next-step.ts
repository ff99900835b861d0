import type { ChargeCardDto } from '@/shared/contract/charge';

/** The one thing to do next with a charge, and where. Null: only time. */
export function nextStep(card: ChargeCardDto): { title: string; path: string } | null {
  const base = `/charges/${card.id}`;
  if (card.nextHand !== null) return { title: card.nextHand, path: base };
  switch (card.stage) {
    case 'planned':
    case 'queued':
      return { title: 'Checks before clipping on', path: `${base}/checks` };
    case 'check-due':
      return { title: 'Enter the group voltages', path: `${base}/check` };
    case 'ready':
      return { title: 'Fit it, or print its label', path: base };
    case 'held':
      return { title: 'Resume or stop', path: base };
    case 'charging':
    case 'discharging':
    case 'tapering':
      return { title: 'Log a reading', path: `${base}/log` };
    default:
      return null;
  }
}
