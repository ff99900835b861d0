import { create } from 'qrcode';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { describeInBrowser, type Visitor } from '../support/browser';
import { button, enter, field, heading, judge, openHouse, patience, sentenceAt, words, type House } from './house';

/** The demo's R-2409 waits for its check: two groups to 3.964 V. */
describeInBrowser('the check after the rest', () => {
  let house: House;
  let technician: Visitor;
  let charge: ChargeDto;
  const volts = (off: number) => (charge.targetVolts + off).toFixed(3);

  beforeAll(async () => {
    house = await openHouse();
    technician = await enter(house, 'technician', { size: 'phone' });
    const answer = await technician.context.request.get(`${house.server.url}/api/charges?open=1`);
    const listed = ((await answer.json()) as { id: string; title: string }[]).find((one) => one.title === 'R-2409');
    const one = await technician.context.request.get(`${house.server.url}/api/charges/${listed?.id}`);
    charge = (await one.json()) as ChargeDto;
    expect(charge.stage).toBe('check-due');
  });
  afterAll(() => house?.close());

  test('a group 7 mV under the target is outside 5 mV: the verdict stands as one types, and the top-up is prefilled', async () => {
    const { page } = technician;
    await page.goto(`/charges/${charge.id}`);
    await button(page, 'Enter the group voltages').click();
    await heading(page, 'Check after rest').waitFor();
    const [first, second] = [field(page, 'Group 1'), field(page, 'Group 2')];

    await button(page, 'Save the check').click();
    await expect.poll(() => sentenceAt(first), patience).toMatch(/[.?]$/);
    for (const bad of ['3.96', '39.64 V', '3964', 'four']) {
      await first.fill(bad);
      await first.blur();
      await expect.poll(() => first.getAttribute('aria-invalid'), patience).toBe('true');
      expect(await first.inputValue()).toBe(bad);
    }
    await judge(technician, 'check-bad');

    const comma = volts(0.001).replace('.', ',');
    await first.fill(comma);
    await first.blur();
    await expect.poll(() => sentenceAt(first), patience).toMatch(/1\smV above, inside/);
    await second.fill(volts(-0.007));
    await second.blur();
    await expect.poll(() => sentenceAt(second), patience).toMatch(/7\smV below, outside/);
    await field(page, 'At the module').fill('22');
    await judge(technician, 'check-outside');
    await button(page, 'Plan the top-up').click();
    await heading(page, 'Plan the top-up').waitFor();
    // What is known is folded away on the phone, for the ways to stand there.
    await page.getByText('change spare, target or times').locator('visible=true').click();
    expect(await field(page, 'Pack rests at').inputValue()).toMatch(/^3[.,]964$/);
    expect(await field(page, 'Repair').inputValue()).toBe('R-2409');
    await expect.poll(() => button(page, /^Spare: /).getAttribute('aria-label'), patience).toContain('S-0402');
    await heading(page, 'Ways, soonest first')
      .or(words(page, /No channel can do this charge/))
      .first()
      .waitFor();
    await judge(technician, 'check-top-up');
    const saved = await technician.context.request.get(`${house.server.url}/api/charges/${charge.id}`);
    const checked = (await saved.json()) as ChargeDto;
    expect(checked.stage).toBe('check-due');
    expect(checked.restChecks.at(-1)?.verdict).toMatchObject({ within: false, worstGroup: 1 });
    expect(checked.restChecks.at(-1)?.verdict.groups[1]?.deviationVolts).toBeCloseTo(-0.007, 6);
  });

  test('with all groups inside it is ready, its label shows a QR picture, and it is fitted', async () => {
    const { page } = technician;
    await page.goto(`/charges/${charge.id}`);
    await button(page, 'Check again').click();
    await field(page, 'Group 1').fill(volts(0.002));
    await field(page, 'Group 2').fill(volts(-0.001));
    await judge(technician, 'check-inside');
    await button(page, 'Save it: in tolerance').click();
    await words(page, 'R-2409 is ready.').waitFor();
    await button(page, 'It is fitted').waitFor();
    await judge(technician, 'check-ready');

    await button(page, 'Label').click();
    await page.waitForURL(`**/charges/${charge.id}/label`);
    const label = page
      .getByRole('img', { name: /^Label with the QR code of the charge/ })
      .locator('visible=true')
      .first();
    expect(await label.getAttribute('aria-label')).toContain('S-0402');
    // Every module of the drawn code is looked at: dark and light as the standard has it for the charge's own address.
    const address = new URL(charge.labelUrl, page.url()).href;
    const { modules } = create(address, { errorCorrectionLevel: 'M' });
    const drawn = await label.evaluate((svg, size) => {
      const path = [...svg.querySelectorAll('path')].sort(
        (a, b) => (b.getAttribute('d') ?? '').length - (a.getAttribute('d') ?? '').length,
      )[0] as SVGPathElement;
      const box = path.getBBox();
      const point = (svg as SVGSVGElement).createSVGPoint();
      return Array.from({ length: size * size }, (_, i) => {
        point.x = box.x + (((i % size) + 0.5) * box.width) / size;
        point.y = box.y + ((Math.floor(i / size) + 0.5) * box.height) / size;
        return path.isPointInFill(point) ? 1 : 0;
      });
    }, modules.size);
    expect(address).toBe(new URL(`/charges/${charge.id}`, page.url()).href);
    expect(drawn).toEqual([...modules.data].map((dark) => (dark ? 1 : 0)));
    await judge(technician, 'check-label');
    await page.goto(`/charges/${charge.id}`);

    await button(page, 'It is fitted').click();
    const sheet = page.getByRole('dialog');
    await heading(sheet, 'Fit S-0402').waitFor();
    await judge(technician, 'check-fit');
    await button(sheet, 'It is fitted').click();
    await expect
      .poll(async () => {
        const now = await technician.context.request.get(`${house.server.url}/api/charges/${charge.id}`);
        return ((await now.json()) as ChargeDto).stage;
      }, patience)
      .toBe('fitted');
    expect(technician.problems).toEqual([]);
  });
});
