import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { FitsDto, MyDayDto } from '@/shared/contract/bench-plan';
import type { SessionDto } from '@/shared/contract/session';
import type { StaffingListDto } from '@/shared/contract/staffing';
import type { WorkDto, WorkListDto } from '@/shared/contract/work';
import { describeInBrowser } from '../support/browser';
import {
  button,
  drawn,
  field,
  heading,
  judge,
  link,
  member,
  openHouse,
  patience,
  sentenceAt,
  slowTest,
  untilMorning,
  words,
  type House,
} from './house';

describeInBrowser('other work', () => {
  let house: House;
  beforeAll(async () => {
    house = await openHouse({ clockAheadMs: untilMorning() });
  });
  afterAll(() => house?.close());

  const asked = async <T>(page: Page, path: string): Promise<T> => {
    const answer = await page.context().request.get(`${house.server.url}/api${path}`);
    expect(answer.status(), path).toBe(200);
    return (await answer.json()) as T;
  };
  const openWork = async (page: Page) => (await asked<WorkListDto>(page, '/work')).work;
  const named = async (page: Page, title: string): Promise<WorkDto> =>
    (await openWork(page)).find((one) => one.title === title)!;

  test(
    'a technician on a phone adds a piece with its title and minutes, takes one from the bench and gives it back, then begins and ends the own one',
    async () => {
      const visitor = await member(house, 'technician', '/more');
      const { page } = visitor;
      const me = (await asked<SessionDto>(page, '/session')).person.id;
      await clearDesk(page, me);

      await link(page, /^Other work/).click();
      await heading(page, 'Other work').waitFor();
      await judge(visitor, 'other-work-list');
      await button(page, 'Add other work').click();
      await heading(page, 'Add other work').waitFor();
      await drawn(page);
      await button(page, 'Put it on the list').click();
      await expect.poll(() => sentenceAt(field(page, 'Likely')), patience).toMatch(/missing/);
      await field(page, 'What is to be done').fill('Check the torque wrench');
      await field(page, 'Likely').fill('5');
      await button(page, 'Place, skill, due time and more').click();
      await page.getByRole('radio', { name: 'Urgent' }).locator('visible=true').click();
      await judge(visitor, 'other-work-new');
      await button(page, 'Put it on the list').click();
      await words(page, 'Check the torque wrench is on the list.').waitFor();
      const added = await named(page, 'Check the torque wrench');
      expect(added).toMatchObject({ likelyMinutes: 5, longMinutes: 8, priority: 'urgent', place: null, repair: null });

      await takeAndGiveBack(page, me);
      await judge(visitor, 'other-work-bench');

      await page.goto(`/work/${added.id}`);
      await button(page, 'Take it').click();
      await button(page.getByRole('dialog'), 'Take it').click();
      await button(page, 'Begin').waitFor();
      await judge(visitor, 'other-work-taken');
      await page.goto('/bench');
      await button(page, 'Begin: Check the torque wrench').click();
      await button(page, 'Done: Check the torque wrench').waitFor();
      await judge(visitor, 'other-work-begun');
      await button(page, 'Done: Check the torque wrench').click();
      // Its words come when they are asked for.
      await button(page.getByRole('dialog'), 'All of it is done').waitFor();
      await judge(visitor, 'other-work-done-sheet');
      await button(page.getByRole('dialog'), 'All of it is done').click();
      await button(page, 'Done: Check the torque wrench').waitFor({ state: 'detached' });
      expect(await asked<WorkDto>(page, `/work/${added.id}`)).toMatchObject({
        state: 'done',
        over: { by: { id: me } },
      });

      await link(page, 'My day').click();
      await heading(page, 'My day').waitFor();
      await words(page, 'Check the torque wrench').waitFor();
      await judge(visitor, 'my-day-phone');
      const download = page.waitForEvent('download');
      await button(page, 'Save the day sheet for printing').click();
      expect((await download).suggestedFilename()).toMatch(/^day-sheet-\d{4}-\d\d-\d\d\.pdf$/);
      await button(page, /^The day after/).click();
      await page.waitForURL(/day=/);
      await judge(visitor, 'my-day-after');
      await visitor.close();
    },
    slowTest,
  );

  /** Gives back what the technician of the demo has taken: then nothing stands against what is taken here. */
  async function clearDesk(page: Page, me: string): Promise<void> {
    for (const work of await openWork(page))
      for (const stint of work.stints)
        if (stint.person.id === me && (stint.state === 'taken' || stint.state === 'begun'))
          await page.context().request.post(`${house.server.url}/api/work/${work.id}/stints/${stint.id}/give-back`, {
            data: {},
            headers: { origin: house.server.url, 'idempotency-key': crypto.randomUUID() },
          });
    const day = await asked<MyDayDto>(page, '/bench-plan/my-day');
    expect(day.blocks.filter(({ stint }) => stint?.state === 'taken' || stint?.state === 'begun')).toEqual([]);
  }

  /** The first piece that the bench offers, whatever it is: one tap takes it, one gives it back. */
  async function takeAndGiveBack(page: Page, me: string): Promise<void> {
    const fits = await asked<FitsDto>(page, '/bench-plan/fits');
    expect(fits.people.map(({ person }) => person.id)).toEqual([me]);
    await page.goto('/bench');
    const take = button(page.getByRole('region', { name: 'Other work' }), /^Take it: /);
    await take.waitFor();
    const title = /^Take it: (.*?)(?:, R-\d+)?$/.exec((await take.getAttribute('aria-label')) ?? '')?.[1] ?? '';
    await take.click();
    await words(page, new RegExp(`^${title} is yours, `)).waitFor();
    expect((await named(page, title)).stints).toContainEqual(
      expect.objectContaining({ state: 'taken', person: expect.objectContaining({ id: me }) as unknown }),
    );
    await button(page, 'Give it back').click();
    await expect
      .poll(
        async () =>
          (await named(page, title)).stints.some(({ state, person }) => state === 'taken' && person.id === me),
        patience,
      )
      .toBe(false);
  }

  test(
    'a manager at a desk adds a skill and a bench, and gives Bram hours of his own with a break and both',
    async () => {
      const visitor = await member(house, 'manager', '/workshop?section=staffing', { size: 'wide' });
      const { page } = visitor;
      await heading(page, 'Hours of people').waitFor();
      await judge(visitor, 'workshop-staffing');

      await link(page, 'add a skill').click();
      await field(page, 'Name').fill('Windscreens');
      await button(page, 'Save the skill').click();
      await words(page, 'Windscreens is saved.').waitFor();
      await link(page, 'add a place').click();
      await field(page, 'Name').fill('Bench 9');
      await page.getByRole('radio', { name: 'Bench', exact: true }).locator('visible=true').click();
      await judge(visitor, 'workshop-place');
      await button(page, 'Save the place').click();
      await words(page, 'Bench 9 is saved.').waitFor();

      await button(page, 'Edit the hours of Bram Teal').click();
      await page.waitForURL(/\/workshop\/staffing\//);
      await page
        .getByRole('radio', { name: /^Own hours/ })
        .locator('visible=true')
        .click();
      await button(page, 'Add a break').click();
      const last = page
        .getByRole('group', { name: /^Break \d+$/ })
        .locator('visible=true')
        .last();
      await last.getByLabel('From', { exact: true }).fill('1615');
      await last.getByLabel('To', { exact: true }).fill('1630');
      await page.getByRole('checkbox', { name: 'Windscreens' }).locator('visible=true').click();
      await judge(visitor, 'workshop-hours-of-one');
      await button(page, 'Save hours and skills').click();
      await words(page, 'The hours of Bram Teal are saved.').waitFor();

      const { people, skills, places } = await asked<StaffingListDto>(page, '/staffing');
      const bram = people.find(({ person }) => person.name === 'Bram Teal')!;
      const skill = skills.find(({ name }) => name === 'Windscreens')!;
      expect(bram.hours).toHaveLength(7);
      expect(bram.breaks).toContainEqual({ from: '16:15', to: '16:30' });
      expect(bram.skillIds).toContain(skill.id);
      expect(skill.people).toBe(1);
      expect(places).toContainEqual(expect.objectContaining({ name: 'Bench 9', kind: 'bench', inUse: false }));

      await button(page, 'Edit Bench 9').click();
      await button(page, 'Remove the place').click();
      await button(page.getByRole('dialog'), 'Remove the place').click();
      await words(page, 'Bench 9 is removed.').waitFor();
      expect(visitor.problems).toEqual([]);
      await visitor.close();
    },
    slowTest,
  );
});
