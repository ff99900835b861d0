/**
 * Notices in a browser: expo-notifications asks for the permission, the service worker shows them. The browser has no
 * schedule of its own; the server's announcement is the moment.
 */
import type { Notice, NoticePermission } from './notice-types';
import { serviceWorker } from './service-worker';

const there = () => 'Notification' in globalThis && globalThis.isSecureContext;
// Late, because importing it costs 20 KiB and a warning; it is needed only once somebody wants notices.
const load = () => import('expo-notifications');

const permissionOf = (status: string): NoticePermission =>
  status === 'granted' || status === 'denied' ? status : 'default';

export async function noticePermission(): Promise<NoticePermission> {
  if (!there()) return 'unavailable';
  // Read without the package: every visit looks, few visits ask.
  return permissionOf(Notification.permission);
}

/** Asks the browser; only after a person said yes to our own question, because a refusal is for ever. */
export async function askNoticePermission(): Promise<NoticePermission> {
  if (!there()) return 'unavailable';
  const { requestPermissionsAsync } = await load();
  const { status, granted } = await requestPermissionsAsync();
  return granted ? 'granted' : permissionOf(status);
}

/** Shows it at once; false where it cannot. */
export async function showNotice(notice: Notice): Promise<boolean> {
  if ((await noticePermission()) !== 'granted') return false;
  const registration = await serviceWorker();
  if (!registration?.active) return false;
  registration.active.postMessage({ type: 'notify', notice });
  return true;
}

/** Only what is due now can be shown; null: not shown. */
export async function scheduleNotice(notice: Notice, at: number | null): Promise<string | null> {
  if (at !== null && at > Date.now()) return null;
  return (await showNotice(notice)) ? notice.tag : null;
}

export async function cancelNotice(tag: string): Promise<void> {
  const registration = await serviceWorker();
  for (const shown of (await registration?.getNotifications({ tag })) ?? []) shown.close();
}

/** A tap on a notice opens its address in this page, so that nothing typed is lost. @returns stops listening */
export async function onNoticeOpened(open: (url: string) => void): Promise<() => void> {
  if (!('serviceWorker' in navigator)) return () => {};
  const heard = ({ data, ports }: MessageEvent<{ type?: string; url?: string }>) => {
    if (data?.type !== 'open' || typeof data.url !== 'string') return;
    ports[0]?.postMessage(true);
    const address = new URL(data.url, location.origin);
    if (address.origin === location.origin) open(address.pathname + address.search);
  };
  navigator.serviceWorker.addEventListener('message', heard);
  return () => navigator.serviceWorker.removeEventListener('message', heard);
}
