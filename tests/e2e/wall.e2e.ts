import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser } from '../support/browser';
import { button, field, heading, judge, member, openHouse, patience, stranger, words, type House } from './house';

/** A wall asks every five seconds, and 'not yet' is a 400 by RFC 8628. */
const stillWaiting = /status of 400 .*\/api\/wall\/token/;

describeInBrowser('a wall', () => {
  let house: House;
  beforeAll(async () => {
    house = await openHouse();
  });
  afterAll(() => house?.close());

  test('shows a code, is approved by a foreman, shows the board, may read nothing else, and goes back to a code when it is taken back', async () => {
    // The refused requests at the end are the test's own.
    const expected = [/status of 40[13]/, stillWaiting];
    const wall = await stranger(house, { size: 'wall', expected });
    await wall.page.goto('/wall');
    const shown = wall.page.getByLabel(/^Code( \S){9}$/);
    const code = ((await shown.textContent()) ?? '').trim();
    expect(code).toMatch(/^[BCDFGHJKLMNPQRSTVWXZ]{4}-[BCDFGHJKLMNPQRSTVWXZ]{4}$/);
    const address = await wall.page.getByLabel(/^Address to approve this wall/).getAttribute('aria-label');
    expect(address).toContain(`${house.server.url}/approve?code=`);
    await judge(wall, 'wall-pairing');

    const foreman = await member(house, 'foreman', '/approve', { expected: [/status of 404/] });
    await heading(foreman.page, 'Approve a wall').waitFor();
    const typed = field(foreman.page, 'Code on the screen');
    await typed.fill('BCDF-GHJK');
    await words(foreman.page, 'No screen shows this code now.').waitFor();
    // Typed as people type: small, with a space.
    await typed.fill(code.toLowerCase().replace('-', ' '));
    await words(foreman.page, /^found, /).waitFor();
    await field(foreman.page, 'Diagonal').fill('55 m');
    await button(foreman.page, 'Approve the wall').click();
    await expect.poll(() => field(foreman.page, 'Diagonal').getAttribute('aria-invalid'), patience).toBe('true');
    expect(await field(foreman.page, 'Diagonal').inputValue()).toBe('55 m');
    await field(foreman.page, 'Name').fill('Wall by the lift');
    await field(foreman.page, 'Diagonal').fill('55');
    await field(foreman.page, 'Farthest reader').fill('6,5');
    await judge(foreman, 'wall-approve');
    await button(foreman.page, 'Approve the wall').click();
    await words(foreman.page, 'Wall by the lift shows the board now.').waitFor();

    await heading(wall.page, 'Harbour Lane Traction').waitFor();
    await words(wall.page, /R-2411/).waitFor();
    await judge(wall, 'wall-board');

    const statuses = await wall.page.evaluate(async () => {
      const read = async (path: string, method = 'GET') => (await fetch(`/api${path}`, { method })).status;
      return {
        board: await read('/wall/board'),
        me: await read('/wall/me'),
        spares: await read('/spares'),
        people: await read('/people'),
        memberBoard: await read('/board'),
        charges: await read('/charges'),
        waits: await read('/waits'),
        approve: await read('/wall/approvals', 'POST'),
      };
    });
    const { board, me, ...rest } = statuses;
    expect([board, me]).toEqual([200, 200]);
    for (const [path, status] of Object.entries(rest)) expect([401, 403], path).toContain(status);

    await foreman.page.goto('/workshop?section=walls');
    await foreman.page.getByLabel('Take back Wall by the lift').locator('visible=true').click();
    const sheet = foreman.page.getByRole('dialog');
    await heading(sheet, 'Take back Wall by the lift?').waitFor();
    await judge(foreman, 'wall-take-back');
    await button(sheet, 'Take it back').click();
    await expect.poll(() => shown.count(), patience).toBe(1);
    expect((await shown.textContent())?.trim()).not.toBe(code);
    expect([...foreman.problems, ...wall.problems]).toEqual([]);
    await foreman.close();
    await wall.close();
  });

  test('a technician may not approve one, and is told who may', async () => {
    const technician = await member(house, 'technician', '/approve');
    await words(technician.page, /Walls are let in/).waitFor();
    await words(technician.page, /Hella Brandt/).waitFor();
    expect(await technician.page.getByLabel('Code on the screen').count()).toBe(0);
    await judge(technician, 'wall-approve-forbidden');
    await technician.close();
  });
});
