import { afterAll, beforeAll, expect, test } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { SpareDto } from '@/shared/contract/spare';
import { describeInBrowser, type Visitor } from '../support/browser';
import { packForm, packReadingForm, repairForm, secondSourceForm } from '../support/repaired';
import { button, heading, judge, member, openHouse, slowTest, words, type House, type ScreenSize } from './house';

const typeId = 'demo-type-two';
const meterId = 'demo-meter-hand-1';
const spareId = 'demo-spare-S-0422';
/** 96 groups in 48 modules, mV; the median of the healthy ones is 3.912 V, module 17 is behind it. */
const arrival = Array.from({ length: 96 }, (_, group) =>
  group === 32 ? 3815 : group === 33 ? 3878 : 3910 + ((group * 7) % 5),
);
const typed = (millivolts: number) => `${millivolts / 1000} V`;

describeInBrowser.each<{ size: ScreenSize }>([{ size: 'phone' }, { size: 'wide' }])(
  'a spare that rests within the tolerance, on a $size screen',
  ({ size }) => {
    let house: House;
    let technician: Visitor;
    let repair: RepairPageDto;

    /** Writes over the page's own connection, as its screens do. */
    async function written<T>(path: string, body: object, rev?: number): Promise<T> {
      const answer = await technician.page.evaluate(
        async ([to, content, match]) => {
          const headers = {
            'content-type': 'application/json',
            'Idempotency-Key': crypto.randomUUID(),
            ...(match === undefined ? {} : { 'If-Match': `"${match}"` }),
          };
          const response = await fetch(`/api${to}`, { method: 'POST', headers, body: JSON.stringify(content) });
          return { ok: response.ok, body: (await response.json()) as unknown };
        },
        [path, body, rev] as const,
      );
      expect(answer).toMatchObject({ ok: true });
      return answer.body as T;
    }

    beforeAll(async () => {
      house = await openHouse();
      technician = await member(house, 'technician', '/repairs', { size });
      await heading(technician.page, 'Repairs').waitFor();
      const pack = packForm(typeId, { groupCount: '96' });
      const { id } = await written<RepairPageDto>('/repairs', repairForm(typeId, { vehicle: 'Orange van', pack }));
      const read = await written<RepairPageDto>(
        `/repairs/${id}/readings`,
        packReadingForm({ groupVolts: arrival.map(typed), packVolts: '', meterId }),
      );
      const readingId = read.readings[0]!.id;
      await written(
        `/repairs/${id}/second-source`,
        secondSourceForm(readingId, {
          ...{ modulePosition: '17', groupVolts: ['3.816', '3.879'], meterId },
          healthyGroup: { group: 0, volts: '3.911' },
        }),
      );
      const target = { readingId, volts: null, toleranceMillivolts: '5', reason: null };
      repair = await written<RepairPageDto>(`/repairs/${id}/target`, target);
      const spare = await technician.context.request.get(`${house.server.url}/api/spares/${spareId}`);
      await written<SpareDto>(
        `/spares/${spareId}/readings`,
        { groupVolts: ['3.912', '3.911'], celsius: '21', meterId, restedMinutes: '600', note: null },
        ((await spare.json()) as SpareDto).rev,
      );
    });
    afterAll(() => house?.close());

    test(
      'is the first of the list, is fitted without a charge, and the repair goes on to be proven',
      async () => {
        const { page } = technician;
        await page.goto(`/repairs/${repair.id}/spares`);
        await words(page, 'Within the tolerance: no charge needed').waitFor();
        expect(await button(page, /^Reserve /).innerText()).toBe('Reserve S-0422');
        await button(page, 'Reserve S-0422').click();
        await button(page, 'Fit S-0422 without a charge').waitFor();
        await judge(technician, `as-it-is-reserved-${size}`);
        await page.goto(`/repairs/${repair.id}`);
        await button(page, 'Fit S-0422 without a charge').click();
        const sheet = page.getByRole('dialog');
        await words(sheet, /^It rests within ±5\smV of 3\.912\sV/).waitFor();
        await judge(technician, `as-it-is-fit-${size}`);
        await button(sheet, 'It is fitted').click();
        await button(page, 'Read the pack after the fit').waitFor();
        await judge(technician, `as-it-is-fitted-${size}`);
        const answer = await technician.context.request.get(`${house.server.url}/api/repairs/${repair.id}`);
        expect(await answer.json()).toMatchObject({
          waits: false,
          fittedAsItIs: [{ spare: { label: 'S-0422' }, modulePosition: '17', by: { name: 'Ines Marlow' } }],
        });
      },
      slowTest,
    );
  },
);
