import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { RepairListDto } from '@/shared/contract/repair';
import type { WorkListDto } from '@/shared/contract/work';
import { roles, type Role } from '@/shared/contract/roles';
import { describeInBrowser, seriousFindings, shot, type Visitor } from '../support/browser';
import { drawn, member, openHouse, overflow, slowTest, type House, type ScreenSize } from './house';

/** Every address of the workshop; those of charges, repairs and other work by their number, one in each stage and step. */
const screens = [
  '/bench',
  '/bench-plan',
  '/bench-plan?days=7',
  '/plan',
  '/plan?spare=demo-spare-S-0422&target=3.912',
  '/plan?spare=demo-spare-S-0391&target=3.912',
  '/charges/R-2411',
  '/charges/R-2411/log',
  '/charges/R-2411/log-file',
  '/charges/R-2406',
  '/charges/R-2415',
  '/charges/R-2412',
  '/charges/R-2417',
  '/charges/R-2409',
  '/charges/R-2409/check',
  '/charges/R-2408',
  '/charges/R-2408/label',
  '/charges/R-2418',
  '/charges/R-2418/checks',
  '/charges/no-such-charge',
  '/repairs',
  '/repairs/new',
  '/repairs/R-2418',
  '/repairs/R-2418/edit',
  '/repairs/R-2418/reading',
  '/repairs/R-2418/second-source',
  '/repairs/R-2418/target',
  '/repairs/R-2418/spares',
  '/repairs/R-2423',
  '/repairs/R-2423/second-source',
  '/repairs/R-proven',
  '/repairs/R-proven/prove',
  '/repairs/no-such-repair',
  '/spares',
  '/spares/new',
  '/spares/demo-spare-S-0422',
  '/spares/demo-spare-S-0391',
  '/spares/demo-spare-S-0422/reading',
  '/spares/demo-spare-S-0422/edit',
  '/alerts',
  '/my-day',
  '/work',
  '/work/new',
  '/work/W-0012',
  '/work/W-0012/edit',
  '/work/no-such-work',
  '/waits',
  '/waits?weeks=4&by=weekday&show=plan&compare=before',
  '/waits/charges?weeks=4',
  '/workshop',
  ...[
    'people',
    'staffing',
    'skills',
    'places',
    'chargers',
    'module-types',
    'pack-types',
    'meters',
    'resistors',
    'limits',
    'hours',
    'walls',
    'server',
  ].map((section) => `/workshop?section=${section}`),
  '/workshop/people/demo-bram',
  '/workshop/staffing/demo-bram',
  '/workshop/skills/new',
  '/workshop/places/new',
  '/workshop/chargers/new',
  '/workshop/chargers/demo-charger-C2',
  '/workshop/module-types/new',
  '/workshop/module-types/demo-type-six',
  '/workshop/pack-types/new',
  '/workshop/pack-types/demo-pack-two',
  '/workshop/meters/new',
  '/workshop/meters/demo-meter-hand-1',
  '/workshop/resistors/new',
  '/workshop/resistors/demo-resistor-2',
  '/workshop/limits',
  '/workshop/hours',
  '/approve',
  '/estimate',
  '/more',
  '/me',
  '/me/alerts',
  '/demo/mailbox',
  '/me/weekly-digest',
] as const;

/** What a foreman or a technician sees otherwise than a manager, who is shown all: what the role opens, locks or hides. */
const ofRole: Record<Exclude<Role, 'manager'>, readonly (typeof screens)[number][]> = {
  foreman: [
    '/bench',
    '/bench-plan',
    '/repairs/R-2423/second-source',
    '/spares/demo-spare-S-0391',
    '/waits',
    '/workshop',
    '/workshop/people/demo-bram',
    '/approve',
  ],
  technician: [
    '/bench',
    '/my-day',
    '/work/W-0012',
    '/workshop/staffing/demo-bram',
    '/bench-plan',
    '/charges/R-2411',
    '/repairs',
    '/repairs/R-2423',
    '/repairs/R-2423/second-source',
    '/spares/demo-spare-S-0391',
    '/waits',
    '/workshop',
    '/workshop?section=walls',
    '/workshop/people/demo-bram',
    '/workshop/chargers/demo-charger-C2',
    '/workshop/pack-types/demo-pack-two',
    '/workshop/limits',
    '/approve',
    '/more',
    '/demo/mailbox',
  ],
};

describeInBrowser('every screen', () => {
  let house: House;
  /** Ids by repair. */
  let charges: Record<string, string>;
  /** Ids by number, that of the one being proven by 'R-proven'. */
  let repairs: Record<string, string>;
  /** Ids by number. */
  let work: Record<string, string>;
  /** What axe has looked at: the same screen for another role is not looked at twice. */
  const judged = new Set<string>();

  beforeAll(async () => {
    house = await openHouse();
    const reader = await member(house, 'technician');
    const board = (await (await reader.context.request.get(`${house.server.url}/api/board`)).json()) as {
      charges: { id: string; title: string }[];
    };
    charges = Object.fromEntries(board.charges.map(({ id, title }) => [title, id]));
    const listed = (await (
      await reader.context.request.get(`${house.server.url}/api/repairs`)
    ).json()) as RepairListDto;
    repairs = Object.fromEntries(
      listed.repairs.map(({ id, number, step }) => [step === 'prove' ? 'R-proven' : number, id]),
    );
    const others = (await (await reader.context.request.get(`${house.server.url}/api/work`)).json()) as WorkListDto;
    work = Object.fromEntries(others.work.map(({ id, number }) => [number, id]));
    await reader.close();
  });
  afterAll(() => house?.close());

  describe.each<ScreenSize>(['phone', 'wide'])('on a %s screen', (size) => {
    test.each<Role>([...roles])(
      'draws for a %s without an error, without a serious finding and without reaching beyond its edge',
      async (role) => {
        // The address that is not there answers 404, and a screen that is not for this role 403.
        const visitor = await member(house, role, '/bench', { size, expected: [/status of 40[34]/] });
        const wrong: unknown[] = [];
        for (const screen of role === 'manager' ? screens : ofRole[role]) {
          // The desk shows all sections on one page.
          if (size === 'wide' && /section=(?!walls)/.test(screen)) continue;
          visitor.problems.length = 0;
          const found = await look(visitor, screen, role, size);
          if (found.length > 0) wrong.push({ screen, found });
        }
        expect(wrong).toEqual([]);
        await visitor.close();
      },
      slowTest,
    );
  });

  async function look({ page, problems }: Visitor, screen: string, role: Role, size: ScreenSize): Promise<string[]> {
    const ids = screen.startsWith('/repairs') ? repairs : screen.startsWith('/work/') ? work : charges;
    await page.goto(screen.replace(/\b[RW]-\w+/, (number) => ids[number] ?? number));
    await drawn(page);
    const name = `every-${size}-${role}${screen.replace(/[^\w-]+/g, '-')}`;
    await shot(page, name);
    const text = await page.locator('#root').innerText();
    const wide = await overflow(page);
    // Digits apart: clocks and countdowns make no other screen.
    const outline = `${size}${screen}${text.replace(/\d+/g, '')}`;
    const findings = judged.has(outline) ? [] : await seriousFindings(page);
    judged.add(outline);
    return [
      ...findings,
      ...problems,
      ...(wide > 0 ? [`reaches ${wide} px beyond the right edge`] : []),
      ...(/\b(undefined|NaN|Infinity|\[object)\b/.test(text) ? ['shows a value that is none'] : []),
      ...(/This page failed on this device|A part of this page could not be fetched/i.test(text)
        ? ['shows the page of an error']
        : []),
    ];
  }
});
