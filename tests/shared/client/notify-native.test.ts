import { beforeEach, describe, expect, it, vi } from 'vitest';
import { showNotice } from '@/shared/client/notify';

const system = vi.hoisted(() => ({
  granted: true,
  getPermissionsAsync: vi.fn(async () => ({ granted: system.granted, canAskAgain: true })),
  scheduleNotificationAsync: vi.fn(async ({ identifier }: { identifier: string }) => identifier),
  SchedulableTriggerInputTypes: { DATE: 'date' },
}));
vi.mock('expo-notifications', () => system);

const notice = { title: 'R-2406 at B2', body: 'Switch it off.', url: '/charges/c1', tag: 'a1' };

beforeEach(() => void system.scheduleNotificationAsync.mockClear());

describe('a notice where the platform has expo-notifications', () => {
  it('is shown at once, under its cause, with the address that a tap opens', async () => {
    expect(await showNotice(notice)).toBe(true);
    expect(system.scheduleNotificationAsync.mock.calls).toEqual([
      [
        {
          identifier: 'a1',
          content: { title: notice.title, body: notice.body, data: { url: notice.url } },
          trigger: null,
        },
      ],
    ]);
  });

  it('is not shown where a person has not allowed it', async () => {
    system.granted = false;
    expect(await showNotice(notice)).toBe(false);
    expect(system.scheduleNotificationAsync).not.toHaveBeenCalled();
  });
});
