import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { alertsQuery, useAlerts } from './alerts';
import { concerns, mostUrgent, ringOf } from './alarm-rings';
import { boardQuery } from './board';
import { serverNow } from './clock';
import { onAlert } from './live';
import { showNotice } from './notify';
import { queryClient } from './query-client';
import { useSession } from './session';
import { keepSound, playSound } from './sound';

/** A slow announcement may be this late and still ring. */
const lateMs = 20_000;

/** Rings for the person signed in, as long as the page is open; a notice is shown while the page is not looked at. */
export function useAlarmBell(): void {
  const personId = useSession().data?.person.id ?? null;
  const alerts = useAlerts().data;
  const ringing = useRef({ alerts: alerts ?? [], heardTo: new Map<string, number>() });
  useEffect(() => {
    ringing.current.alerts = alerts ?? [];
  }, [alerts]);

  useEffect(keepSound, []);

  useEffect(() => {
    if (!personId) return;
    const { heardTo } = ringing.current;
    const mounted = serverNow();
    const timer = setInterval(() => {
      const now = serverNow();
      const sounds = ringing.current.alerts.flatMap((alert) => {
        // Each alert has its own ear: one that is announced a moment late still rings, none rings twice.
        const from = heardTo.get(alert.id) ?? Math.max(mounted, now - lateMs);
        heardTo.set(alert.id, now);
        return ringOf(alert, personId, from, now) ?? [];
      });
      const sound = mostUrgent(sounds);
      if (sound) playSound(sound);
    }, 1000);
    return () => clearInterval(timer);
  }, [personId]);

  useEffect(() => {
    if (!personId) return;
    return onAlert((alert) => {
      queryClient.setQueryData(alertsQuery().queryKey, (known) =>
        known && !known.some(({ id }) => id === alert.id) ? [alert, ...known] : known,
      );
      if (document.visibilityState === 'visible' || !concerns(alert, personId)) return;
      void showNotice({
        title: alert.title,
        body: [alert.seen, alert.checkFirst].filter(Boolean).join(' '),
        url: `/charges/${alert.chargeId}`,
        tag: alert.id,
      });
    });
  }, [personId]);

  useRestTone(personId);
}

/** One low tone when the rest of one's own charge begins. */
function useRestTone(personId: string | null): void {
  const board = useQuery({ ...boardQuery(), enabled: personId !== null }).data;
  const resting = useRef<ReadonlySet<string> | null>(null);
  useEffect(() => {
    if (!board) return;
    const now = board.charges.filter((charge) => charge.stage === 'resting');
    const began = now.some(({ id, person }) => resting.current?.has(id) === false && person?.id === personId);
    if (began) playSound('resting');
    resting.current = new Set(now.map(({ id }) => id));
  }, [board, personId]);
}
