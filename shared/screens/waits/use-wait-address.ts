import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useNow } from '@/shared/client/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { addressKeys, addressOf, readAddress, type WaitParams } from '@/shared/ui/waits/wait-address';

/** The waits' address: what it asks for, and how it is changed. */
export function useWaitAddress() {
  const router = useRouter();
  const raw = useLocalSearchParams<Record<string, string | string[]>>();
  const { zone } = useFormats();
  const now = useNow(60_000);
  const today = dayOf(now, zone);
  const params: WaitParams = {};
  for (const key of addressKeys) {
    const value = raw[key];
    const one = Array.isArray(value) ? value[0] : value;
    if (one) params[key] = one;
  }
  return {
    ...readAddress(params, today),
    params,
    now,
    today,
    /** Changes some of it and keeps the rest; '' takes a part out. */
    set: (change: WaitParams) => {
      const next: Record<string, string | undefined> = {};
      for (const [key, value] of Object.entries(change)) next[key] = value === '' ? undefined : value;
      router.setParams(next);
    },
    /** The charges behind a number: the same filters and one more. */
    chargesHref: (more: WaitParams = {}) => {
      const filters: WaitParams = { ...params, ...more };
      return addressOf('/waits/charges', filters);
    },
    go: (path: string) => router.push(path as Href),
  };
}
export type WaitAddressHeld = ReturnType<typeof useWaitAddress>;
