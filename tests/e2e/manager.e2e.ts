import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
  field,
  heading,
  judge,
  link,
  member,
  openHouse,
  patience,
  sentenceAt,
  stranger,
  words,
  type House,
  type ScreenSize,
} from './house';

const sizes: { size: ScreenSize; other: ScreenSize }[] = [
  { size: 'wide', other: 'phone' },
  { size: 'phone', other: 'wide' },
];

describeInBrowser.each(sizes)('a manager on a $size screen', ({ size, other }) => {
  const name = (step: string) => `manager-${step}-${size}`;
  let house: House;
  let manager: Visitor;
  beforeAll(async () => {
    house = await openHouse();
    manager = await member(house, 'manager', '/workshop?section=people', {
      size,
      // Refused once on purpose: a change over somebody else's.
      expected: [/status of 412/],
    });
  });
  afterAll(() => house?.close());

  let joined: Visitor;

  test('invites a person by a link that is shown once; the person joins with a password, a common one is refused with the reason', async () => {
    const { page } = manager;
    await heading(page, 'Invite a person').waitFor();
    await judge(manager, name('workshop'));
    await field(page, 'E-mail').fill('tove at harbourlane');
    await button(page, 'Make the invitation').click();
    await expect.poll(() => sentenceAt(field(page, 'E-mail')), patience).toMatch(/[.?]$/);
    expect(await field(page, 'E-mail').inputValue()).toBe('tove at harbourlane');
    await field(page, 'E-mail').fill('tove@harbourlane.example.com');
    await page
      .getByRole('radio', { name: /Foreman/ })
      .locator('visible=true')
      .first()
      .click();
    await button(page, 'Make the invitation').click();
    const shown = words(page, /\/join\?token=/);
    const url = (await shown.textContent()) ?? '';
    expect(url.startsWith(`${house.server.url}/join?token=`)).toBe(true);
    await words(page, /It is shown only now\./).waitFor();
    await judge(manager, name('invited'));
    await page.reload();
    await words(page, 'tove@harbourlane.example.com').waitFor();
    expect(await page.getByText(/\/join\?token=/).count()).toBe(0);

    joined = await stranger(house, { size: other, expected: [/status of 40[01]/] });
    await joined.page.goto(url.slice(house.server.url.length));
    await heading(joined.page, 'Join Harbour Lane Traction').waitFor();
    await words(joined.page, 'tove@harbourlane.example.com').waitFor();
    await field(joined.page, 'Your name').fill('Tove Linden');
    const password = field(joined.page, 'Password');
    for (const [bad, reason] of [
      ['tooshort', /12 characters/],
      ['password1234', /tried first/],
    ] as const) {
      await password.fill(bad);
      await button(joined.page, 'Join the workshop').click();
      await expect.poll(() => joined.page.locator('#root').innerText(), patience).toMatch(reason);
      expect(await field(joined.page, 'Your name').inputValue()).toBe('Tove Linden');
    }
    await judge(joined, name('join-refused'));
    await password.fill('seven lamps over 9 benches');
    await button(joined.page, 'Join the workshop').click();
    await joined.page.waitForURL('**/bench');
    await heading(joined.page, 'Bench').waitFor();

    // The link works once.
    const second = await stranger(house, { expected: [/status of 4\d\d/] });
    await second.page.goto(url.slice(house.server.url.length));
    await words(second.page, 'This link does not work any more.').waitFor();
    await second.close();
  });

  test('changes the person’s role, then disables the access: within 5 s the other browser shows the signed-out screen', async () => {
    const { page } = manager;
    await page.goto('/workshop?section=people');
    await page.getByLabel('Edit Tove Linden').locator('visible=true').click();
    await heading(page, 'Tove Linden').waitFor();
    await page
      .getByRole('radio', { name: /Technician/ })
      .locator('visible=true')
      .first()
      .click();
    await judge(manager, name('person'));
    await button(page, 'Save the person').click();
    await words(page, 'Tove Linden is saved.').waitFor();

    // A changed role ends the session, or is taken on by it: either way the person is back on the bench by sign-in.
    await joined.page.goto('/bench');
    await heading(joined.page, 'Bench').or(button(joined.page, 'Sign in')).first().waitFor();
    if (await button(joined.page, 'Sign in').isVisible()) {
      await field(joined.page, 'E-mail').fill('tove@harbourlane.example.com');
      await field(joined.page, 'Password').fill('seven lamps over 9 benches');
      await button(joined.page, 'Sign in').click();
      await heading(joined.page, 'Bench').waitFor();
    }
    // Heard through the socket, not by asking.
    await joined.page.waitForFunction(() => document.body.innerText.includes('R-2411'));

    await page.getByLabel('Edit Tove Linden').locator('visible=true').click();
    await button(page, 'Disable Tove').click();
    const sheet = page.getByRole('dialog');
    await heading(sheet, 'Disable Tove Linden?').waitFor();
    const answered = page.waitForResponse((answer) => /\/api\/people\//.test(answer.url()) && answer.status() === 200);
    await button(sheet, 'Disable Tove').click();
    await answered;
    const begun = Date.now();
    await words(joined.page, /A manager has switched this access off/).waitFor();
    expect(Date.now() - begun).toBeLessThan(5000);
    await judge(joined, name('disabled'));
    const status = await joined.page.evaluate(async () => (await fetch('/api/board')).status);
    expect(status).toBe(401);
    await joined.close();
  });

  test('adds a meter, a charger with a channel and a module type; a wrong number keeps its text', async () => {
    const { page } = manager;
    await page.goto('/workshop/meters/new');
    await field(page, 'Name').fill('Hand meter 3');
    await field(page, 'Reads too high by').fill('1,5 V');
    await button(page, 'Save the meter').click();
    await expect.poll(() => sentenceAt(field(page, 'Reads too high by')), patience).toMatch(/[.?]$/);
    expect(await field(page, 'Reads too high by').inputValue()).toBe('1,5 V');
    await field(page, 'Reads too high by').fill('1,5');
    await button(page, 'Save the meter').click();
    await words(page, 'Hand meter 3 is saved.').waitFor();

    await page.goto('/workshop/chargers/new');
    await field(page, 'Name').fill('Trolley supply');
    await field(page, 'Its voltmeter').selectOption({ label: 'Hand meter 3' });
    const channel = page.getByRole('group', { name: /^Channel/ }).first();
    await field(channel, 'Name').fill('T1');
    await field(channel, 'Current').fill('-5 A');
    await field(channel, 'Least current').fill('0,05');
    await field(channel, 'Up to').fill('16');
    await field(channel, 'Leads').fill('3');
    await field(channel, 'Display step').fill('1');
    await button(page, 'Save the charger').click();
    await expect.poll(() => sentenceAt(field(channel, 'Current')), patience).toMatch(/[.?]$/);
    expect(await field(channel, 'Current').inputValue()).toBe('-5 A');
    await judge(manager, name('charger-bad'));
    await field(channel, 'Current').fill('15');
    await button(page, 'Save the charger').click();
    await words(page, 'Trolley supply is saved.').waitFor();

    await page.goto('/workshop/module-types/new');
    await field(page, 'Name').fill('8-series 40 Ah');
    await field(page, 'Chemistry').selectOption({ label: 'Graphite and NMC' });
    for (const [label, value] of [
      ['Groups in series', '8'],
      ['Cells a group', '2'],
      ['Rated', '40'],
      ['Charge to', '4,2'],
      ['Not below', '3'],
      ['Floor', '2,5'],
      ['Current up to', '40'],
      ['Discharge up to', '40'],
      ['Charge from', '10'],
      ['Charge up to', '45'],
    ] as const)
      await field(page, label).fill(value);
    await judge(manager, name('type'));
    await button(page, 'Save the type').click();
    await words(page, '8-series 40 Ah is saved.').waitFor();

    const lists = await page.evaluate(async () => {
      const read = async (path: string) => (await (await fetch(`/api${path}`)).json()) as Record<string, unknown>[];
      return { meters: await read('/meters'), chargers: await read('/chargers'), types: await read('/module-types') };
    });
    expect(lists.meters).toContainEqual(expect.objectContaining({ name: 'Hand meter 3', offsetMillivolts: 1.5 }));
    expect(lists.chargers).toContainEqual(
      expect.objectContaining({
        name: 'Trolley supply',
        channels: [expect.objectContaining({ name: 'T1', maxAmps: 15, maxVolts: 16 })],
      }),
    );
    expect(lists.types).toContainEqual(
      expect.objectContaining({ name: '8-series 40 Ah', groupsInSeries: 8, ratedAh: 40 }),
    );
  });

  test('two managers change the limits at once: the second is told what stands now, keeps what was typed, and may save over it', async () => {
    const second = await member(house, 'manager', '/workshop/limits', { size: other });
    const { page } = manager;
    await page.goto('/workshop/limits');
    await field(page, 'Rest at least').fill('45');
    await field(second.page, 'Tolerance').fill('4');
    await button(second.page, 'Save the limits').click();
    await words(second.page, 'The limits are saved.').waitFor();

    await button(page, 'Save the limits').click();
    await words(page, 'The workshop was changed by somebody else meanwhile.').waitFor();
    const table = page.getByRole('table', { name: 'What differs' });
    await expect.poll(() => table.innerText(), patience).toMatch(/Tolerance\s+4\s+5/);
    expect(await field(page, 'Rest at least').inputValue()).toBe('45');
    await judge(manager, name('412'));
    // The own change over the other's: the other's tolerance is put into the form first.
    await field(page, 'Tolerance').fill('4');
    await button(page, 'Save mine over it').click();
    await words(page, 'The limits are saved.').waitFor();
    const stands = await page.evaluate(async () => (await (await fetch('/api/workshop')).json()) as object);
    expect(stands).toMatchObject({ toleranceMillivolts: 4, minRestMinutes: 45 });
    await second.page.goto('/workshop/limits');
    await expect.poll(() => field(second.page, 'Rest at least').inputValue(), patience).toBe('45');
    expect([...manager.problems, ...second.problems]).toEqual([]);
    await second.close();
    await link(page, /limits/)
      .first()
      .waitFor();
  });
});
