/** Pushes to this browser: its own service brings them, so they come with the page closed. */
import type { PushDeviceInput } from '@/shared/contract/alert-settings';
import { askNoticePermission, noticePermission } from './notify';
import type { PushHere } from './push-types';
import { serviceWorker } from './service-worker';

const there = () => globalThis.isSecureContext && 'serviceWorker' in navigator && 'PushManager' in globalThis;

const bytesOf = (base64url: string): Uint8Array<ArrayBuffer> =>
  Uint8Array.from(atob(base64url.replaceAll('-', '+').replaceAll('_', '/')), (letter) => letter.charCodeAt(0));
const base64urlOf = (bytes: ArrayBuffer | null): string =>
  btoa(String.fromCharCode(...new Uint8Array(bytes ?? new ArrayBuffer(0))))
    .replaceAll('+', '-')
    .replaceAll('/', '_')
    .replace(/=+$/, '');

/** Whether pushes can come to this browser, and whether it is subscribed now. */
export async function pushHere(): Promise<PushHere> {
  if (!there()) return 'unavailable';
  if (Notification.permission === 'denied') return 'denied';
  // Looked up, not registered: only who switches pushes on needs the worker for them.
  const registration = await navigator.serviceWorker.getRegistration();
  return (await registration?.pushManager.getSubscription()) ? 'on' : 'off';
}

/**
 * Asks for the permission where it was not given, and subscribes this browser.
 * @param key the public key of the server
 * @returns what the server needs to reach it; a word why not
 */
export async function subscribePush(key: string): Promise<PushDeviceInput | 'denied' | 'unavailable' | 'refused'> {
  if (!there()) return 'unavailable';
  if ((await noticePermission()) !== 'granted' && (await askNoticePermission()) !== 'granted') return 'denied';
  const registration = await serviceWorker();
  if (!registration) return 'unavailable';
  const { pushManager } = registration;
  try {
    const before = await pushManager.getSubscription();
    const same = before && base64urlOf(before.options.applicationServerKey) === key;
    // One for another server's key can bring nothing any more.
    if (before && !same) await before.unsubscribe();
    const subscription =
      before && same
        ? before
        : await pushManager.subscribe({ userVisibleOnly: true, applicationServerKey: bytesOf(key) });
    return {
      kind: 'browser',
      endpoint: subscription.endpoint,
      keys: { p256dh: base64urlOf(subscription.getKey('p256dh')), auth: base64urlOf(subscription.getKey('auth')) },
    };
  } catch {
    // Its service cannot be reached, or the browser has none.
    return 'refused';
  }
}

/** Nothing comes to this browser any more. */
export async function unsubscribePush(): Promise<void> {
  if (!there()) return;
  const registration = await navigator.serviceWorker.getRegistration();
  await (await registration?.pushManager.getSubscription())?.unsubscribe();
}
