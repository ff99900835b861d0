/** Causes of alerts and their names, free of schemas: every screen rings. */
import type { AlertDto } from './alert';

export const alertKinds = [
  'taper-begun',
  'charge-done',
  'rested',
  'check-due',
  'overdue',
  'latest-start-missed',
  'look-in-due',
  'look-in-missed',
  'no-reading',
  'step-swap',
  'odd-reading',
  'no-current',
  'too-warm',
  'over-voltage',
  'channel-fault',
  'wall-unseen',
] as const;
export type AlertKind = (typeof alertKinds)[number];

/** What each cause is called, on a screen as in a letter. */
export const alertKindNames: Record<AlertKind, string> = {
  'taper-begun': 'Taper begun',
  'charge-done': 'Current is over',
  rested: 'Settled',
  'check-due': 'Check due',
  overdue: 'Overdue',
  'latest-start-missed': 'Latest start missed',
  'look-in-due': 'Look-in due',
  'look-in-missed': 'Look-in missed',
  'no-reading': 'No reading',
  'step-swap': 'A hand is needed',
  'odd-reading': 'Odd reading',
  'no-current': 'No current',
  'too-warm': 'Too warm',
  'over-voltage': 'Over the voltage limit',
  'channel-fault': 'Channel out of order',
  'wall-unseen': 'Wall not seen',
};

/** Where an alert leads to, within this site. */
export const alertPath = (alert: Pick<AlertDto, 'chargeId'>): string =>
  alert.chargeId === null ? '/alerts' : `/charges/${alert.chargeId}`;
