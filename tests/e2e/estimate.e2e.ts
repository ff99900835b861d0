import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser } from '../support/browser';
import {
  button,
  field,
  heading,
  judge,
  openHouse,
  sentenceAt,
  stranger,
  words,
  type House,
  type ScreenSize,
} from './house';

describeInBrowser('the quick estimate, without a sign-in', () => {
  let house: House;
  beforeAll(async () => {
    house = await openHouse({ demo: false });
  });
  afterAll(() => house?.close());

  // 61 Ah × 1 at 10 A between 3.60 and 3.97 V is some hours: the sentence must be a time with a band about it.
  const time = /\b\d+(\u00a0| )h( |\u00a0)\d\d\b|\b\d+(\u00a0| )min\b/;

  test.each<ScreenSize>(['phone', 'wide'])(
    'on a %s screen time and band stand there as one types, with the keyboard alone, and bad input keeps its text',
    async (size) => {
      const visitor = await stranger(house, { size });
      const { page } = visitor;
      await page.goto('/estimate');
      await heading(page, 'Quick estimate').waitFor();
      await words(page, /Type the six numbers/).waitFor();
      await judge(visitor, `estimate-empty-${size}`);

      // Keyboard only: from field to field with Enter, as the labels say.
      await field(page, 'Spare rests at').focus();
      await page.keyboard.type('3,612');
      await page.keyboard.press('Enter');
      await page.keyboard.type('39.68 V');
      await page.keyboard.press('Enter');
      await page.keyboard.type('66');
      await page.keyboard.press('Enter');
      await page.keyboard.press('Control+A');
      await page.keyboard.type('92');
      await page.keyboard.press('Enter');
      await page.keyboard.type('2');
      await page.keyboard.press('Enter');
      await page.keyboard.type('10');
      await page.keyboard.press('Tab');

      const target = field(page, 'Pack rests at');
      expect(await target.inputValue()).toBe('39.68 V');
      await expect.poll(() => target.getAttribute('aria-invalid')).toBe('true');
      const sentence = await sentenceAt(target);
      expect(sentence).toMatch(/[.?]$/);
      await words(page, 'A number above needs a change').waitFor();
      await judge(visitor, `estimate-bad-${size}`);

      for (const bad of ['3968', '3,968 V V', 'abc']) {
        await target.fill(bad);
        expect(await sentenceAt(target)).toMatch(/[.?]$/);
        expect(await target.inputValue()).toBe(bad);
      }

      await target.fill('');
      await page.keyboard.type('3,968');
      await words(page, 'Ready after').waitFor();
      const shown = async () => (await page.locator('main').innerText()).match(time)?.[0] ?? '';
      const first = await shown();
      expect(first).toMatch(time);
      await judge(visitor, `estimate-${size}`);

      // Twice the current: sooner, without a button.
      await field(page, 'Charger gives').fill('20');
      await expect.poll(shown).not.toBe(first);

      // Nothing typed is lost over a reload.
      await page.reload();
      expect(await field(page, 'Pack rests at').inputValue()).toBe('3,968');
      await words(page, 'Ready after').waitFor();

      await button(page, 'Clear').focus();
      await page.keyboard.press('Enter');
      expect(await field(page, 'Pack rests at').inputValue()).toBe('');
      expect(visitor.problems).toEqual([]);
      await visitor.close();
    },
  );
});
