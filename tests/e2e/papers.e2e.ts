import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Locator, Page } from 'playwright-core';
import QRCode from 'qrcode';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargeDto } from '@/shared/contract/charge';
import type { RepairListDto, RepairPageDto } from '@/shared/contract/repair';
import { describeInBrowser, openBrowser, type Visitor } from '../support/browser';
import { readPdf } from '../support/pdf';
import { jpegMarkers, placedPhoto } from '../support/pictures';
import {
  button,
  field,
  heading,
  judge,
  link,
  member,
  openHouse,
  patience,
  slowTest,
  words,
  type House,
  type ScreenSize,
} from './house';

/** Points of a millimetre on paper. */
const POINTS_PER_MM = 72 / 25.4;

/** Chooses a file by the button that asks for one, as a person does. */
async function choose(page: Page, by: Locator, file: { name: string; mimeType: string; buffer: Buffer }) {
  const chooser = page.waitForEvent('filechooser');
  await by.click();
  await (await chooser).setFiles(file);
}

/** Presses a button that saves a file, and gives its name and content. */
async function saved(page: Page, by: Locator): Promise<{ name: string; bytes: Buffer }> {
  const download = page.waitForEvent('download');
  await by.click();
  const file = await download;
  return { name: file.suggestedFilename(), bytes: fs.readFileSync(await file.path()) };
}

/** What a camera sees that is held before a label: a code amid grey, as the frames of a moving picture. */
async function heldBefore(text: string): Promise<string> {
  const code = await QRCode.toBuffer(text, { width: 300, margin: 4 });
  const frame = await sharp({ create: { width: 640, height: 480, channels: 3, background: '#8a8a86' } })
    .composite([{ input: code }])
    .jpeg({ quality: 90 })
    .toBuffer();
  const file = path.join(fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-camera-')), 'label.mjpeg');
  fs.writeFileSync(file, Buffer.concat(Array.from({ length: 10 }, () => frame)));
  return file;
}

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'phone' }, { size: 'wide' }])(
  'the papers of a repair on a $size screen',
  ({ size }) => {
    const name = (step: string) => `papers-${step}-${size}`;
    let house: House;
    let technician: Visitor;
    let page: Page;
    /** Address of the repair's page. */
    let address: string;

    beforeAll(async () => {
      house = await openHouse();
      // The browser's own line about the refused photo.
      technician = await member(house, 'technician', '/repairs', { size, expected: [/status of 415 .*\/photos/] });
      page = technician.page;
      const list = (await read(technician, '/repairs')) as RepairListDto;
      address = `/repairs/${list.repairs.find(({ vehicle }) => vehicle === 'Brown hatchback')!.id}`;
      await page.goto(`${address}/edit`);
      await field(page, 'Customer').fill('Quay Bakery');
      await field(page, 'Contact').fill('desk@quay.example.com');
      await button(page, /^Save/).click();
      await page.waitForURL(`**${address}`);
    });
    afterAll(() => house?.close());

    const read = async (who: Visitor, from: string): Promise<unknown> => {
      const answer = await who.context.request.get(`${house.server.url}/api${from}`);
      expect(answer.status()).toBe(200);
      return answer.json();
    };
    const repair = async () => (await read(technician, address)) as RepairPageDto;

    test(
      'keep photos without the place they were taken at, and a swelling seen on one becomes the module’s condition',
      async () => {
        const from = button(page, 'Choose a photo');
        await choose(page, from, {
          name: 'photo.jpg',
          mimeType: 'image/jpeg',
          buffer: Buffer.from('volts;amps\n1;2\n'),
        });
        await words(page, 'This is no photo. Choose a JPEG, PNG or WebP picture.').waitFor();
        expect((await repair()).photos).toEqual([]);
        await choose(page, from, { name: 'IMG_0001.jpg', mimeType: 'image/jpeg', buffer: await placedPhoto() });
        await button(page, /^Photo of the pack/).click();
        const sheet = page.getByRole('dialog');
        await sheet.getByRole('img', { name: /^Photo of the pack/ }).waitFor();
        await sheet.getByRole('radio', { name: /^Swelling/ }).click();
        await words(sheet, 'Say on which module it was seen.').waitFor();
        await judge(technician, name('photo'));
        const position = (await repair()).removed[0]!.modulePosition;
        await field(sheet, 'It shows').selectOption({ label: `Module ${position}` });
        await field(sheet, 'What the photo shows').fill('Bulged at the left');
        await button(sheet, 'Save what is seen').click();
        await words(page, new RegExp(`^Module ${position} is swollen`)).waitFor();
        await judge(technician, name('photos'));

        const [photo] = (await repair()).photos;
        // It lay on its side: 400 × 200 upright.
        expect(photo).toMatchObject({ seen: 'swelling', caption: 'Bulged at the left', width: 200, height: 400 });
        const kept = await technician.context.request.get(`${house.server.url}/api/photos/${photo!.id}`);
        const bytes = await kept.body();
        expect(jpegMarkers(bytes)).not.toContain('e1');
        expect(bytes.includes('harbour lane 3')).toBe(false);
      },
      slowTest,
    );

    test(
      'name what was advised and declined with the customer’s name, on a hand-over sheet as PDF',
      async () => {
        await button(page, 'Add what is advised').click();
        const sheet = page.getByRole('dialog');
        await field(sheet, 'What is advised').fill('Coolant of the pack');
        await sheet.getByRole('radio', { name: /^Declined/ }).click();
        const keep = button(sheet, 'Keep it');
        expect(await keep.getAttribute('aria-disabled')).toBe('true');
        await words(sheet, 'Type the name of the customer who declined it.').waitFor();
        await judge(technician, name('advised'));
        await field(sheet, 'The customer’s name, as agreement').fill('Tilda Quay');
        await keep.click();
        await words(page, 'Coolant of the pack: declined').waitFor();
        await judge(technician, name('hand-over'));

        const { number, vehicle } = await repair();
        const paper = await saved(page, button(page, 'Hand-over sheet as PDF'));
        expect(paper.name).toBe(`hand-over-${number}.pdf`);
        const pages = await readPdf(paper.bytes);
        const text = pages.map((one) => one.text).join('\n');
        for (const part of [number, vehicle, 'Coolant of the pack', 'Tilda Quay']) expect(text).toContain(part);
        expect(pages[0]!.width).toBeCloseTo(210 * POINTS_PER_MM, 0);
        expect(technician.problems).toEqual([]);
      },
      slowTest,
    );

    test(
      'print a label of 62 × 40 mm, whose code a camera reads in the list of spares',
      async () => {
        const { charges } = (await read(technician, '/board')) as BoardDto;
        const { id } = charges.find(({ title }) => title === 'R-2408')!;
        const charge = (await read(technician, `/charges/${id}`)) as ChargeDto;
        await page.goto(`/charges/${charge.id}/label`);
        await heading(page, 'Label').waitFor();
        const { bytes } = await saved(page, button(page, 'Label as PDF'));
        const [label] = await readPdf(bytes);
        expect(label!.width).toBeCloseTo(62 * POINTS_PER_MM, 0);
        expect(label!.height).toBeCloseTo(40 * POINTS_PER_MM, 0);
        expect(label!.text).toContain(charge.spare.label);
        await judge(technician, name('label'));

        // A device without a camera: the label is typed.
        await page.goto('/spares');
        await button(page, 'Scan the label of a spare').click();
        const sheet = page.getByRole('dialog');
        await words(sheet, 'No camera was found on this device. Type the label.').waitFor();
        await judge(technician, name('no-camera'));
        await button(sheet, 'Type it instead').click();

        const film = await heldBefore(new URL(charge.labelUrl, house.server.url).href);
        const browser = await openBrowser([
          '--use-fake-device-for-media-stream',
          '--use-fake-ui-for-media-stream',
          `--use-file-for-fake-video-capture=${film}`,
        ]);
        try {
          const holder = await member({ ...house, browser }, 'technician', '/spares', { size });
          await button(holder.page, 'Scan the label of a spare').click();
          await holder.page.waitForURL(`**/spares/${charge.spare.id}`);
          expect(holder.problems).toEqual([]);
        } finally {
          await browser.close();
          fs.rmSync(path.dirname(film), { recursive: true, force: true });
        }
      },
      slowTest,
    );

    test(
      'are found by a spare’s label, and a manager exports a customer’s data and erases it for good',
      async () => {
        const manager = await member(house, 'manager', '/repairs', { size });
        const desk = manager.page;
        const search = field(desk, 'Repair, vehicle, spare or person');
        await search.fill('S-0422');
        const found = desk.getByRole('list', { name: 'Found elsewhere' });
        await found.locator('visible=true').first().waitFor();
        await judge(manager, name('found'));
        await link(desk, /^Spare S-0422,/).click();
        await desk.waitForURL('**/spares/demo-spare-S-0422');

        await desk.goto('/repairs');
        const table = await saved(desk, button(desk, 'Save as CSV'));
        expect(table.bytes.toString('utf8')).toContain('Brown hatchback');

        await desk.goto(address);
        const data = await saved(desk, button(desk, 'Save as a file'));
        expect(JSON.stringify(JSON.parse(data.bytes.toString('utf8')))).toContain('desk@quay.example.com');
        await button(desk, 'Erase it').click();
        const sheet = desk.getByRole('dialog');
        await field(sheet, 'Reason').fill('The customer asked for it');
        await judge(manager, name('erase'));
        await button(sheet, 'Erase name and contact').click();
        await words(desk, /^Erased .*The customer asked for it\.$/).waitFor();
        await judge(manager, name('erased'));
        await expect.poll(async () => (await repair()).customerName, patience).toBeNull();
        // The technical record stays.
        expect((await repair()).photos).toHaveLength(1);
        expect(manager.problems).toEqual([]);
        await manager.close();
      },
      slowTest,
    );
  },
);
