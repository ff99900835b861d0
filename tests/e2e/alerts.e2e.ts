import Database from 'better-sqlite3';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { databaseFile } from '@/server/data-files';
import type { SessionDto } from '@/shared/contract/session';
import { describeInBrowser, type Visitor } from '../support/browser';
import { launch } from '../support/launch';
import {
  button,
  field,
  heading,
  judge,
  link,
  member,
  openHouse,
  patience,
  slowTest,
  words,
  type House,
  type ScreenSize,
} from './house';

const sizes: { size: ScreenSize; other: ScreenSize }[] = [
  { size: 'phone', other: 'wide' },
  { size: 'wide', other: 'phone' },
];
const minute = 60_000;
const allWays = ['E-mail to Ines Marlow', 'Push to a browser to Ines Marlow', 'Push to a phone to Ines Marlow'];

/** Alerts of the demo's technician, from the cause to what the stand-ins of the services outside have got. */
describeInBrowser.each(sizes)('an alert and where it goes, on a $size screen', ({ size, other }) => {
  // The server is stopped and started on purpose: what the browser says about that is expected, and nothing else.
  const expected = [/ERR_CONNECTION_REFUSED|ERR_CONNECTION_RESET|ERR_EMPTY_RESPONSE|ERR_FAILED|WebSocket connection/];
  const name = (step: string) => `alerts-${step}-${size}`;
  let house: House;
  let technician: Visitor;
  /** The same person on another device. */
  let second: Visitor;
  let foreman: Visitor;
  beforeAll(async () => {
    house = await openHouse();
    const context = { permissions: ['notifications'] };
    technician = await member(house, 'technician', '/me/alerts', { size, expected, context });
    second = await member(house, 'technician', '/alerts', { size: other, expected });
    foreman = await member(house, 'foreman', '/alerts', { size: other, expected });
  });
  afterAll(() => house?.close());

  function inDatabase<Answer>(ask: (database: Database.Database) => Answer): Answer {
    const database = new Database(databaseFile(house.server.dataDir));
    try {
      return ask(database);
    } finally {
      database.close();
    }
  }

  /** The promise of a charge runs out while the server is off; what fell due meanwhile is found when it starts. */
  async function becomesLate(repair: string): Promise<void> {
    const { dataDir, port } = house.server;
    await house.server.stop({ keepData: true });
    const { changes } = inDatabase((database) =>
      database
        .prepare('UPDATE charge SET planned_late_at = $at, next_due_at = $at WHERE repair_ref = $repair')
        .run({ at: Date.now() - minute, repair }),
    );
    expect(changes).toBe(1);
    house.server = await launch({ demo: true, dataDir, port });
    await expect.poll(() => stateOf('overdue', repair).length, patience).toBeGreaterThan(0);
  }

  /** The technician's entries in the outbox for an alert of a charge. */
  const stateOf = (kind: string, repair: string): { way: string; state: string; held: number }[] =>
    inDatabase((database) =>
      database
        .prepare<unknown[], { way: string; state: string; held: number }>(
          `SELECT way, state, held_at IS NOT NULL AS held FROM outbox_entry
           WHERE person_id = 'demo-ines' AND alert_id IN
             (SELECT alert.id FROM alert JOIN charge ON charge.id = alert.charge_id
              WHERE alert.kind = ? AND charge.repair_ref = ?)
           ORDER BY way`,
        )
        .all(kind, repair),
    );

  /** What the mailbox has for the technician of one alert, when nothing is under way to them any more. */
  async function arrived(kind: string, title: string): Promise<string[]> {
    const repair = /R-\d+/.exec(title)?.[0] ?? '';
    const isUnderWay = () => stateOf(kind, repair).some(({ state, held }) => state === 'waiting' && held === 0);
    await expect.poll(isUnderWay, patience).toBe(false);
    const { page } = technician;
    await page.goto('/demo/mailbox');
    await page.getByRole('list', { name: 'What was sent' }).waitFor();
    const rows = await page.getByRole('listitem').filter({ hasText: title }).allInnerTexts();
    // Twice the same would be marked, and is in none of the expected lines.
    return rows
      .map((row) => row.split('\n').find((line) => /came again|to Ines Marlow$/.test(line)) ?? '')
      .filter((line) => line !== '')
      .sort();
  }

  test(
    'the technician has pushes sent to this browser and gets a phone of the demo',
    async () => {
      const { page } = technician;
      await button(page, 'Send pushes here').click();
      await button(page, 'Stop pushes here').waitFor();
      await judge(technician, name('settings'));
      await page.goto('/more');
      await link(page, /^Mailbox of the demo/).click();
      await heading(page, 'Mailbox of the demo').waitFor();
      await button(page, 'Give me a phone of the demo').click();
      await words(page, 'You have a phone of the demo.').waitFor();
      await judge(technician, name('mailbox-phone'));
    },
    slowTest,
  );

  test(
    'a charge that has become overdue is told once by each way, and its letter is read as HTML and as text',
    async () => {
      await becomesLate('R-2411');
      expect(await arrived('overdue', 'Overdue: R-2411 at A2')).toEqual(allWays);
      const { page } = technician;
      await page.getByRole('radio', { name: /^E-mail/ }).click();
      await button(page, /^Read number \d+: Overdue: R-2411 at A2, to Ines Marlow$/).click();
      const letter = page.frameLocator('iframe[title="Letter: Overdue: R-2411 at A2"]');
      await letter.getByRole('heading', { name: 'R-2411 at A2' }).waitFor();
      await judge(technician, name('letter'));
      await page.getByRole('radio', { name: 'Text', exact: true }).click();
      await words(page, /Open Bidewell to take it\./).waitFor();
      await judge(technician, name('letter-text'));
    },
    slowTest,
  );

  test(
    'taken on one device it stops on the other and at the foreman’s, and goes on to nobody',
    async () => {
      const take = (visitor: Visitor) => button(visitor.page, 'I have it: R-2411 at A2');
      await technician.page.goto('/alerts');
      await Promise.all([technician, second, foreman].map((visitor) => take(visitor).waitFor()));
      await judge(technician, name('alerts'));
      await take(technician).click();
      for (const visitor of [technician, second, foreman])
        await expect.poll(() => take(visitor).count(), patience).toBe(0);
      await words(foreman.page, /Ines has it/).waitFor();
      await words(second.page, /you have it/i).waitFor();
      const next = inDatabase((database) =>
        database
          .prepare<unknown[], { pass_due_at: number | null }>(
            `SELECT pass_due_at FROM alert WHERE kind = 'overdue' AND taken_by_id = 'demo-ines' AND cleared_at IS NULL`,
          )
          .all(),
      );
      expect(next).toEqual([{ pass_due_at: null }]);
      await judge(second, name('taken'));
    },
    slowTest,
  );

  test(
    'with e-mail off for overdue charges the next one comes by the two pushes alone',
    async () => {
      const { page } = technician;
      await page.goto('/me/alerts');
      await button(page, /^Overdue/).click();
      const sheet = page.getByRole('dialog');
      await sheet.getByRole('checkbox', { name: /^E-mail/ }).click();
      await judge(technician, name('ways'));
      await button(sheet, 'Save where it goes').click();
      await expect.poll(() => page.getByRole('dialog').count(), patience).toBe(0);
      await becomesLate('R-2409');
      expect(await arrived('overdue', 'Overdue: R-2409 at A1')).toEqual(allWays.slice(1));
    },
    slowTest,
  );

  test(
    'in quiet hours that hold for alarms too nothing is sent, and what waited comes once when they are taken off',
    async () => {
      const { page } = technician;
      const session = (await (
        await technician.context.request.get(`${house.server.url}/api/session`)
      ).json()) as SessionDto;
      // Around now, whatever the hour is at which this runs.
      const clock = (hours: number) =>
        new Intl.DateTimeFormat('en-GB', {
          timeZone: session.workshop.zone,
          hour: '2-digit',
          minute: '2-digit',
        }).format(Date.now() + hours * 60 * minute);
      await page.goto('/me/alerts');
      await field(page, 'From').fill(clock(-1));
      await field(page, 'To').fill(clock(3));
      await page.getByRole('checkbox', { name: /^Alarms come all the same/ }).click();
      await button(page, 'Save the quiet hours').click();
      await words(page, /^From \d\d:\d\d to \d\d:\d\d on the clock of the workshop/).waitFor();
      await judge(technician, name('quiet'));

      await foreman.page.goto('/bench');
      await foreman.page
        .getByRole('link', { name: /^R-2411, / })
        .or(foreman.page.getByRole('button', { name: 'Open R-2411', exact: true }))
        .locator('visible=true')
        .first()
        .click();
      await button(foreman.page, 'A2 is out of order').click();
      const sheet = foreman.page.getByRole('dialog');
      await sheet.getByRole('radio', { name: 'No current though it is switched on' }).click();
      await judge(foreman, name('fault-sheet'));
      await button(sheet, 'It is out of order').click();
      await button(foreman.page, 'A2 works again').waitFor();
      await judge(foreman, name('fault'));
      await expect
        .poll(() => stateOf('channel-fault', 'R-2411').map(({ state, held }) => `${state} ${held}`), patience)
        .toEqual(['waiting 1', 'waiting 1', 'waiting 1']);
      expect(await arrived('channel-fault', 'Channel out of order: R-2411 at A2')).toEqual([]);

      await page.goto('/me/alerts');
      await button(page, 'No quiet hours').click();
      await words(page, /^None: every alert comes at once/).waitFor();
      await expect
        .poll(() => stateOf('channel-fault', 'R-2411').map(({ state }) => state), patience)
        .toEqual(['sent', 'sent', 'sent']);
      expect(await arrived('channel-fault', 'Channel out of order: R-2411 at A2')).toEqual(allWays);
      for (const visitor of [technician, second, foreman]) expect(visitor.problems).toEqual([]);
    },
    slowTest,
  );
});
