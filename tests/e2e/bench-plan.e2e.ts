import { randomUUID } from 'node:crypto';
import fs from 'node:fs';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { BenchPlanDto, MovePlacesDto } from '@/shared/contract/bench-plan';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
  heading,
  judge,
  member,
  openHouse,
  patience,
  untilMorning,
  words,
  type House,
  type ScreenSize,
} from './house';

/** The charge of the demo that waits in the queue. */
const queued = 'R-2418';

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'phone' }, { size: 'wide' }])(
  'the bench plan of a foreman on a $size screen',
  ({ size }) => {
    const name = (step: string) => `bench-plan-${step}-${size}`;
    let house: House;
    let foreman: Visitor;
    beforeAll(async () => {
      house = await openHouse({ clockAheadMs: untilMorning() });
      // A channel that is taken answers 409.
      foreman = await member(house, 'foreman', '/bench-plan', { size, expected: [/status of 409/] });
      await clearLane();
    });
    afterAll(() => house?.close());

    const url = (path: string) => `${house.server.url}/api${path}`;
    const read = async <T>(path: string) => (await (await foreman.context.request.get(url(path))).json()) as T;
    const send = (path: string, data: object) =>
      foreman.context.request.post(url(path), {
        data,
        headers: { origin: house.server.url, 'idempotency-key': randomUUID() },
      });
    const plan = () => read<BenchPlanDto>('/bench-plan');
    const rowOf = async () => (await plan()).queue.find(({ title }) => title === queued)!;
    const placesOf = async () => read<MovePlacesDto>(`/bench-plan/places?chargeId=${(await rowOf()).chargeId}`);
    const movedLater = ({ clipOnAt }: { clipOnAt: string }) =>
      expect.poll(async () => Date.parse((await rowOf()).clipOnAt), patience).toBeGreaterThan(Date.parse(clipOnAt));
    /** By night the next charge of the demo's queue stands close behind; without it the lane is free at any hour. */
    async function clearLane(): Promise<void> {
      for (const row of (await plan()).queue.filter(({ title }) => title !== queued)) {
        const headers = { origin: house.server.url, 'if-match': `"${row.rev}"` };
        const answer = await foreman.context.request.delete(url(`/charges/${row.chargeId}`), { headers });
        expect(answer.ok(), await answer.text()).toBe(true);
      }
    }
    const charge = (page: Page) =>
      page
        .getByRole('button', {
          name: size === 'wide' ? new RegExp(`^${queued} on `) : new RegExp(`^Move ${queued} on `),
        })
        .locator('visible=true')
        .first();

    /** The charge, once the page draws it where the server has it: it follows by socket, and may still be on its way. */
    async function settled(page: Page) {
      const { channelNames } = await rowOf();
      await expect
        .poll(() => charge(page).getAttribute('aria-label'), patience)
        .toContain(`${queued} on ${channelNames.join(', ')}`);
      let last = '';
      await expect
        .poll(
          async () => {
            const before = last;
            last = JSON.stringify(await charge(page).boundingBox());
            return last === before;
          },
          { ...patience, interval: 300 },
        )
        .toBe(true);
      return charge(page);
    }

    test('shows every channel and everybody who has hours, with the queue and the waits', async () => {
      const { page } = foreman;
      await heading(page, 'Bench plan').waitFor();
      const { channels, people } = await plan();
      for (const channel of channels) await heading(page, channel.name).waitFor();
      for (const { person } of people) await heading(page, person.name.split(' ')[0]!).waitFor();
      await heading(page, 'Queue').waitFor();
      await heading(page, 'Waits today').waitFor();
      await judge(foreman, name('day'));
    });

    test.runIf(size === 'wide')('moves a charge by keys alone, and takes it back', async () => {
      const { page } = foreman;
      const before = await rowOf();
      await (await settled(page)).focus();
      await page.keyboard.press('Enter');
      const panel = page.getByRole('region', { name: `Move ${queued}` });
      await panel.getByRole('radio').first().waitFor();
      await judge(foreman, name('picked'));
      await page.keyboard.press('ArrowRight');
      await page.keyboard.press('ArrowRight');
      await page.keyboard.press('Enter');
      await movedLater(before);
      // The focus stays on the charge, wherever it is drawn now.
      await expect
        .poll(() => page.evaluate(() => document.activeElement?.getAttribute('data-charge')), patience)
        .toBe(before.chargeId);
      await judge(foreman, name('moved'));
      await button(page, /^Undo/).click();
      await expect.poll(async () => (await rowOf()).clipOnAt, patience).toBe(before.clipOnAt);
    });

    test('moves a charge by taps: picked, a channel chosen, moved; then takes it back', async () => {
      const { page } = foreman;
      const before = await rowOf();
      const other = (await placesOf()).places.find(
        ({ soonest, channelName }) => soonest !== null && !before.channelNames.includes(channelName),
      )!;
      await (await settled(page)).click();
      const panel = size === 'wide' ? page.getByRole('region', { name: `Move ${queued}` }) : page.getByRole('dialog');
      await panel.getByRole('radio', { name: new RegExp(`^${other.channelName}`) }).click();
      await judge(foreman, name('place'));
      await button(panel, new RegExp(`^Move ${queued} to ${other.channelName} at `)).click();
      await expect.poll(async () => (await rowOf()).channelNames, patience).toContain(other.channelName);
      await button(page, /^Undo/).click();
      await expect.poll(async () => (await rowOf()).channelNames, patience).toEqual(before.channelNames);
    });

    test.runIf(size === 'wide')('moves a charge with the mouse along its lane', async () => {
      const { page } = foreman;
      const before = await rowOf();
      await (await settled(page)).click();
      await page
        .getByRole('region', { name: `Move ${queued}` })
        .getByRole('radio')
        .first()
        .waitFor();
      const box = (await (await settled(page)).boundingBox())!;
      await page.mouse.move(box.x + 20, box.y + 50);
      await page.mouse.down();
      await page.mouse.move(box.x + 60, box.y + 50, { steps: 4 });
      await page.mouse.move(box.x + 110, box.y + 50, { steps: 4 });
      await page.mouse.up();
      await movedLater(before);
      await button(page, /^Undo/).click();
      await expect.poll(async () => (await rowOf()).clipOnAt, patience).toBe(before.clipOnAt);
    });

    test('says where a channel was taken meanwhile, and keeps what was chosen', async () => {
      const { page } = foreman;
      await (await settled(page)).click();
      const panel = size === 'wide' ? page.getByRole('region', { name: `Move ${queued}` }) : page.getByRole('dialog');
      const move = panel.getByRole('button', { name: /^Move .* at / });
      await button(panel, 'A quarter hour later').click();
      // Somebody else moves it first.
      const row = await rowOf();
      await page.route('**/api/bench-plan/move', async (route) => {
        const body = route.request().postDataJSON() as { rev: number };
        await route.continue({ postData: JSON.stringify({ ...body, rev: row.rev - 1 }) });
      });
      foreman.problems.length = 0;
      await move.click();
      await panel.getByRole('alert').waitFor();
      expect(await panel.getByRole('alert').innerText()).toMatch(/The plan shows what is there now/);
      await page.unroute('**/api/bench-plan/move');
      // The browser's own line about the 412 is expected; nothing else is.
      expect(foreman.problems.filter((line) => !/status of 412/.test(line))).toEqual([]);
      foreman.problems.length = 0;
      await button(panel, 'Leave it where it is').click();
    });

    test('gives a piece of work that fits a wait, and it stands in the lane of the person', async () => {
      const { page } = foreman;
      const title = `Wiper blades ${size}`;
      const added = await send('/work', {
        title,
        likelyMinutes: 10,
        longMinutes: 12,
        skillId: null,
        placeId: null,
        priority: 'urgent',
        dueAt: null,
        repairId: null,
        splittable: false,
        note: null,
      });
      expect(added.status(), await added.text()).toBe(201);
      // It comes by the socket: nothing is loaded again.
      const give = page
        .getByRole('button', { name: new RegExp(`^(Give|Take it:) ?${title}`) })
        .locator('visible=true')
        .first();
      await give.waitFor();
      await give.click();
      await expect
        .poll(
          async () => (await plan()).people.flatMap(({ blocks }) => blocks).some((block) => block.title === title),
          patience,
        )
        .toBe(true);
      await (
        size === 'wide'
          ? page.getByLabel(new RegExp(`^Fill: ${title}`)).first()
          : words(page, new RegExp(`^Fill: ${title}`))
      ).waitFor();
      await judge(foreman, name('given'));
    });

    test('compares a better plan with today’s, and takes it', async () => {
      const { page } = foreman;
      const { chargeId } = await rowOf();
      const { rev, places } = await placesOf();
      const { channelId, soonest } = places.find((place) => place.soonest !== null)!;
      // Hours for nothing: it would be ready later than it need be. As late as somebody is still there to look in.
      let late = 0;
      const read = page.waitForResponse(/bench-plan\/proposal/);
      for (const hours of [3, 2, 1]) {
        const clipOnAt = new Date(Date.parse(soonest!.clipOnAt) + hours * 3_600_000).toISOString();
        const answer = await send('/bench-plan/move', { chargeId, rev, channelId, clipOnAt });
        if (!answer.ok()) continue;
        late = Date.parse(clipOnAt);
        break;
      }
      expect(late).toBeGreaterThan(0);
      await read;
      const better = page.getByRole('region', { name: 'A better plan' });
      await better.waitFor();
      await judge(foreman, name('better'));
      await button(better, 'Take this plan').click();
      await expect.poll(async () => Date.parse((await rowOf()).clipOnAt), patience).toBeLessThan(late);
      await expect.poll(() => better.count(), patience).toBe(0);
    });

    test('saves the day sheet as a PDF', async () => {
      const { page } = foreman;
      const saved = page.waitForEvent('download');
      await button(page, 'Save the day sheet for printing').click();
      const file = await saved;
      expect(file.suggestedFilename()).toMatch(/^day-sheet-\d{4}-\d\d-\d\d\.pdf$/);
      expect(
        fs
          .readFileSync(await file.path())
          .subarray(0, 5)
          .toString(),
      ).toBe('%PDF-');
    });

    test('shows the week, and a day of it', async () => {
      const { page } = foreman;
      await page.getByRole('radio', { name: 'Week' }).click();
      await button(page, 'Show tomorrow').waitFor();
      await judge(foreman, name('week'));
      await button(page, 'Show tomorrow').click();
      await expect.poll(() => page.url(), patience).toMatch(/day=\d{4}/);
      await button(page, 'Today').click();
      // Something of today stands in its lanes again: by night the queued charge has gone to tomorrow.
      await page.locator('[data-charge]').locator('visible=true').first().waitFor();
      expect(page.url()).not.toMatch(/day=\d{4}/);
      expect(foreman.problems).toEqual([]);
    });

    test('is not for a technician, who is told whose it is and led to their own day', async () => {
      const technician = await member(house, 'technician', '/bench-plan', { size });
      await words(technician.page, 'The bench is planned by a foreman or a manager.').waitFor();
      await judge(technician, name('technician'));
      await technician.close();
    });
  },
);
