import { useCallback, useEffect, useState } from 'react';
import type { PushKeyDto } from '@/shared/contract/alert-settings';
import { useAddPushDevice, useAlertSettings, useRemovePushDevice } from './alert-settings';
import { api } from './api';
import { sentenceOf } from './api-problem';
import { pushHere, subscribePush, unsubscribePush } from './push';
import { recall, remember } from './storage';
import type { PushHere } from './push-types';

const refusals = {
  denied: 'It was refused on this device. Allow it in the browser’s settings of this site.',
  unavailable: 'This browser has no push at this address.',
  refused: 'The push service of this browser did not answer. Try again in a while.',
} as const;

/** This browser is subscribed at the push service of the demo. */
const demoKey = 'push.demo';

/** How this device stands: in the demo its browser is not asked. */
const deviceNow = async (): Promise<PushHere> => (recall(demoKey) === 'yes' ? 'on' : pushHere());

export interface PushSwitch {
  /** Null: not looked at yet. On: this device is subscribed, and the server has it. */
  state: PushHere | null;
  busy: boolean;
  /** Why it could not be switched. */
  problem: string | null;
  switchTo: (on: boolean) => Promise<void>;
}

/** Push to this device, and the switch of it. */
export function usePushSwitch(): PushSwitch {
  const settings = useAlertSettings();
  const add = useAddPushDevice();
  const remove = useRemovePushDevice();
  const [device, setDevice] = useState<PushHere | null>(null);
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const here = settings.data?.devices.filter((one) => one.here) ?? [];

  const look = useCallback(() => void deviceNow().then(setDevice, () => setDevice('unavailable')), []);
  useEffect(look, [look]);

  async function switchTo(on: boolean): Promise<void> {
    setBusy(true);
    setProblem(null);
    try {
      if (on) {
        const { key, demo } = await api.get<PushKeyDto>('/push-key');
        // The demo has its own push service: the one of the browser's maker is not asked.
        const answer = demo === null ? await subscribePush(key) : ({ kind: 'browser', ...demo } as const);
        remember(demoKey, demo === null ? 'no' : 'yes');
        if (typeof answer === 'string') setProblem(refusals[answer]);
        else await add.mutateAsync(answer);
      } else {
        // The server first: it must not send to what is not there any more.
        for (const { id } of here) await remove.mutateAsync({ id });
        if (recall(demoKey) === 'yes') remember(demoKey, 'no');
        else await unsubscribePush();
      }
    } catch (error) {
      setProblem(sentenceOf(error));
    } finally {
      setBusy(false);
      look();
    }
  }

  const known = settings.data !== undefined;
  const state = device === 'on' && known && here.length === 0 ? 'off' : device;
  return { state: known ? state : null, busy, problem, switchTo };
}
