import { useCallback, useEffect } from 'react';
import { useStore } from './external-store';
import type { NoticePermission } from './notice-types';
import { askNoticePermission, noticePermission, onNoticeOpened, showNotice } from './notify';
import { permissionStore, started } from './notify-state';
import { prefer, usePreferences } from './preferences';

export interface Notices {
  permission: NoticePermission | null;
  /** The moment to ask: the first charge was started here, and nobody was asked yet. */
  askNow: boolean;
  /** A person said yes to our own question: the system's question follows. */
  ask: () => Promise<NoticePermission>;
  /** Not now: not asked again by itself; the switch stays in More. */
  decline: () => void;
  /** Shows one to see that they come; false where none was shown. */
  test: () => Promise<boolean>;
}

/** Whether this device may tell what happens while the page is not looked at, and when to ask. */
export function useNotices(open?: (url: string) => void): Notices {
  const permission = useStore(permissionStore);
  const { noticeAsked } = usePreferences();
  const startedOne = useStore(started);

  useEffect(() => void noticePermission().then(permissionStore.set), []);

  useEffect(() => {
    if (!open || permission !== 'granted') return;
    let stop: (() => void) | null = null;
    let gone = false;
    void onNoticeOpened(open).then((off) => {
      if (gone) off();
      else stop = off;
    });
    return () => {
      gone = true;
      stop?.();
    };
  }, [open, permission]);

  return {
    permission,
    askNow: startedOne && permission === 'default' && !noticeAsked,
    ask: useCallback(async () => {
      prefer({ noticeAsked: true });
      const answer = await askNoticePermission();
      permissionStore.set(answer);
      return answer;
    }, []),
    decline: useCallback(() => prefer({ noticeAsked: true }), []),
    test: useCallback(
      () =>
        showNotice({
          title: 'Bidewell tells you here',
          body: 'So it looks when a charge of yours is done.',
          url: '/alerts',
          tag: 'test',
        }),
      [],
    ),
  };
}
