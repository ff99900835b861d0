import { describe, expect, it } from 'vitest';
import { makeLease } from '@/shared/client/alone';

describe('pages without locks (plain http)', () => {
  function browser() {
    let now = 0;
    let ids = 0;
    const leases = new Map<string, { by: string; until: number } | null>();
    const wait = async (ms: number) => {
      now += ms;
      await new Promise((resolve) => setTimeout(resolve, 0));
    };
    const page = () =>
      makeLease({
        read: (name) => leases.get(name) ?? null,
        write: (name, lease) => void leases.set(name, lease),
        now: () => now,
        wait,
        newId: () => `page-${(ids += 1)}`,
      });
    return { page, wait, leases, pass: (ms: number) => (now += ms) };
  }

  it('do the same work one after the other, 20 of them', async () => {
    const { page, wait } = browser();
    let inside = 0;
    let most = 0;
    await Promise.all(
      Array.from({ length: 20 }, async () =>
        page()('queue', async () => {
          most = Math.max(most, (inside += 1));
          await wait(10);
          inside -= 1;
        }),
      ),
    );
    expect([most, inside]).toEqual([1, 0]);
  });

  it('go on after 8 s where the one at work was closed, or the device’s clock was set back', async () => {
    const { page, leases } = browser();
    leases.set('queue', { by: 'closed', until: 8000 });
    expect(await page()('queue', async () => 'done')).toBe('done');
    leases.set('queue', { by: 'ahead', until: 4_000_000 });
    expect(await page()('queue', async () => 'done')).toBe('done');
  });
});
