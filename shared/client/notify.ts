/** Notices on a phone's own system, through expo-notifications. The web has its own file beside this one. */
import type { Notice, NoticePermission } from './notice-types';

const load = () => import('expo-notifications');

export async function noticePermission(): Promise<NoticePermission> {
  const { getPermissionsAsync } = await load();
  const { granted, canAskAgain } = await getPermissionsAsync();
  return granted ? 'granted' : canAskAgain ? 'default' : 'denied';
}

/** Asks the system; only after a person said yes to our own question. */
export async function askNoticePermission(): Promise<NoticePermission> {
  const { requestPermissionsAsync } = await load();
  const { granted, canAskAgain } = await requestPermissionsAsync();
  return granted ? 'granted' : canAskAgain ? 'default' : 'denied';
}

/** Shows it at once; false where it cannot. */
export async function showNotice(notice: Notice): Promise<boolean> {
  return (await scheduleNotice(notice, null)) !== null;
}

/** Has the system show it at an instant (epoch ms), also with the app closed; null: at once. Gives its id, or null. */
export async function scheduleNotice(notice: Notice, at: number | null): Promise<string | null> {
  const { scheduleNotificationAsync, SchedulableTriggerInputTypes } = await load();
  if ((await noticePermission()) !== 'granted') return null;
  return scheduleNotificationAsync({
    identifier: notice.tag,
    content: { title: notice.title, body: notice.body, data: { url: notice.url } },
    trigger: at === null ? null : { type: SchedulableTriggerInputTypes.DATE, date: at },
  });
}

export async function cancelNotice(tag: string): Promise<void> {
  const { cancelScheduledNotificationAsync } = await load();
  await cancelScheduledNotificationAsync(tag);
}

/** A tap on a notice opens its address. @returns stops listening */
export async function onNoticeOpened(open: (url: string) => void): Promise<() => void> {
  const { addNotificationResponseReceivedListener } = await load();
  const listener = addNotificationResponseReceivedListener(({ notification }) => {
    const url = notification.request.content.data?.url;
    if (typeof url === 'string') open(url);
  });
  return () => listener.remove();
}
