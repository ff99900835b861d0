import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import { describeInBrowser, type Visitor } from '../support/browser';
import {
  button,
  field,
  heading,
  judge,
  member,
  openHouse,
  slowTest,
  words,
  type House,
  type ScreenSize,
} from './house';

/** 96 groups in 48 modules, mV: about 3.912 V, the two of module 17 behind it. */
const arrival = Array.from({ length: 96 }, (_, group) =>
  group === 32 ? 3815 : group === 33 ? 3878 : 3910 + ((group * 7) % 5),
);
/** After the fit module 17 is 30 mV under the others. */
const fitted = arrival.map((millivolts, group) => (group === 32 || group === 33 ? 3880 : millivolts));

/** As an instrument writes it: a mark of the byte order, a header line, a column that is no voltage. */
const csv = `\uFEFFgroup;mV;°C\r\n${arrival.map((millivolts, group) => `${group + 1};${millivolts};21`).join('\r\n')}\r\n`;

/** A voltage of the reading as a meter of the workshop shows it, with a comma. */
const meter = (group: number, off = 1) => ((arrival[group]! + off) / 1000).toFixed(3).replace('.', ',');

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'phone' }, { size: 'wide' }])(
  'a repair on a $size screen',
  ({ size }) => {
    const name = (step: string) => `repair-${step}-${size}`;
    const vehicle = `Orange van ${size}`;
    let house: House;
    let technician: Visitor;
    let page: Page;
    /** Address of the repair's page. */
    let address: string;

    beforeAll(async () => {
      house = await openHouse();
      technician = await member(house, 'technician', '/repairs', { size });
      page = technician.page;
    });
    afterAll(() => house?.close());

    const repair = async (): Promise<RepairPageDto> => {
      const answer = await technician.context.request.get(`${house.server.url}/api${address}`);
      expect(answer.status()).toBe(200);
      return (await answer.json()) as RepairPageDto;
    };
    const next = (title: string) => button(page, title).click();
    const settled = () => page.waitForURL(`**${address}`);

    test(
      'is booked by its pack type, read from a file of an instrument, and blocked while pack and meter disagree',
      async () => {
        await button(page, 'Start a repair').click();
        await heading(page, 'Start a repair').waitFor();
        await button(page, 'Start the repair').click();
        await words(page, /fields? needs? a change|Name the vehicle/).waitFor();
        await judge(technician, name('new-bad'));
        await field(page, 'Vehicle').fill(vehicle);
        await field(page, 'Pack type').selectOption({ label: '96 groups in 48 modules' });
        await field(page, 'Bay').fill('bay 12');
        await button(page, 'Start the repair').click();
        await page.waitForURL(/\/repairs\/(?!new)[^/]+$/);
        address = new URL(page.url()).pathname;
        await words(page, 'The pack was not read yet. It has 96 groups in 48 modules of 2.').waitFor();
        await judge(technician, name('booked'));

        await next('Read the pack');
        await upload({
          name: 'photo.csv',
          mimeType: 'text/csv',
          buffer: Buffer.from([0x89, 0x50, 0x4e, 0x47, 0, 0, 1]),
        });
        await words(page, /^photo\.csv is no plain text\./).waitFor();
        const short = Buffer.from(csv.split('\r\n').slice(0, 96).join('\n'));
        await upload({ name: 'short.csv', mimeType: 'text/csv', buffer: short });
        await words(page, /95 groups were understood; this pack has 96\./).waitFor();
        await button(page, 'Save the reading').click();
        await judge(technician, name('reading-short'));
        expect((await repair()).readings).toEqual([]);
        await upload({ name: 'pack.csv', mimeType: 'text/csv', buffer: Buffer.from(csv) });
        await heading(page, '96 groups understood, in millivolts, one header line skipped. Right?').waitFor();
        await words(page, /Not used: .*°C/).waitFor();
        await field(page, 'Time since load').fill('600');
        await field(page, 'Pack is at').fill('21');
        await judge(technician, name('reading'));
        await button(page, 'Save the reading').click();
        await settled();
        const read = (await repair()).readings[0]!;
        expect(read.groupVolts).toEqual(arrival.map((millivolts) => millivolts / 1000));
        expect(read).toMatchObject({ source: 'file', fileName: 'pack.csv', odd: [32, 33], oddPositions: ['17'] });
        await judge(technician, name('read'));

        await next('Enter the second source');
        await field(page, 'G33').fill('3,912');
        await field(page, 'G34').fill('3,913');
        await field(page, 'Healthy group').fill('1');
        await field(page, 'Its volts').fill(meter(0));
        await field(page, 'Read with').selectOption({ label: 'Hand meter 1' });
        await field(page, 'Meter points to').selectOption('18');
        await words(page, 'The pack says module 17, your meter says 18.').waitFor();
        await judge(technician, name('second-source'));
        await button(page, 'Save the second source').click();
        await words(page, 'A foreman or a manager decides.').waitFor();
        await judge(technician, name('disagree'));
        expect((await repair()).block).toMatchObject({ code: 'sources-disagree' });
      },
      slowTest,
    );

    test(
      'goes on once a foreman has decided with a reason, which the technician’s screen shows without a reload',
      async () => {
        const foreman = await member(house, 'foreman', '/repairs', { size });
        const desk = foreman.page;
        await desk
          .getByRole('link', { name: new RegExp(vehicle) })
          .or(desk.getByText(vehicle))
          .locator('visible=true')
          .first()
          .click();
        await button(desk, 'Decide which module it is').click();
        const choices = desk.getByRole('radiogroup', { name: 'Decide' });
        expect(await choices.getByRole('radio', { checked: true }).count()).toBe(0);
        await choices.getByRole('radio', { name: /^Module 17/ }).click();
        await button(desk, 'Decide: module 17').click();
        await words(desk, 'Say why: it is kept with your name.').waitFor();
        await field(desk, 'Why').fill('The meter stood at the next module');
        await judge(foreman, name('decide'));
        await button(desk, 'Decide: module 17').click();
        await desk.waitForURL(`**${address}`);
        await judge(foreman, name('decided'));
        await foreman.close();
        await words(page, /Hella Brandt decided: module 17/).waitFor();
        expect((await repair()).block).toBeNull();
        await button(page, 'Go on with the repair').click();
        await settled();
      },
      slowTest,
    );

    test(
      'takes its target from the healthy groups and reserves the soonest spare, and its charge is planned with both',
      async () => {
        await next('Take the target');
        await words(page, '3.912 V').waitFor();
        await judge(technician, name('target'));
        await button(page, 'Take the computed target').click();
        await settled();
        const { target } = await repair();
        // The median of the 94 groups beside module 17.
        expect(target).toMatchObject({ volts: 3.912, healthy: 94, typed: false, toleranceMillivolts: 5 });

        await next('Choose a spare');
        const reserve = button(page, /^Reserve /);
        await reserve.waitFor();
        await judge(technician, name('spares'));
        const label = (await reserve.innerText()).replace(/^Reserve /, '');
        await reserve.click();
        await words(page, `${label} is reserved for this repair.`).waitFor();
        const { spare, number } = await repair();
        expect(spare?.label).toBe(label);
        await button(page, 'Plan a charge').click();
        await heading(page, 'Plan a charge').waitFor();
        await heading(page, 'Ways, soonest first').waitFor();
        const asked = new URL(page.url()).searchParams;
        expect(Object.fromEntries(asked)).toEqual({
          spare: spare?.id,
          target: '3.912',
          tolerance: '5',
          repair: number,
          position: '17',
        });
        await judge(technician, name('plan'));
      },
      slowTest,
    );

    test(
      'is proven by what the pack reads after the fit, and is not handed over without a word on what is missing',
      async () => {
        await page.goto(`${address}/reading`);
        await page.getByRole('radio', { name: 'Paste' }).locator('visible=true').click();
        await field(page, 'Paste the table').fill(
          fitted.map((millivolts) => (millivolts / 1000).toFixed(3)).join('\n'),
        );
        await heading(page, /^96 groups understood, in volts/).waitFor();
        await field(page, 'Read at').selectOption('after-fit');
        await button(page, 'Save the reading').click();
        await settled();
        await page.goto(`${address}/prove`);
        await heading(page, 'Prove').waitFor();
        await words(page, /^34\s*mV$/).waitFor();
        await judge(technician, name('prove'));
        expect((await repair()).readings[0]).toMatchObject({ stage: 'after-fit', change: { kind: 'exchange' } });

        await page.goto(address);
        await button(page, 'More for this repair').click();
        await button(page.getByRole('dialog'), 'Hand it over').click();
        const sheet = page.getByRole('dialog');
        await words(sheet, /^Not done yet: .*fit/).waitFor();
        const done = button(sheet, 'It is handed over');
        expect(await done.getAttribute('aria-disabled')).toBe('true');
        await field(sheet, 'Note').fill('The customer fits the module in his own yard');
        await judge(technician, name('hand-over'));
        await done.click();
        await words(page, /^Handed over /).waitFor();
        await button(page, 'Put it into the archive').waitFor();
        await judge(technician, name('handed-over'));
        expect(await repair()).toMatchObject({ state: 'handed-over', handedOver: { by: { name: 'Ines Marlow' } } });
        expect(technician.problems).toEqual([]);
      },
      slowTest,
    );

    /** Chooses a file by the form's own button, as a person does. */
    async function upload(file: { name: string; mimeType: string; buffer: Buffer }): Promise<void> {
      await page.getByRole('radio', { name: 'Upload' }).locator('visible=true').click();
      const chooser = page.waitForEvent('filechooser');
      await button(page, /^Choose (a CSV|another) file$/).click();
      await (await chooser).setFiles(file);
    }
  },
);
