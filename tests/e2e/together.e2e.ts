import { setTimeout as pause } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, shot, type Visitor } from '../support/browser';
import { pairAsWall } from '../support/demo';
import { launch } from '../support/launch';
import { button, enter, heading, judge, member, openHouse, openRow, stranger, words, type House } from './house';

/** Three browsers and one workshop: what one does the others show by themselves; a server that dies is waited for. */
describeInBrowser('several browsers together', () => {
  // The server is killed on purpose: what the browser says about that is expected, and nothing else.
  const expected = [
    /ERR_CONNECTION_REFUSED|ERR_CONNECTION_RESET|ERR_EMPTY_RESPONSE|ERR_FAILED|Failed to fetch|WebSocket connection/,
  ];
  let house: House;
  let technician: Visitor;
  let foreman: Visitor;
  let wall: Visitor;

  beforeAll(async () => {
    house = await openHouse();
    technician = await enter(house, 'technician', { size: 'phone', expected });
    foreman = await member(house, 'foreman', '/bench', { size: 'wide', expected });
    wall = await stranger(house, { size: 'wall', expected });
    await pairAsWall(wall.context, foreman.context, house.server.url);
    await wall.page.goto('/wall');
    await heading(wall.page, 'Harbour Lane Traction').waitFor();
    await row(foreman, 'Charging').waitFor();
    await wallRow('Charging').waitFor();
  });
  afterAll(() => house?.close());

  /** The demo's R-2411 on the wide bench, in a stage. */
  const row = ({ page }: Visitor, stage: string) =>
    page
      .getByRole('link', { name: new RegExp(`^R-2411, ${stage}`, 'i') })
      .locator('visible=true')
      .first();
  const wallRow = (stage: string) =>
    wall.page.getByRole('listitem', { name: new RegExp(`R-2411.*${stage}`, 'i') }).first();
  /** A mark that a reload would take away. */
  const stay = ({ page }: Visitor) => page.evaluate(() => void Object.assign(window, { stayed: true }));
  const stayed = ({ page }: Visitor) => page.evaluate(() => 'stayed' in window);

  test('a charge held on the phone is held on the wide bench and on the wall without a reload, and so when it is resumed', async () => {
    await stay(foreman);
    await stay(wall);
    await openRow(technician.page, 'R-2411');
    await button(technician.page, 'Hold').click();
    const sheet = technician.page.getByRole('dialog');
    await sheet.getByRole('radio', { name: 'Too warm, to cool down' }).click();
    await button(sheet, 'It is off: hold the charge').click();
    await Promise.all([
      row(foreman, 'Held').waitFor(),
      wallRow('Held').waitFor(),
      words(technician.page, /^Held/).waitFor(),
    ]);
    await judge(foreman, 'together-held-bench');
    await judge(wall, 'together-held-wall');
    await button(technician.page, 'Resume').click();
    await Promise.all([row(foreman, 'Charging').waitFor(), wallRow('Charging').waitFor()]);
    expect([await stayed(foreman), await stayed(wall)]).toEqual([true, true]);
  });

  test('two act on the same charge: the one who comes second is told how it stands', async () => {
    const { page } = foreman;
    await openRow(page, 'R-2411');
    await button(page, 'Hold').click();
    const second = page.getByRole('dialog');
    await second.getByRole('radio', { name: 'Nobody is there to look in' }).click();
    await button(technician.page, 'Hold').click();
    const first = technician.page.getByRole('dialog');
    await first.getByRole('radio', { name: 'Too warm, to cool down' }).click();
    // The foreman's press is on its way, and held there until the technician's is answered: always the second.
    let letGo = () => {};
    const answered = new Promise<void>((resolve) => (letGo = resolve));
    await page.route('**/api/charges/*/hold', async (route) => {
      await answered;
      await route.continue();
    });
    const refused = page.waitForResponse((answer) => answer.url().endsWith('/hold'));
    const taken = technician.page.waitForResponse((answer) => answer.url().endsWith('/hold'));
    const pressed = page.waitForRequest((request) => request.url().endsWith('/hold'));
    await button(second, 'It is off: hold the charge').click();
    await pressed;
    await button(first, 'It is off: hold the charge').click();
    expect((await taken).status()).toBe(200);
    letGo();
    expect((await refused).status()).toBe(412);
    await page.unroute('**/api/charges/*/hold');
    // Who was quicker, and how it stands now; the charge behind the sheet is held already.
    await words(page, /held it at \d\d:\d\d; this is how it stands now\. Look at it again, then decide\./).waitFor();
    await words(page, /^Held/).waitFor();
    await words(technician.page, /^Held/).waitFor();
    expect(foreman.problems.filter((line) => !/status of 412/.test(line))).toEqual([]);
    expect(foreman.problems).toHaveLength(1);
    foreman.problems.length = 0;
    expect(technician.problems).toEqual([]);
    await page.keyboard.press('Escape');
    await technician.page.goto('/bench');
    await page.goto('/bench');
    await row(foreman, 'Held').waitFor();
  });

  test('a killed server: each screen says since when it is old; started again on the same data, all recover without a reload', async () => {
    await stay(foreman);
    await stay(wall);
    await stay(technician);
    const { dataDir, port } = house.server;
    await house.server.stop({ signal: 'SIGKILL', keepData: true });
    const killed = Date.now();
    // The wall: for 30 s as before.
    const live = wall.page.getByText(/^live, heard/);
    expect(await live.count()).toBe(1);
    await Promise.all([
      words(technician.page, /No connection since \d\d:\d\d\. Readings you log are kept on this phone/).waitFor(),
      words(foreman.page, /No connection since/).waitFor(),
    ]);
    await judge(technician, 'together-offline-phone');
    await judge(foreman, 'together-offline-wide');
    // Then a hollow ring and when it was heard, no longer 'live'.
    await expect.poll(() => live.count(), { timeout: 60_000 }).toBe(0);
    expect(Date.now() - killed).toBeGreaterThan(20_000);
    await words(wall.page, /^heard \d\d:\d\d:\d\d/).waitFor();
    await shot(wall.page, 'together-wall-quiet');

    house.server = await launch({ demo: true, dataDir, port });
    await live.waitFor();
    await expect.poll(() => technician.page.getByText(/No connection since/).count(), { timeout: 60_000 }).toBe(0);
    await expect.poll(() => foreman.page.getByText(/No connection since/).count(), { timeout: 60_000 }).toBe(0);

    // Live again, and not only connected: a change reaches all of them.
    await openRow(technician.page, 'R-2411');
    await button(technician.page, 'Resume').click();
    await Promise.all([row(foreman, 'Charging').waitFor(), wallRow('Charging').waitFor()]);
    expect([await stayed(foreman), await stayed(wall), await stayed(technician)]).toEqual([true, true, true]);
    await judge(foreman, 'together-again');
    for (const visitor of [technician, foreman, wall]) expect(visitor.problems).toEqual([]);
  }, 300_000);

  test('after two minutes without a word the wall’s header is the amber band and its times are old', async () => {
    // The page's clock is moved instead of waiting; the server's time comes with its words, so it must be away.
    const { dataDir, port } = house.server;
    const still = await stranger(house, { size: 'wall', expected });
    await pairAsWall(still.context, foreman.context, house.server.url);
    await still.page.clock.install();
    await still.page.goto('/wall');
    await heading(still.page, 'Harbour Lane Traction').waitFor();
    // The app is kept on the device some seconds after the first screen; a browser prints that it could not fetch it.
    await still.page.evaluate(async () => void (await navigator.serviceWorker.ready));
    await house.server.stop({ signal: 'SIGKILL', keepData: true });
    await still.page.clock.fastForward('02:20');
    await pause(200);
    await words(still.page, /^Not live since \d\d:\d\d\. Times below are old\.$/).waitFor();
    await judge(still, 'together-wall-old');
    house.server = await launch({ demo: true, dataDir, port });
    await still.page.clock.fastForward('01:10');
    await expect.poll(() => still.page.getByText(/^Not live since/).count(), { timeout: 60_000 }).toBe(0);
    await still.close();
  }, 300_000);
});
