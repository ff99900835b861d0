import fs from 'node:fs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
  drawn,
  field,
  heading,
  judge,
  member,
  openHouse,
  patience,
  stranger,
  words,
  type House,
  type ScreenSize,
} from './house';

const sizes: { size: ScreenSize; other: ScreenSize }[] = [
  { size: 'phone', other: 'wide' },
  { size: 'wide', other: 'phone' },
];

describeInBrowser.each(sizes)('a foreman’s day on a $size screen', ({ size, other }) => {
  const name = (step: string) => `foreman-${step}-${size}`;
  let house: House;
  let foreman: Visitor;
  beforeAll(async () => {
    house = await openHouse();
    foreman = await member(house, 'foreman', '/alerts', { size });
  });
  afterAll(() => house?.close());

  test('takes the alert of the overdue charge, and a technician’s screen names who has it without a reload', async () => {
    const technician = await member(house, 'technician', '/alerts', { size: other });
    await words(technician.page, 'R-2406').waitFor();
    const take = foreman.page
      .getByRole('button', { name: /^I have it: R-2406/ })
      .locator('visible=true')
      .first();
    await take.waitFor();
    await judge(foreman, name('alerts'));
    await judge(technician, `technician-alerts-${other}`);
    const id = await take.getAttribute('aria-label');
    await take.click();
    await expect.poll(() => foreman.page.getByRole('button', { name: id ?? '' }).count(), patience).toBe(0);
    await words(technician.page, /Hella has it/).waitFor();
    expect(technician.problems).toEqual([]);
    await technician.close();
  });

  test('releases a spare from quarantine, which a technician may not', async () => {
    const technician = await member(house, 'technician', '/spares/demo-spare-S-0391', { size: other });
    await heading(technician.page, 'S-0391').waitFor();
    const release = button(technician.page, 'Release');
    expect(await release.getAttribute('aria-disabled')).toBe('true');
    await words(technician.page, /It is released by .*Hella Brandt/).waitFor();
    await judge(technician, `technician-quarantine-${other}`);
    await technician.close();

    const { page } = foreman;
    await page.goto('/spares/demo-spare-S-0391');
    await button(page, 'Release').click();
    const sheet = page.getByRole('dialog');
    await heading(sheet, 'Release S-0391').waitFor();
    await judge(foreman, name('release'));
    await button(sheet, 'Release from quarantine').click();
    await button(page, 'Quarantine').waitFor();
    await judge(foreman, name('released'));
  });

  test('lets a wall in by the address of its picture', async () => {
    // A wall asks every five seconds, and 'not yet' is a 400 by RFC 8628.
    const wall = await stranger(house, { size: 'wall', expected: [/status of 400 .*\/api\/wall\/token/] });
    await wall.page.goto('/wall');
    const label = await wall.page.getByLabel(/^Address to approve this wall/).getAttribute('aria-label');
    const address = /approve\?code=.*$/.exec(label ?? '')?.[0] ?? '';
    const { page } = foreman;
    await page.goto(`/${address}`);
    await words(page, /^found, /).waitFor();
    await field(page, 'Name').fill('Hall');
    await button(page, 'Approve the wall').click();
    await words(page, 'Hall shows the board now.').waitFor();
    await heading(wall.page, 'Harbour Lane Traction').waitFor();
    expect(wall.problems).toEqual([]);
    await wall.close();
  });

  test('reads the waits, as a picture and as a table, and takes them away as CSV', async () => {
    const { page } = foreman;
    await page.goto('/waits');
    await heading(page, 'The charges behind it').waitFor();
    await judge(foreman, name('waits'));
    const saved = page.waitForEvent('download');
    await button(page, /, as a CSV file$/).click();
    const file = await (await saved).path();
    const lines = fs.readFileSync(file, 'utf8').trim().split(/\r?\n/);
    const count = Number(/(\d+) charges/.exec(await page.locator('#root').innerText())?.[1]);
    expect(count).toBeGreaterThan(20);
    expect(lines).toHaveLength(count + 1);
    // Every row has as many cells as the head.
    const head = lines[0]!.split(/[,;]/).length;
    expect(head).toBeGreaterThan(5);

    await button(page, /, as a table$/).click();
    await drawn(page);
    await judge(foreman, name('waits-table'));
    await field(page, 'Period').selectOption('4');
    await expect.poll(() => page.url(), patience).toContain('weeks=4');
    expect(foreman.problems).toEqual([]);
  });
});
