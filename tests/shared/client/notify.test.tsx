import { act, fireEvent, render, screen } from '@testing-library/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Notice } from '@/shared/client/notice-types';
import { useNotices } from '@/shared/client/notices';
import { permissionStore, started } from '@/shared/client/notify-state';
import { askNoticePermission, noticePermission, scheduleNotice, showNotice } from '@/shared/client/notify';
import { prefer } from '@/shared/client/preferences';
import { NoticePrompt } from '@/shared/ui/shell/notice-prompt';

// The root of Expo brings hot reload and globals that only Metro can load; its packages need of it what is in the core.
vi.mock('expo', async () => ({ ...(await import('expo-modules-core')), isRunningInExpoGo: () => false }));
// For browsers that are older than AbortController.
vi.mock('abort-controller/polyfill', () => ({}));

const notice: Notice = { title: 'R-2409', body: 'The check is due.', url: '/charges/c1', tag: 'a1' };

/** A browser with notifications and a service worker; notes what the worker is told. */
function browser(permission: NotificationPermission, answer: NotificationPermission = 'granted') {
  const told: unknown[] = [];
  const asked = vi.fn(async () => {
    notification.permission = answer;
    return answer;
  });
  const notification = Object.assign(function Notification() {}, { permission, requestPermission: asked });
  const registration = {
    active: { postMessage: (message: unknown) => told.push(message) },
    getNotifications: async () => [],
  };
  vi.stubGlobal('Notification', notification);
  vi.stubGlobal('isSecureContext', true);
  Object.defineProperty(navigator, 'serviceWorker', {
    configurable: true,
    value: {
      register: async () => registration,
      ready: Promise.resolve(registration),
      addEventListener() {},
      removeEventListener() {},
    },
  });
  return { told, asked };
}

beforeEach(() => {
  vi.unstubAllGlobals();
  permissionStore.set(null);
  started.set(false);
  prefer({ noticeAsked: false });
});

describe('notices in a browser', () => {
  it('ask for the permission through expo-notifications', async () => {
    const { asked } = browser('default');
    expect(await noticePermission()).toBe('default');
    expect(await askNoticePermission()).toBe('granted');
    expect(asked).toHaveBeenCalledTimes(1);
  });

  it('say that a person has refused', async () => {
    browser('default', 'denied');
    expect(await askNoticePermission()).toBe('denied');
  });

  it('are not to be had over plain http, and nobody is asked', async () => {
    const { asked } = browser('default');
    vi.stubGlobal('isSecureContext', false);
    expect([await noticePermission(), await askNoticePermission()]).toEqual(['unavailable', 'unavailable']);
    expect(asked).not.toHaveBeenCalled();
  });

  it('are shown by the service worker, where they were allowed', async () => {
    const { told } = browser('granted');
    expect(await showNotice(notice)).toBe(true);
    expect(told).toEqual([{ type: 'notify', notice }]);
    browser('denied');
    expect(await showNotice(notice)).toBe(false);
  });

  it('cannot be scheduled ahead by a page', async () => {
    browser('granted');
    expect(await scheduleNotice(notice, Date.now() + 60_000)).toBeNull();
    expect(await scheduleNotice(notice, Date.now())).toBe('a1');
  });
});

describe('the question before the browser’s', () => {
  const Shell = () => <NoticePrompt {...useNotices()} />;
  const question = () => screen.queryByText('Tell you when it is done?');
  const settle = () => act(async () => void (await Promise.resolve()));

  it('comes after the first started charge, never on loading the page', async () => {
    const { asked } = browser('default');
    render(<Shell />);
    await settle();
    expect(question()).toBeNull();
    act(() => started.set(true));
    expect(question()).toBeTruthy();
    expect(asked).not.toHaveBeenCalled();
    await act(async () => void fireEvent.click(screen.getByText('Tell me on this device')));
    await vi.waitFor(() => expect(asked).toHaveBeenCalledTimes(1));
    expect(question()).toBeNull();
  });

  it('is not asked twice after a no, and then the browser is never asked', async () => {
    const { asked } = browser('default');
    const first = render(<Shell />);
    await settle();
    act(() => started.set(true));
    fireEvent.click(screen.getByText('Not on this device'));
    expect(question()).toBeNull();
    first.unmount();
    render(<Shell />);
    await settle();
    expect(question()).toBeNull();
    expect(asked).not.toHaveBeenCalled();
  });

  it.each(['granted', 'denied'] as const)('is not asked where it is %s already', async (permission) => {
    browser(permission);
    render(<Shell />);
    await settle();
    act(() => started.set(true));
    expect(question()).toBeNull();
  });
});
