import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { CandidateDto, RepairPageDto } from '@/shared/contract/repair';
import { readPdf } from '@/tests/support/pdf';
import { hour, makeBench, minute, type Bench } from '../charges/bench';
import { arrival, levelled, makeShop, statesOf, strip, stripOf, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
let page: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  // Its target is 3.949 V ±5 mV.
  page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
});
afterEach(() => bench.server.close());

const reserve = (spareId: string) => taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
const fit = (rev = page.rev, note = '') =>
  bench.as('foreman').post(`/api/repairs/${page.id}/fit`, { note }).set('If-Match', `"${rev}"`);

describe('a spare within the tolerance', () => {
  test('is told as such, and once reserved goes in without a charge: charge and fit are done, with who and when', async () => {
    const spareId = await bench.spare('S-0417', [3.951, 3.947]);
    const [first] = (await bench.as('technician').get(`/api/repairs/${page.id}/candidates`)).body as CandidateDto[];
    expect(first).toMatchObject({ spareId, needsCharge: false, ruledOut: false });
    expect(page.asItIs).toBeNull();
    page = await reserve(spareId);
    expect([stripOf(page), page.waits]).toEqual([strip(4), true]);
    expect(page.asItIs).toMatchObject({ old: false });

    bench.server.clock.advance(hour);
    expect((await fit(page.rev - 1)).status).toBe(412);
    page = await taken(fit(page.rev, 'Read again at the bench.'));
    expect(stripOf(page)).toEqual(strip(6));
    for (const step of page.steps.slice(4, 6)) {
      expect(step).toMatchObject({
        at: new Date(bench.server.clock.now()).toISOString(),
        by: { name: 'Foreman of own' },
      });
    }
    expect(page.fittedAsItIs).toMatchObject([
      { spare: { id: spareId, label: 'S-0417' }, modulePosition: '2', groupVolts: [3.951, 3.947] },
    ]);
    expect(page.events[0]!.text).toBe(
      'fitted S-0417 as module 2 without a charge, at 3.951\u00a0V and 3.947\u00a0V. Read again at the bench',
    );
    // The wait ends with it, and the spare is no longer in stock.
    expect([page.waits, page.wait[0]!.to, page.asItIs]).toEqual([false, page.steps[5]!.at, null]);
    const spare = await bench.as('technician').get(`/api/spares/${spareId}`);
    expect(spare.body).toMatchObject({ where: 'fitted' });
    expect((await fit()).body.code).toBe('needs_charge');

    page = await shop.read(page.id, levelled(8), { stage: 'after-fit' });
    expect(stripOf(page)).toEqual(strip(7));
    const paper = await bench.as('technician').get(`/api/repairs/${page.id}/hand-over.pdf`).buffer(true).expect(200);
    const text = (await readPdf(paper.body as Buffer)).map((one) => one.text.replace(/\s+/g, ' ')).join(' ');
    expect(text).toContain('spare S-0417, 60.0 Ah measured');
    expect(text).toContain('without a charge 3.949 V ±5 mV, read at 3.951 V and 3.947 V');
    expect(text).toContain('* replaced: module 2 is G3, G4.');
  });

  test('whose reading is more than a day old has to be read once more first', async () => {
    const spareId = await bench.spare('S-0417', [3.951, 3.947]);
    page = await reserve(spareId);
    bench.server.clock.advance(25 * hour);
    page = await shop.seen(page.id);
    expect(page.asItIs).toMatchObject({ old: true });
    const refused = await fit();
    expect([refused.status, refused.body.code]).toEqual([409, 'reading_old']);
    expect(refused.body.detail).toContain('Read its groups once more, then fit it.');
    expect(statesOf(page).fit).toBe('to-come');
  });

  test('is not what 6 mV off is, nor one in quarantine, nor one on its charge, nor none', async () => {
    expect((await fit()).body).toMatchObject({ status: 409, code: 'needs_charge' });
    page = await reserve(await bench.spare('S-off', [3.955, 3.949]));
    expect([page.asItIs, (await fit()).body.code]).toEqual([null, 'needs_charge']);
    const within = await bench.spare('S-within', [3.949, 3.949]);
    page = await reserve(within);
    expect(page.asItIs).not.toBeNull();
    bench.server.clock.advance(minute);
    await bench
      .as('technician')
      .post(`/api/spares/${within}/quarantine`, { reason: 'Dented', charge: null })
      .set('If-Match', '"1"')
      .expect(200);
    page = await shop.seen(page.id);
    expect([page.asItIs, (await fit()).body.code]).toEqual([null, 'needs_charge']);
  });
});
