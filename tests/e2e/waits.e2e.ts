import fs from 'node:fs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { WaitsDto } from '@/shared/contract/waits';
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
  slowTest,
  words,
  type House,
  type ScreenSize,
} from './house';

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'phone' }, { size: 'wide' }])(
  'a manager and the waits on a $size screen',
  ({ size }) => {
    const name = (step: string) => `waits-${step}-${size}`;
    let house: House;
    let manager: Visitor;
    beforeAll(async () => {
      house = await openHouse();
      manager = await member(house, 'manager', '/waits', { size });
    });
    afterAll(() => house?.close());
    const counted = async (): Promise<number> =>
      Number(/(\d+) charges?\b/.exec(await manager.page.locator('#root').innerText())?.[1]);

    test('narrows them, and a reload shows the same charges', { timeout: slowTest }, async () => {
      const { page } = manager;
      await heading(page, 'The charges behind it').waitFor();
      const all = await counted();
      await button(page, /^More filters/).click();
      await field(page, 'Weekday').selectOption({ label: 'Tuesday' });
      await expect.poll(() => page.url(), patience).toContain('weekday=2');
      await expect.poll(counted, patience).toBeLessThan(all);
      const tuesdays = await counted();
      await page.reload();
      await heading(page, 'The charges behind it').waitFor();
      await drawn(page);
      expect(await counted()).toBe(tuesdays);
      await words(page, 'Only Tuesday.').waitFor();
      await judge(manager, name('narrowed'));
    });

    test('leads to the charges behind a number, and their CSV has as many rows', { timeout: slowTest }, async () => {
      const { page } = manager;
      const tuesdays = await counted();
      await page.getByRole('link', { name: /Wait of one charge/ }).click();
      await heading(page, 'Charges').waitFor();
      await page.waitForURL(/\/waits\/charges\?.*weekday=2/);
      await words(page, new RegExp(`^That is all ${tuesdays}\\.$`)).waitFor();
      await judge(manager, name('charges'));
      const saved = page.waitForEvent('download');
      await button(page, 'The charges, as a CSV file').click();
      const lines = fs
        .readFileSync(await (await saved).path(), 'utf8')
        .trim()
        .split(/\r?\n/);
      expect(lines).toHaveLength(tuesdays + 1);
      await button(page, 'Back to the waits').click();
      await heading(page, 'The charges behind it').waitFor();
      expect(page.url()).toContain('weekday=2');
    });

    test('compares with the weeks before, and says how', { timeout: slowTest }, async () => {
      const { page } = manager;
      await button(page, 'Clear the filters').click();
      await field(page, 'Compare with').selectOption('before');
      await expect.poll(() => page.url(), patience).toContain('compare=before');
      await words(page, /rank test p|No difference is reckoned/).waitFor();
      await judge(manager, name('compared'));
    });

    test('replays what would shorten it: two levers alone and together', { timeout: slowTest }, async () => {
      const { page } = manager;
      const shorten = page.getByRole('region', { name: 'What would shorten it' });
      await shorten.getByRole('checkbox', { name: /^Start at booking/ }).click();
      await shorten.getByRole('checkbox', { name: /^Overnight allowed/ }).click();
      await button(shorten, 'Replay the charges').click();
      const done = shorten.getByText(/^Lost hours a week, now|^Needs 20 charges/).first();
      await done.waitFor();
      const answer = await manager.context.request.get(`${house.server.url}/api/waits`);
      const { charges } = (await answer.json()) as WaitsDto;
      // The demo has more than enough.
      expect(charges).toBeGreaterThan(20);
      await shorten.getByText('All 2 ticked together').waitFor();
      expect(await shorten.getByText(/^One charge: half under/).count()).toBe(3);
      await judge(manager, name('shortened'));
    });

    test('finds the shelf voltage of a type', { timeout: slowTest }, async () => {
      const shelf = manager.page.getByRole('region', { name: 'Shelf voltage' });
      await field(shelf, 'Spares of').selectOption({ index: 1 });
      await button(shelf, 'Find the shelf voltage').click();
      await shelf
        .getByText(/^Best at|^Needs 20 charges|cannot|missing/)
        .first()
        .waitFor();
      await judge(manager, name('shelf'));
    });
  },
);
