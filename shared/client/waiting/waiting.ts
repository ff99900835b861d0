/** What waits on this device, for the screens, and the runner that sends it. */
import { useMutation } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import type { ChargeDto } from '@/shared/contract/charge';
import { alone } from '../alone';
import { api } from '../api';
import { storeCharge } from '../charges';
import { serverClock } from '../clock';
import { useStore } from '../external-store';
import { linkNow, onDown, onLive } from '../link';
import { queryClient } from '../query-client';
import { roots } from '../query-keys';
import { useSession } from '../session';
import { makeWaitingQueue } from './waiting-queue';
import { isUnsent, type WaitingDraft, type WaitingWrite } from './waiting-write';

// Late: nobody needs the database before the first screen stands.
const lists = () => import('../kept/device-lists');
const nameOf = (personId: string) => `waiting.${personId}`;

/** Other pages of this browser hear that the list has changed. */
const channel = 'BroadcastChannel' in globalThis ? new BroadcastChannel('bidewell-waiting') : null;

/** Since the connection came back the clock was measured: only then it is known whether the device's was set meanwhile. */
let measured = false;
const measureMs = 4000;
const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));
async function freshOffsetMs(): Promise<number> {
  if (!measured && linkNow().state !== 'down') {
    let stop = () => {};
    const heard = new Promise<void>((resolve) => {
      const off = serverClock.onMeasured(resolve);
      stop = () => void off();
    });
    await Promise.race([heard, pause(measureMs)]);
    stop();
  }
  return serverClock.offset();
}

const askAgain = (...keys: string[]) => queryClient.invalidateQueries({ queryKey: keys });

export const waitingQueue = makeWaitingQueue({
  post: api.post,
  load: async (personId) => (await lists()).readList<WaitingWrite>(nameOf(personId)),
  change: async (personId, change) => {
    const next = await (await lists()).changeList<WaitingWrite>(nameOf(personId), change);
    channel?.postMessage('changed');
    return next;
  },
  alone,
  isDown: () => linkNow().state === 'down',
  deviceNow: () => Date.now(),
  offsetMs: () => serverClock.offset(),
  freshOffsetMs,
  wait: pause,
  sent: (charge) => {
    storeCharge(queryClient, charge);
    for (const root of [roots.charges, roots.board, roots.alerts, roots.spares, roots.spare, roots.chargers])
      void askAgain(root);
  },
  unknown: (chargeId) => {
    void askAgain(roots.charge, chargeId);
    for (const root of [roots.charges, roots.board, roots.alerts]) void askAgain(root);
  },
});

/** What the server was not ready for is tried again after this, ms. */
const againMs = 30_000;

/** Sends what waits whenever the connection comes back. Once, in the shell. */
export function useWaitingRunner(): void {
  const personId = useSession().data?.person.id ?? null;
  useEffect(() => {
    void waitingQueue.belongTo(personId).then(() => {
      if (personId) void waitingQueue.flush();
    });
    if (!personId) return;
    const told = () => void waitingQueue.reload();
    channel?.addEventListener('message', told);
    const timer = setInterval(() => {
      if (linkNow().state !== 'down' && waitingQueue.store.get().some(isUnsent)) void waitingQueue.flush();
    }, againMs);
    const stops = [
      onLive(() => void waitingQueue.flush()),
      onDown(() => {
        measured = false;
      }),
      serverClock.onMeasured(() => {
        measured = true;
      }),
    ];
    return () => {
      channel?.removeEventListener('message', told);
      clearInterval(timer);
      for (const stop of stops) stop();
    };
  }, [personId]);
}

/** Everything that waits on this device, in the order it will be sent. */
export const useWaitingWrites = (): readonly WaitingWrite[] => useStore(waitingQueue.store);

/** What waits, and what of it was not taken and needs somebody. */
export function useWaitingCounts(): { waiting: number; refused: number } {
  const all = useWaitingWrites();
  const refused = all.filter((write) => !isUnsent(write)).length;
  return { waiting: all.length - refused, refused };
}

/** What of one charge waits here, and the writes that survive a lost connection. */
export function useWaiting(chargeId: string) {
  const all = useWaitingWrites();
  const waiting = useMemo(() => all.filter((write) => write.chargeId === chargeId), [all, chargeId]);
  return {
    waiting,
    /** The charge as it stands then; null: it waits here. Throws ApiProblem where the server refuses it. */
    write: keep,
    replace: waitingQueue.replace,
    remove: waitingQueue.remove,
    settle: waitingQueue.settle,
  };
}

/** A write that survives a lost connection, for a press that has no form. */
export const useWaitingWrite = () => useMutation<ChargeDto | null, Error, WaitingDraft>({ mutationFn: keep });

/** Asks the browser not to clear away what is not sent yet. */
async function keep(draft: WaitingDraft): Promise<ChargeDto | null> {
  const charge = await waitingQueue.write(draft);
  if (charge === null) void navigator.storage?.persist?.().catch(() => false);
  return charge;
}
