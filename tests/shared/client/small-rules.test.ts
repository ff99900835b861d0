import { describe, expect, it } from 'vitest';
import { scriptsOf } from '@/shared/client/new-build';
import { tokenIn } from '@/shared/client/one-use-token';
import { waitBefore } from '@/shared/client/query-client';
import { missingHere, type Surroundings } from '@/shared/client/secure-context';

describe('a pasted link', () => {
  const token = 'kV9_x2Pq-7LmNf31aZbC';
  it.each([
    [`http://192.168.1.5:4300/join?token=${token}`],
    [`  https://bench.example.com/join?token=${token}&x=1  `],
    [`Come in: https://bench.example.com/join?token=${token}`],
    [token],
  ])('%s holds its token', (pasted) => expect(tokenIn(pasted)).toBe(token));
  it.each([[''], ['hello'], ['https://bench.example.com/join'], ['a b c']])('%j holds none', (pasted) =>
    expect(tokenIn(pasted)).toBe(''),
  );
});

describe('what plain http switches off', () => {
  const all = { 'wake-lock': true, notifications: true, camera: true, 'service-worker': true };
  const here = (secure: boolean, has = all): Surroundings => ({ secure, has });

  it('is said in a sentence for each, naming https', () => {
    const missing = missingHere(['wake-lock', 'notifications', 'camera', 'service-worker'], here(false));
    expect(missing).toHaveLength(4);
    for (const { sentence } of missing) expect(sentence).toMatch(/https/);
  });
  it('is nothing on localhost or https', () => {
    expect(missingHere(['wake-lock', 'camera'], here(true))).toEqual([]);
  });
  it('names the browser, not the address, where only the browser lacks it', () => {
    const [missing] = missingHere(['wake-lock'], here(true, { ...all, 'wake-lock': false }));
    expect(missing!.sentence).toMatch(/browser cannot/);
    expect(missing!.sentence).not.toMatch(/https/);
  });
});

describe('waits between tries', () => {
  it('double, stay under 19 s and differ from screen to screen by half of their length', () => {
    const [shortest, longest] = [waitBefore(0, () => 0), waitBefore(0, () => 1)];
    expect([shortest, longest]).toEqual([375, 625]);
    expect(waitBefore(1, () => 0.5)).toBe(1000);
    expect(waitBefore(30, () => 1)).toBe(18_750);
  });
});

describe('a newer web app', () => {
  it('is known by the scripts its page names', () => {
    const page =
      '<head></head><body><script src="/_expo/b.js" defer></script><script>inline()</script><script src="/_expo/a.js"></script>';
    expect(scriptsOf(page)).toEqual(['/_expo/a.js', '/_expo/b.js']);
  });
});
