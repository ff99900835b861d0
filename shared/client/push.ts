/** Pushes to a phone, through expo-notifications. The web has its own file beside this one. */
import type { PushDeviceInput } from '@/shared/contract/alert-settings';
import { askNoticePermission, noticePermission } from './notify';
import type { PushHere } from './push-types';
import { recall, remember } from './storage';

const load = () => import('expo-notifications');
const key = 'push.on';

/** Whether pushes can come to this phone, and whether it has told its token. */
export async function pushHere(): Promise<PushHere> {
  const permission = await noticePermission();
  if (permission === 'denied' || permission === 'unavailable') return permission;
  return permission === 'granted' && recall(key) === 'yes' ? 'on' : 'off';
}

/** Asks for the permission where it was not given. @returns the phone's token; a word why not */
export async function subscribePush(
  _serverKey: string,
): Promise<PushDeviceInput | 'denied' | 'unavailable' | 'refused'> {
  if ((await noticePermission()) !== 'granted' && (await askNoticePermission()) !== 'granted') return 'denied';
  try {
    const { getExpoPushTokenAsync } = await load();
    const { data } = await getExpoPushTokenAsync();
    remember(key, 'yes');
    return { kind: 'phone', token: data };
  } catch {
    return 'refused';
  }
}

/** Nothing comes to this phone any more: the server forgets its token, this remembers that it did. */
export async function unsubscribePush(): Promise<void> {
  remember(key, 'no');
}
