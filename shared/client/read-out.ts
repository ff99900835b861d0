import { useMemo } from 'react';
import { isHeardHere, useAlertSettings } from './alert-settings';
import { isOpen, useAlerts } from './alerts';
import { useNow } from './clock';
import { useSession } from './session';

/**
 * The open alerts in words, for who hears the screen instead of seeing it: those that their person wants told by this
 * page, now. What is kept back for quiet hours comes with their end. Null: not known yet.
 */
export function useReadOut(): { id: string; text: string }[] | null {
  const alerts = useAlerts().data;
  const { data: settings, isPending } = useAlertSettings();
  const zone = useSession().data?.workshop.zone;
  const now = useNow(60_000);
  return useMemo(() => {
    if (!alerts || isPending) return null;
    return alerts
      .filter((alert) => isOpen(alert) && (!settings || !zone || isHeardHere(settings, alert, zone, now)))
      .map(({ id, title, seen, checkFirst }) => ({ id, text: [title, seen, checkFirst].join(' ') }));
  }, [alerts, settings, isPending, zone, now]);
}
