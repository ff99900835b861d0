import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
  drawn,
  field,
  heading,
  judge,
  openHouse,
  patience,
  sentenceAt,
  signIn,
  stranger,
  words,
  type House,
} from './house';

/** An empty installation: from the first door to a workshop in which nothing is yet. */
describeInBrowser('an empty installation', () => {
  const manager = { email: 'odile@quayside.example.com', password: 'nine blue trolleys 4' };
  let house: House;
  let first: Visitor;
  beforeAll(async () => {
    house = await openHouse({ demo: false });
  });
  afterAll(() => house?.close());

  test('offers to create a workshop, refuses a common password with its reason, and lets the first manager in', async () => {
    first = await stranger(house, { expected: [/status of 400/] });
    const { page } = first;
    await page.goto('/');
    await words(page, /No workshop lives here yet/).waitFor();
    expect(await page.getByRole('button', { name: /Enter the demo/ }).count()).toBe(0);
    await judge(first, 'new-front-door');
    await button(page, 'Create a workshop').click();
    await heading(page, 'Create a workshop').waitFor();

    await button(page, 'Create the workshop').click();
    await expect.poll(() => field(page, 'Workshop').getAttribute('aria-invalid')).toBe('true');
    await judge(first, 'new-create-empty');

    await field(page, 'Workshop').fill('Quayside Cells');
    await field(page, 'Its clock').selectOption('Europe/Lisbon');
    await field(page, 'Your name').fill('Odile Farrow');
    await field(page, 'E-mail').fill(manager.email);
    const password = field(page, /^Password/);
    await page.getByRole('checkbox').click();
    for (const [bad, reason] of [
      ['short', /12/],
      ['password1234', /tried first/],
      ['ß'.repeat(40), /72/],
    ] as const) {
      await password.fill(bad);
      await button(page, 'Create the workshop').click();
      await expect.poll(() => sentenceAt(password), patience).toMatch(reason);
    }
    expect(await field(page, 'Workshop').inputValue()).toBe('Quayside Cells');
    await judge(first, 'new-create-refused');
    await password.fill(manager.password);
    await button(page, 'Create the workshop').click();
    await page.waitForURL('**/bench');
    await words(page, 'No charges. Plan one from a spare on the shelf.').waitFor();
    await judge(first, 'new-bench');
  });

  test.each([
    ['/spares', /No spares yet/],
    ['/spares/new', /No module types yet/],
    ['/alerts', /./],
    ['/waits', /No charge was finished/],
    ['/plan', /./],
    ['/workshop?section=chargers', /charger/i],
    ['/workshop?section=module-types', /type/i],
    ['/workshop?section=meters', /meter/i],
    ['/workshop?section=resistors', /resistor/i],
    ['/workshop?section=walls', /wall/i],
    ['/workshop?section=people', /Odile Farrow/],
  ] as const)('%s says that nothing is there, and what comes first', async (address, sentence) => {
    await first.page.goto(address);
    await drawn(first.page);
    await words(first.page, sentence).waitFor();
    await judge(first, `new${address.replace(/\W+/g, '-')}`);
    expect(await seen(first.page)).not.toMatch(/undefined|NaN|null|Infinity/);
  });

  test('a wall of an empty workshop, a wide bench and the sign-in again by password', async () => {
    await first.close();
    const again = await signIn(house, manager, { size: 'wide' });
    await words(again.page, /No charges/).waitFor();
    await judge(again, 'new-bench-wide');
    await again.close();
  });

  const seen = (page: Page) => page.locator('#root').innerText();
});
