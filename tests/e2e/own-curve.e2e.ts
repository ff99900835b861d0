import { afterAll, beforeAll, expect, test } from 'vitest';
import { NMC_MOHTAT_2020 } from '@/calc/parameters/nmc-mohtat-2020';
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
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

/** Eleven rows of a published curve, P. Mohtat et al. (2020), 10 mV lifted so that it is nobody else's. */
const rows = Array.from({ length: 11 }, (_, at) => {
  const index = Math.round((at / 10) * (NMC_MOHTAT_2020.soc.length - 1));
  return [NMC_MOHTAT_2020.soc[index]! * 100, NMC_MOHTAT_2020.volts[index]! + (at === 10 ? 0 : 0.01)] as const;
});
const lines = rows.map(([soc, volts]) => `${soc.toFixed(1)};${volts.toFixed(3)}`);
const csv = (list: readonly string[]) => ['charge in %;rest volts', ...list].join('\r\n');
const picture = Buffer.from([
  0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52, 0, 0,
]);
/** The group's volts of two such cells in series: out of the range of one. */
const doubled = rows.map(([soc, volts]) => `${soc.toFixed(1)};${(2 * volts).toFixed(3)}`);
const fallen = [...lines.slice(0, 5), `${rows[5]![0].toFixed(1)};3.401`, ...lines.slice(6)];

/** Files that are no curve, each with a sentence that says what to change. */
const bad: [name: string, content: string | Buffer, sentence: RegExp][] = [
  [
    'fallen.csv',
    csv(fallen),
    /Row 7: 3\.401\sV does not rise above .* of row 6\. Take out the one that was read wrong\./,
  ],
  [
    'two-cells.csv',
    csv(doubled),
    /Row 2: .*\sV cannot be a cell of this chemistry at rest.* Give the volts of one cell/,
  ],
  ['few.csv', csv(lines.slice(0, 4)), /4 points are too few\. Give 8 or more\./],
  ['photo.png', picture, /photo\.png is no plain text\. Save the table as CSV/],
  ['empty.csv', '', /empty\.csv is empty\. Choose another file/],
];

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'wide' }, { size: 'phone' }])(
  'what a manager teaches the workshop on a $size screen',
  ({ size }) => {
    const name = (step: string) => `teach-${step}-${size}`;
    let house: House;
    let manager: Visitor;
    beforeAll(async () => {
      house = await openHouse();
      manager = await member(house, 'manager', '/workshop/module-types/demo-type-six', { size });
    });
    afterAll(() => house?.close());

    async function listed<T>(path: string): Promise<T> {
      const answer = await manager.context.request.get(`${house.server.url}/api${path}`);
      expect(answer.status()).toBe(200);
      return (await answer.json()) as T;
    }
    const typeNow = async () =>
      (await listed<ModuleTypeDto[]>('/module-types')).find(({ id }) => id === 'demo-type-six')!;

    test(
      'a module type takes a curve out of a CSV file; files that are none are refused by name and row, and nothing of them is saved',
      async () => {
        const { page } = manager;
        const curve = page.getByRole('img', { name: /^Rest voltage rises with the charge/ }).locator('visible=true');
        await curve.first().waitFor();
        await curve.first().scrollIntoViewIfNeeded();
        await judge(manager, name('curve-published'));
        const published = await curve.first().locator('path').evaluateAll(longest);
        const { rev } = await typeNow();
        await button(page, 'Own curve from a CSV').click();
        const sheet = page.getByRole('dialog').filter({ hasText: 'Own curve' });
        await words(sheet, 'Nothing to save yet.').waitFor();
        const choose = async (file: string, content: string | Buffer) => {
          const chooser = page.waitForEvent('filechooser');
          await button(sheet, 'Choose a CSV file').click();
          const mimeType = file.endsWith('.png') ? 'image/png' : 'text/csv';
          await (await chooser).setFiles({ name: file, mimeType, buffer: Buffer.from(content) });
        };
        for (const [file, content, sentence] of bad) {
          await choose(file, content);
          await expect.poll(() => sheet.innerText(), patience).toMatch(sentence);
          expect(await button(sheet, 'Save the curve').getAttribute('aria-disabled'), file).toBe('true');
          await judge(manager, name(`curve-${file.replace('.', '-')}`));
        }
        expect((await typeNow()).rev).toBe(rev);
        expect((await typeNow()).ownCurve).toBeNull();

        await choose('measured.csv', csv(lines));
        await words(sheet, '11 points understood: semicolon, charge in per cent, one heading line skipped.').waitFor();
        await words(sheet, 'measured.csv').waitFor();
        const preview = sheet.getByRole('img', { name: /^Rest voltage rises/ }).first();
        await preview.waitFor();
        expect(await preview.locator('circle').count(), 'a dot for each point').toBe(11);
        await judge(manager, name('curve-understood'));
        await preview.scrollIntoViewIfNeeded();
        await judge(manager, name('curve-preview'));
        await button(sheet, 'Save the curve').click();
        await words(page, /^Plans of 6-series 52 Ah go by this curve now\.$/).waitFor();
        await words(page, /^Own curve, 11 points from 0\s% to 100\s% of charge\./).waitFor();
        const saved = (await typeNow()).ownCurve!;
        expect(saved.soc).toHaveLength(11);
        expect(saved.volts[4]).toBeCloseTo(Number(rows[4]![1].toFixed(3)), 9);
        expect(await curve.first().locator('path').evaluateAll(longest)).not.toBe(published);
        await words(page, /^Own curve, 11 points/).scrollIntoViewIfNeeded();
        await judge(manager, name('curve-own'));
        await page.reload();
        await words(page, /^Own curve, 11 points/).waitFor();
        await page.getByRole('button', { name: 'Rest voltage against charge, as a table' }).first().click();
        await judge(manager, name('curve-table'));

        await button(page, 'Take the own curve off').click();
        const confirm = page.getByRole('dialog').filter({ hasText: 'Take the own curve off?' });
        await judge(manager, name('curve-take-off'));
        await button(confirm, 'Take it off').click();
        await words(page, 'The published curve rules again.').waitFor();
        await button(page, 'Own curve from a CSV').waitFor();
        expect((await typeNow()).ownCurve).toBeNull();
        expect(manager.problems).toEqual([]);
      },
      slowTest,
    );

    test('a module type keeps its shares of the current in the cold and the warm and the volts a group comes up from; a charger its steps, derating and duty', async () => {
      const { page } = manager;
      await page.goto('/workshop/module-types/demo-type-six');
      await field(page, 'Under 10 °C').fill('140');
      await field(page, 'Over 45 °C').fill('50');
      await field(page, 'Precharge under').fill('3,1');
      await button(page, 'Save the type').click();
      await words(page, 'One field needs a change.').waitFor();
      await field(page, 'Precharge under').scrollIntoViewIfNeeded();
      await judge(manager, name('type-bad'));
      await field(page, 'Under 10 °C').fill('20');
      await button(page, 'Save the type').click();
      await words(page, '6-series 52 Ah is saved.').waitFor();
      expect(await typeNow()).toMatchObject({
        coldCurrentPercent: 20,
        warmCurrentPercent: 50,
        prechargeBelowVolts: 3.1,
      });

      await page.goto('/workshop/chargers/demo-charger-C2');
      const channel = page.getByRole('group', { name: 'Channel C2' }).locator('visible=true').first();
      await field(channel, 'Current step').fill('0,1');
      await field(channel, 'Gives current').fill('80');
      await field(channel, 'Less above').fill('35');
      const measured = channel.getByRole('checkbox', { name: /Leads are measured/ });
      expect(await measured.getAttribute('aria-checked')).toBe('true');
      await measured.click();
      await button(page, 'Save the charger').click();
      await expect.poll(() => page.locator('#root').innerText(), patience).toMatch(/One field needs a change\./);
      await field(channel, 'Then gives').scrollIntoViewIfNeeded();
      await judge(manager, name('charger-bad'));
      await field(channel, 'Then gives').fill('60');
      await measured.scrollIntoViewIfNeeded();
      await judge(manager, name('charger'));
      await button(page, 'Save the charger').click();
      await words(page, 'Two-way supply is saved.').waitFor();
      const saved = (await listed<ChargerDto[]>('/chargers')).find(({ id }) => id === 'demo-charger-C2');
      expect(saved?.channels[0]).toMatchObject({
        displayStepAmps: 0.1,
        dutyPercent: 80,
        deratingAboveCelsius: 35,
        deratingPercent: 60,
        leadsMeasured: false,
      });
    });

    test('a plan tells what closed charges have taught and of how many; it is left out of the times and put back', async () => {
      const { page } = manager;
      const asked = page.waitForResponse((answer) => /\/api\/plans$/.test(answer.url()) && answer.status() === 200);
      await page.goto('/plan?spare=demo-spare-S-0422&target=3.912');
      const dto = (await (await asked).json()) as PlanDto;
      await heading(page, 'Ways, soonest first').waitFor();
      const taught = dto.plan.options.flatMap(({ timeFactor }) => timeFactor ?? []);
      expect(taught.length).toBeGreaterThan(0);
      const line = words(page, /^Learned from \d+ charges?: (as reckoned|\d+\s% (longer|shorter) than reckoned)\.$/);
      await line.waitFor();
      const counted = Number(/\d+/.exec(await line.innerText())?.[0]);
      expect(taught.map(({ charges }) => charges)).toContain(counted);
      await line.scrollIntoViewIfNeeded();
      await judge(manager, name('learned'));
      const ways = page.getByRole('radiogroup', { name: 'Ways, soonest first' });
      const before = await ways.innerText();
      await button(page, 'without what was learned').click();
      await words(page, 'What closed charges have taught is left out of these times.').waitFor();
      await expect.poll(() => ways.innerText(), patience).not.toBe(before);
      await judge(manager, name('learned-out'));
      await button(page, 'with what was learned').click();
      await line.waitFor();
      await expect.poll(() => ways.innerText(), patience).toBe(before);
      expect(manager.problems).toEqual([]);
    });
  },
);

/** The longest outline of a drawing: the curve. */
const longest = (paths: (SVGElement | HTMLElement)[]): string =>
  paths.map((path) => path.getAttribute('d') ?? '').reduce((most, d) => (d.length > most.length ? d : most), '');
