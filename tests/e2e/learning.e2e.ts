import type { Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { AlertDto } from '@/shared/contract/alert';
import type { ChargeDto } from '@/shared/contract/charge';
import { describeInBrowser, type Visitor } from '../support/browser';
import { button, field, heading, judge, link, member, openHouse, patience, slowTest, words, type House } from './house';

/** A table that is seen, by its name. */
const table = (page: Page, name: string): Locator => page.getByRole('table', { name }).locator('visible=true').first();

/** What must hold of a screen, with this part of it in sight. */
async function judgeAt(visitor: Visitor, part: Locator, name: string): Promise<void> {
  await part.scrollIntoViewIfNeeded();
  await judge(visitor, name);
}

describeInBrowser('what a charge teaches, on a technician’s phone', () => {
  let house: House;
  let technician: Visitor;
  let ids: Record<string, string>;
  beforeAll(async () => {
    house = await openHouse();
    technician = await member(house, 'technician', '/bench', { size: 'phone' });
    const { charges } = await asked<{ charges: { id: string; title: string }[] }>('/board');
    ids = Object.fromEntries(charges.map(({ id, title }) => [title, id]));
  });
  afterAll(() => house?.close());

  async function asked<T>(path: string): Promise<T> {
    const answer = await technician.context.request.get(`${house.server.url}/api${path}`);
    expect(answer.status(), path).toBe(200);
    return (await answer.json()) as T;
  }
  const charge = (title: string) => asked<ChargeDto>(`/charges/${ids[title]}`);

  /** Fills the sheet of a reading and logs it, odd or not. */
  async function log(typed: Record<string, string>, meter?: string) {
    const { page } = technician;
    await button(page, 'Log a reading').click();
    const sheet = page.getByRole('dialog').filter({ hasText: 'Log a reading' });
    await field(sheet, 'Current').waitFor();
    if (meter) await field(sheet, 'Read with').selectOption({ label: meter });
    for (const [label, text] of Object.entries(typed)) await field(sheet, label).fill(text);
    return sheet;
  }
  const logged = async (how: 'fits' | 'odd' = 'fits') => {
    const then = how === 'fits' ? 'The finish is reckoned from it.' : 'It does not fit: see what to check.';
    await words(technician.page, `Logged. ${then}`).waitFor();
    await expect.poll(() => technician.page.getByRole('dialog').count(), patience).toBe(0);
  };

  test(
    'a reading that fits teaches; one of 0 A where 10 A are set is odd, alerts, is marked in the picture and its table, and goes once it is put right',
    async () => {
      const { page } = technician;
      await page.goto(`/charges/${ids['R-2411']}`);
      await heading(page, 'R-2411').waitFor();
      const { readings } = await charge('R-2411');
      let sheet = await log({ Current: '10,0', Module: '22' });
      // What the sheet itself expects now fits.
      const shown = await words(sheet, /^Expected /).innerText();
      await field(sheet, 'At the clips').fill(/(\d+\.\d\d)\sV/.exec(shown)![1]!);
      await button(sheet, 'Log it').click();
      await logged();
      const taught = page.getByRole('list', { name: 'Learned from this charge' }).locator('visible=true').first();
      await taught.waitFor();
      // Which of the three numbers a reading teaches most depends on how well each was known.
      expect(await taught.innerText()).toMatch(
        /(Capacity of a group, Ah|Resistance of a group, mΩ|Leads, mΩ)\s+before \d+\.\d+ \(\d+\.\d+–\d+\.\d+\)\s+\d+\.\d+ \(\d+\.\d+–\d+\.\d+\)/,
      );
      await judgeAt(technician, taught, 'learning-taught');
      const fits = await charge('R-2411');
      expect(fits.odd).toBeNull();
      const told = Object.values(fits.learned).filter((one) => one !== null);
      expect(told.length).toBeGreaterThan(0);
      for (const one of told) expect(one.sd).toBeLessThan(one.priorSd);

      sheet = await log({ Current: '0' });
      await field(sheet, 'Current').blur();
      await words(sheet, /No current flows\..* was expected\./).waitFor();
      await button(sheet, 'It reads so: log it').click();
      await logged('odd');
      const box = page.getByRole('region', { name: 'Odd reading' }).locator('visible=true').first();
      await box.waitFor();
      const text = await box.innerText();
      expect(text).toMatch(/No current flows\. \d+\.\d\sA was expected\./);
      expect(text).toMatch(/Check first: whether A2 is on, then the clips, then its set voltage\./);
      expect(text).toMatch(/nothing is learned from it/);
      expect((await charge('R-2411')).learned, 'nothing is learned from it').toEqual(fits.learned);
      await judgeAt(technician, box, 'learning-odd');

      // The picture marks it: an octagon in place of a dot; its table names it.
      const picture = heading(page, 'The picture');
      await picture.scrollIntoViewIfNeeded();
      const drawing = page
        .getByRole('img', { name: /^By the plan the groups reach/ })
        .locator('visible=true')
        .first();
      await expect.poll(() => drawing.locator('g[transform*="scale"]').count(), patience).toBe(1);
      await judgeAt(technician, picture, 'learning-odd-picture');
      await button(page, 'The picture, as a table').click();
      const read = table(page, 'Readings on the picture');
      await read.waitFor();
      const rows = await read.getByRole('row').allInnerTexts();
      expect(rows.filter((row) => /, odd/.test(row))).toHaveLength(1);
      expect(rows.at(-1)).toMatch(/^\d\d:\d\d, odd\s+–\s+0\.0$/);
      expect(rows).toHaveLength(1 + fits.readings.filter(({ replacedBy }) => replacedBy === null).length + 1);
      expect(fits.readings).toHaveLength(readings.length + 1);
      await judgeAt(technician, table(page, 'Planned volts and amps'), 'learning-odd-plan-table');
      await judgeAt(technician, read, 'learning-odd-table');

      const alerts = await asked<AlertDto[]>('/alerts');
      const standing = alerts.filter(
        ({ kind, chargeId, clearedAt }) => kind === 'no-current' && chargeId === ids['R-2411'] && clearedAt === null,
      );
      expect(standing.map(({ level, seen }) => `${level}: ${seen}`)).toEqual([
        expect.stringMatching(/^alarm: No current flows\. 10\.0\sA was expected\.$/),
      ]);
      await page.goto('/alerts');
      const alert = page
        .getByRole('region', { name: /^No current, R-2411/ })
        .locator('visible=true')
        .first();
      await alert.waitFor();
      expect(await alert.innerText()).toMatch(/No current flows[^]*Check first: whether A2 is on/);
      await judgeAt(technician, alert, 'learning-odd-alert');

      await page.goto(`/charges/${ids['R-2411']}`);
      await box.waitFor();
      await link(page, /^Correct the reading of/)
        .or(button(page, /^Correct the reading of/))
        .first()
        .click();
      const correction = page.getByRole('dialog').filter({ hasText: 'Correct a reading' });
      await field(correction, 'Current').fill('10');
      await field(correction, 'What was wrong').fill('The display was read after its timer had switched it off');
      await judge(technician, 'learning-correct');
      await button(correction, 'Put it right').click();
      await words(page, /The reading is put right\./).waitFor();
      await expect.poll(() => box.count(), patience).toBe(0);
      expect((await charge('R-2411')).odd).toBeNull();
      await taught.waitFor();

      // The same readings, the same bands.
      const before = { table: await taught.innerText(), learned: (await charge('R-2411')).learned };
      await page.reload();
      await taught.waitFor();
      expect({ table: await taught.innerText(), learned: (await charge('R-2411')).learned }).toEqual(before);
      await page.goto('/alerts');
      await heading(page, 'Alerts').waitFor();
      await expect.poll(() => page.getByRole('region', { name: /^No current, R-2411/ }).count(), patience).toBe(0);
      expect(technician.problems).toEqual([]);
    },
    slowTest,
  );

  test(
    'an LFP spare told by a bare voltage is refused with the band it would have; the band is taken, or the state of charge typed and ampere-hours counted from a known end',
    async () => {
      const { page } = technician;
      await page.goto('/plan?spare=demo-spare-S-0440&target=3.3');
      const refused = page.getByRole('alert').filter({ hasText: 'The voltage says too little here' }).first();
      await refused.waitFor();
      expect(await refused.innerText()).toMatch(/and end at\s+\d+\s*%\s+\(\d+–\d+\s%\)/);
      expect(await page.getByRole('radiogroup', { name: 'Ways, soonest first' }).count()).toBe(0);
      await judgeAt(technician, refused, 'learning-plateau');
      await button(page, 'Plan it all the same').click();
      await heading(page, 'Ways, soonest first').waitFor();
      await judge(technician, 'learning-plateau-taken');
      // Another target is another band: it is asked about again.
      await page.getByText('change spare, target or times').locator('visible=true').click();
      await field(page, 'Pack rests at').fill('3.31');
      await refused.waitFor();
      await button(page, 'Type the state of charge').click();
      const soc = field(page, 'Pack stands at');
      await soc.waitFor();
      await soc.fill('140');
      await soc.blur();
      await expect.poll(() => page.locator('#root').innerText(), patience).toMatch(/100\s%/);
      await expect.poll(() => refused.count(), patience).toBe(0);
      await judgeAt(technician, soc, 'learning-soc-bad');
      await soc.fill('58');
      await heading(page, 'Ways, soonest first').waitFor();
      await words(page, /Ends at \d+\s%\sof charge \(\d+–\d+\s%\)\./).waitFor();
      expect(await words(page, /^1\. To (full|empty)/).innerText()).toMatch(/\d+\.\d\sAh/);
      expect(await words(page, /^2\. Count (out|in)/).innerText()).toMatch(/\d+\.\d\sAh/);
      await judgeAt(technician, words(page, 'What it takes'), 'learning-soc');
    },
    slowTest,
  );

  test(
    'readings of the rest tell where it settles and when that is enough; the check may come early and is marked',
    async () => {
      const { page } = technician;
      const begin = await charge('R-2412');
      expect(begin.stage).toBe('resting');
      await page.goto(`/charges/${begin.id}`);
      await words(page, /Three readings of the groups during the rest tell where they settle/).waitFor();
      const zone = (await asked<{ zone: string }>('/workshop')).zone;
      const timeOf = (ms: number) =>
        new Date(ms).toLocaleTimeString('en-GB', { timeZone: zone, hour: '2-digit', minute: '2-digit' });
      const end = Date.parse(begin.currentEndAt!);
      for (const minutes of [3, 8, 12, 20]) {
        const volts = begin.targetVolts.toFixed(3);
        const sheet = await log(
          { 'Group 1': volts, 'Group 2': volts, 'Read at': timeOf(end + minutes * 60_000) },
          'Hand meter 1',
        );
        if (minutes === 3) await judge(technician, 'learning-rest-log');
        await button(sheet, 'Log it').click();
        await logged();
        if (minutes === 12) await judgeAt(technician, words(page, /^Rested enough (at about|since) /), 'learning-rest');
      }
      const settles = page.getByRole('group', { name: 'Where it settles' }).locator('visible=true').first();
      await settles.waitFor();
      expect(await settles.innerText()).toMatch(/G1 settles at 3\.94\d\sV \(3\.9\d\d–3\.9\d\d\)/);
      expect(await settles.innerText()).toMatch(
        /(Rested enough since \d\d:\d\d|Readings ten minutes apart agree): the check may come now\./,
      );
      await judgeAt(technician, settles, 'learning-settles');
      await button(page, 'Enter the group voltages').click();
      await heading(page, 'Check after rest').waitFor();
      await words(page, /a check before then counts and is marked early/).waitFor();
      for (const group of [1, 2]) await field(page, `Group ${group}`).fill((begin.targetVolts + 0.001).toFixed(3));
      await judge(technician, 'learning-early-check');
      await button(page, 'Save it: in tolerance').click();
      await words(page, 'R-2412 is ready.').waitFor();
      await words(page, /checked early/).waitFor();
      await judgeAt(technician, words(page, /checked early/), 'learning-early-ready');
      expect((await charge('R-2412')).restChecks.at(-1)).toMatchObject({ early: true, verdict: { within: true } });
    },
    slowTest,
  );

  test(
    'a check far off what was counted finds another capacity: taken on the spare’s page, it is what plans go by, and the history names the charge',
    async () => {
      const { page } = technician;
      const before = await charge('R-2409');
      await page.goto(`/charges/${before.id}/check`);
      await heading(page, 'Check after rest').waitFor();
      for (const group of [1, 2]) await field(page, `Group ${group}`).fill((before.targetVolts - 0.06).toFixed(3));
      await field(page, 'Meter').selectOption({ label: 'Hand meter 1' });
      await page.getByText('Save it, plan later').locator('visible=true').click();
      await page.waitForURL(`**/charges/${before.id}`);
      await page.goto(`/spares/${before.spare.id}`);
      const found = page
        .getByRole('region', { name: /a charge found another capacity/ })
        .locator('visible=true')
        .first();
      await found.waitFor();
      expect(await found.innerText()).toMatch(/found \d+\.\d\sAh a group, not 60\.9\sAh/);
      await judgeAt(technician, found, 'learning-found');
      const history = page.getByRole('list', { name: 'Capacity, told so far' }).locator('visible=true').first();
      await expect.poll(() => history.innerText(), patience).toMatch(/waits for an answer/);
      await button(page, /^Take \d/).click();
      await words(page, /^Plans go by \d+\.\d\sAh now\.$/).waitFor();
      await expect.poll(() => found.count(), patience).toBe(0);
      expect(await history.innerText()).toMatch(
        /read before and after a charge, \w+\s+(charge\s+)?\d+\.\d\sAh\s+±\d+\.\d\sAh/,
      );
      await judgeAt(technician, history, 'learning-taken');
      await link(history, /^Open the charge of/)
        .or(button(history, /^Open the charge of/))
        .first()
        .click();
      await page.waitForURL(`**/charges/${before.id}`);
      expect(technician.problems).toEqual([]);
    },
    slowTest,
  );

  test('a fitted charge leaves what it found of the capacity with its spare', async () => {
    const { page } = technician;
    const ready = await charge('R-2408');
    await page.goto(`/charges/${ready.id}`);
    await button(page, 'It is fitted').click();
    const sheet = page.getByRole('dialog');
    await heading(sheet, `Fit ${ready.spare.label}`).waitFor();
    await button(sheet, 'It is fitted').click();
    await expect.poll(async () => (await charge('R-2408')).stage, patience).toBe('fitted');
    await page.goto(`/spares/${ready.spare.id}`);
    const history = page.getByRole('list', { name: 'Capacity, told so far' }).locator('visible=true').first();
    await history.waitFor();
    expect(await history.innerText()).toMatch(/read before and after a charge, \w+[^]*\d+\.\d\sAh\s+±\d+\.\d\sAh/);
    await judgeAt(technician, history, 'learning-fitted');
  });
});
