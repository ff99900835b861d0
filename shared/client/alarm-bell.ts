import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import type { AlertDto } from '@/shared/contract/alert';
import { alertPath } from '@/shared/contract/alert-kinds';
import { concerns, isOpen, mostUrgent, ringOf, ringsSince, type Hearer } from './alarm-rings';
import { alertSettingsQuery, isHeardHere, useAlertSettings } from './alert-settings';
import { alertsQuery, useAlerts } from './alerts';
import { boardQuery } from './board';
import { serverNow } from './clock';
import { toldOf } from './heard-alerts';
import { onAlert } from './live';
import { showNotice } from './notify';
import { queryClient } from './query-client';
import { sessionQuery, useSession } from './session';
import { canRing, keepSound, playSound } from './sound';

/** What is older than this when the device meets it was missed here: it is told by a notice too. */
const missedAfterMs = 20_000;
/** So long a page that is looked at again waits for the present alerts, so as not to ring for what was taken meanwhile. */
const askAgainMs = 3000;

/**
 * Rings for the person signed in, as long as the page is open; a notice is shown while the page is not looked at. What
 * was raised while this device was away rings once, with a notice, as soon as it is known here and sound may play.
 */
export function useAlarmBell(): void {
  const person = useSession().data?.person ?? null;
  const personId = person?.id ?? null;
  const role = person?.role ?? null;
  // Asked for here, read from the cache by the bell.
  useAlerts();
  useAlertSettings(personId !== null);

  useEffect(keepSound, []);

  useEffect(() => {
    if (!personId || !role) return;
    const hearer: Hearer = { id: personId, role };
    let shownAgainAt = -Infinity;
    const look = () => {
      const { data, dataUpdatedAt = 0 } = queryClient.getQueryState(alertsQuery().queryKey) ?? {};
      if (!data) return;
      if (dataUpdatedAt < shownAgainAt && Date.now() < shownAgainAt + askAgainMs) return;
      ringFor(data, hearer);
    };
    const seen = () => {
      if (document.visibilityState !== 'visible') return;
      shownAgainAt = Date.now();
      void queryClient.invalidateQueries({ queryKey: alertsQuery().queryKey });
    };
    const timer = setInterval(look, 1000);
    document.addEventListener('visibilitychange', seen);
    const stop = onAlert((alert) => {
      const known = queryClient.getQueryData(alertsQuery().queryKey) ?? [];
      const again = known.some(({ id, turn }) => id === alert.id && turn === alert.turn);
      queryClient.setQueryData(alertsQuery().queryKey, (all) => all && withAlert(all, alert));
      if (document.visibilityState === 'visible' || !concerns(alert, hearer) || !isWanted(alert)) return;
      // Told again or passed on it is news, also where the first telling was met.
      void tellByNotice(alert, again);
    });
    return () => {
      clearInterval(timer);
      document.removeEventListener('visibilitychange', seen);
      stop();
    };
  }, [personId, role]);

  useRestTone(personId);
}

/** Told again or passed on it comes under the same id: the newer takes the place of the older. */
const withAlert = (known: AlertDto[], alert: AlertDto): AlertDto[] =>
  known.some(({ id }) => id === alert.id) ? known.map((one) => (one.id === alert.id ? alert : one)) : [alert, ...known];

/** Its person wants it by this page, now. What was not read yet is wanted. */
function isWanted(alert: Pick<AlertDto, 'kind' | 'level'>): boolean {
  const settings = queryClient.getQueryData(alertSettingsQuery().queryKey);
  const zone = queryClient.getQueryData(sessionQuery().queryKey)?.workshop.zone;
  return !settings || !zone || isHeardHere(settings, alert, zone, serverNow());
}

function ringFor(alerts: AlertDto[], hearer: Hearer): void {
  const now = serverNow();
  const told = toldOf(alerts);
  const due = alerts.filter((alert) => isOpen(alert) && concerns(alert, hearer) && isWanted(alert));
  for (const alert of due.filter((one) => !told.of(one).met)) {
    if (document.visibilityState !== 'visible' || now - ringsSince(alert) > missedAfterMs) void tellByNotice(alert);
    else told.of(alert).met = true;
  }
  // Before the first tap nothing is heard: what is due waits for the tap.
  if (canRing()) {
    const sounds = due.flatMap((alert) => {
      const entry = told.of(alert);
      const ring = ringOf(alert, hearer, entry.heardTo, now);
      if (ring) entry.heardTo = now;
      return ring ?? [];
    });
    const sound = mostUrgent(sounds);
    if (sound) playSound(sound);
  }
  told.keep();
}

const beingTold = new Set<string>();

/**
 * Shows it, and counts it as met only where the device did: one that may not show notices yet has missed it still.
 * @param again it is told once more: else a push that has shown it already is enough
 */
async function tellByNotice(alert: AlertDto, again = false): Promise<void> {
  if (beingTold.has(alert.id)) return;
  beingTold.add(alert.id);
  try {
    const shown = await showNotice({
      title: alert.title,
      body: [alert.seen, alert.checkFirst].filter(Boolean).join(' '),
      url: alertPath(alert),
      tag: alert.id,
      ...(again ? {} : { id: alert.id, turn: alert.turn }),
    });
    if (!shown) return;
    const told = toldOf(queryClient.getQueryData(alertsQuery().queryKey) ?? [alert]);
    told.of(alert).met = true;
    told.keep();
  } finally {
    beingTold.delete(alert.id);
  }
}

/** One low tone when the rest of one's own charge begins, where its person wants to hear that current is over. */
function useRestTone(personId: string | null): void {
  const board = useQuery({ ...boardQuery(), enabled: personId !== null }).data;
  const resting = useRef<ReadonlySet<string> | null>(null);
  useEffect(() => {
    if (!board) return;
    const now = board.charges.filter((charge) => charge.stage === 'resting');
    const began = now.some(({ id, person }) => resting.current?.has(id) === false && person?.id === personId);
    if (began && isWanted({ kind: 'charge-done', level: 'tell' })) playSound('resting');
    resting.current = new Set(now.map(({ id }) => id));
  }, [board, personId]);
}
