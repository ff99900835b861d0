import { describe, expect, it } from 'vitest';
import {
  keptForMs,
  makeKeptAnswers,
  mostChars,
  mostCharsOfOne,
  type KeptAnswer,
} from '@/shared/client/kept/kept-answers';

const now = Date.parse('2026-06-09T11:00:00.000Z');
const hour = 3600_000;

/** A browser's database, and the pages that open on it one after the other. */
function browser() {
  const rows = new Map<string, KeptAnswer>();
  const clock = { now };
  const open = (build = 'entry-a') =>
    makeKeptAnswers(
      {
        all: async () => [...rows],
        put: async (entries) => entries.forEach(([id, answer]) => rows.set(id, answer)),
        drop: async (ids) => ids.forEach((id) => rows.delete(id)),
        clear: async () => rows.clear(),
      },
      build,
      () => clock.now,
    );
  return { rows, clock, open };
}
const answer = (root: string, data: unknown = { rev: 1 }, at = now, ...more: string[]) => ({
  key: [root, ...more],
  at,
  data,
});
const keysOf = (answers: { key: readonly unknown[] }[]) => answers.map(({ key }) => key.join(' ')).sort();

describe('answers kept on the device', () => {
  it('come back after a restart as they were, with their age', async () => {
    const { open } = browser();
    const board = answer('board', { rev: 4, charges: [{ id: 'c1' }] }, now - hour);
    await open().keep('ines', [board, answer('charge', { id: 'c1' }, now, 'c1')]);
    const kept = await open().of('ines');
    expect(kept.find(({ key }) => key[0] === 'board')).toEqual(board);
    expect(keysOf(kept)).toEqual(['board', 'charge c1']);
  });

  it('are of one person only, and all go when somebody signs out', async () => {
    const { open, rows } = browser();
    const page = open();
    await page.keep('ines', [answer('board')]);
    expect(await page.of('bram')).toEqual([]);
    await page.keep('bram', [answer('board')]);
    await page.clear();
    expect([await page.of('ines'), await page.of('bram'), rows.size]).toEqual([[], [], 0]);
  });

  it('hold nothing of repairs and their customers, of a wall, of links or of open sessions elsewhere', async () => {
    const { open, rows } = browser();
    const page = open();
    for (const root of ['repairs', 'repair', 'search', 'sessions', 'link', 'wall-me', 'walls', 'invitations'])
      await page.keep('ines', [answer(root)]);
    await page.keep('ines', [answer('board', {}, now, 'wall')]);
    expect(rows.size).toBe(0);
  });

  it('lapse after 72 h, and with another build of the app', async () => {
    const { open, clock, rows } = browser();
    await open().keep('ines', [answer('board'), answer('alerts', [], now - 2 * hour)]);
    clock.now = now + keptForMs - hour;
    expect(keysOf(await open().of('ines'))).toEqual(['board']);
    expect(await open('entry-b').of('ines')).toEqual([]);
    // The next page that keeps something clears them away.
    await open('entry-b').keep('ines', [answer('people', [], clock.now)]);
    expect(rows.size).toBe(1);
  });

  it(`take at most ${mostChars / 1e6} million characters, the oldest go first; one over ${mostCharsOfOne / 1e6} million is not kept`, async () => {
    const { open } = browser();
    const page = open();
    const big = 'x'.repeat(mostCharsOfOne - 2);
    const count = Math.ceil(mostChars / mostCharsOfOne) + 3;
    for (let place = 0; place < count; place++)
      await page.keep('ines', [answer('charge', big, now - (count - place) * 1000, `c${place}`)]);
    await page.keep('ines', [answer('charge', `${big}xxx`, now, 'too-big')]);
    const kept = await page.of('ines');
    expect(kept.reduce((sum, { data }) => sum + (data as string).length + 2, 0)).toBeLessThanOrEqual(mostChars);
    const names = kept.map(({ key }) => key[1]);
    expect(names).toContain(`c${count - 1}`);
    expect(names).not.toContain('c0');
    expect(names).not.toContain('too-big');
  });
});
