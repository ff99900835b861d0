import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { describeInBrowser } from '../support/browser';
import {
  button,
  enter,
  field,
  heading,
  judge,
  openHouse,
  openRow,
  patience,
  slowTest,
  words,
  type House,
  type ScreenSize,
} from './house';

describeInBrowser('a logger’s file of a running charge', () => {
  let house: House;
  beforeAll(async () => {
    house = await openHouse();
  });
  afterAll(() => house?.close());

  const chargeOf = async (page: Page, id: string): Promise<ChargeDto> => {
    const answer = await page.context().request.get(`${house.server.url}/api/charges/${id}`);
    expect(answer.status()).toBe(200);
    return (await answer.json()) as ChargeDto;
  };
  const fromFile = async (page: Page, id: string) =>
    (await chargeOf(page, id)).readings.filter(({ source }) => source === 'file');

  /** Three minutes of a logger that writes every second, with the temperature under a name that tells nothing. */
  const logOf = (charge: ChargeDto): string => {
    const groups = charge.groups.length * charge.groups[0]!.volts;
    const amps = Math.abs(charge.option.amps) * (charge.direction === 'discharge' ? -1 : 1);
    const volts = charge.option.steps.some(({ way }) => way === 'terminals') ? groups : charge.groups[0]!.volts;
    const lines = Array.from({ length: 181 }, (_, s) => [
      `00:0${Math.floor(s / 60)}:${String(s % 60).padStart(2, '0')}`,
      volts.toFixed(3),
      'x',
      amps.toFixed(2),
      '23.0',
    ]).map((cells) => cells.join(';').replaceAll('.', ','));
    return ['Logger 3', 'Time;Voltage V;note;Current A;aux', ...lines, 'end of log'].join('\r\n');
  };

  const choose = async (page: Page, title: string, text: string) => {
    const chooser = page.waitForEvent('filechooser');
    await button(page, title).click();
    await (await chooser).setFiles({ name: 'bench 2.csv', mimeType: 'text/csv', buffer: Buffer.from(text) });
    await heading(page, 'What was understood').waitFor();
  };

  test.each<[ScreenSize, string]>([
    ['phone', 'R-2411'],
    ['wide', 'R-2417'],
  ])(
    'on a %s screen: chosen, a column changed, confirmed, seen on the charge; the same file again adds nothing',
    async (size, title) => {
      const visitor = await enter(house, 'technician', { size });
      const { page } = visitor;
      await openRow(page, title);
      const id = new URL(page.url()).pathname.split('/').at(-1)!;
      const text = logOf(await chargeOf(page, id));
      expect(await fromFile(page, id)).toEqual([]);
      await button(page, 'Add a logger’s file').click();
      await button(page, 'Choose a file').waitFor();
      await judge(visitor, `log-file-empty-${size}`);

      await choose(page, 'Choose a file', text);
      await words(page, 'Fewer columns than the others. (line 184)').waitFor();
      await words(page, '181 readings').waitFor();
      const aux = field(page, 'aux');
      expect(await aux.inputValue()).toBe('none');
      await aux.selectOption('celsius');
      await field(page, 'aux counts in').waitFor();
      const add = button(page, /^Add \d+ readings$/);
      await expect.poll(() => add.getAttribute('aria-disabled'), patience).not.toBe('true');
      // Nothing is kept before it is confirmed.
      expect(await fromFile(page, id)).toEqual([]);
      await judge(visitor, `log-file-preview-${size}`);

      await add.click();
      await words(page, 'out of a file').waitFor();
      await words(page, /23\s°C/).waitFor();
      const kept = await fromFile(page, id);
      expect(kept.length).toBeGreaterThanOrEqual(2);
      expect(kept.every(({ celsius }) => celsius === 23)).toBe(true);
      await judge(visitor, `log-file-kept-${size}`);

      await button(page, 'Add a logger’s file').click();
      await choose(page, 'Choose a file', text);
      await field(page, 'aux').selectOption('celsius');
      await words(page, 'All of its readings are here already.').waitFor();
      expect(await button(page, 'Add the readings').getAttribute('aria-disabled')).toBe('true');
      expect(await fromFile(page, id)).toHaveLength(kept.length);
      expect(visitor.problems).toEqual([]);
      await visitor.close();
    },
    slowTest,
  );
});
