import type { BenchPlanDto, PlanBlockDto, PlanPersonDto } from '@/shared/contract/bench-plan';
import { at, charges, iso, now, span, zone } from './charges-of';

export { at, charges, iso, now, planned, zone } from './charges-of';

const block = (from: string, to: string, title: string, kind: PlanBlockDto['kind'] = 'fit'): PlanBlockDto => ({
  ...span(from, to),
  kind,
  title,
  chargeId: null,
  repairId: null,
  workId: kind === 'fill' ? title : null,
  stint: kind === 'fill' ? { id: title, state: 'taken' } : null,
  place: null,
});
export const free = (from: string, to: string): PlanPersonDto['free'][number] => ({
  ...span(from, to),
  minutes: (at(to) - at(from)) / 60_000,
  waitOf: null,
  lookIns: [],
});

function person(
  id: string,
  name: string,
  {
    blocks,
    pauses = [],
    frees,
    looks,
  }: { blocks: PlanBlockDto[]; pauses?: [string, string][]; frees: [string, string][]; looks: string[] },
): PlanPersonDto {
  return {
    person: { id, name },
    skills: [],
    present: [span('08:00', '18:00')],
    breaks: pauses.map(([from, to]) => span(from, to)),
    daysOff: [],
    blocks,
    free: frees.map(([from, to]) => free(from, to)),
    lookIns: looks.map((clock) => ({
      chargeId: `look-${clock}`,
      title: 'R-2411',
      channelName: 'A2',
      dueAt: iso(clock),
      doneAt: at(clock) < now ? iso(clock) : null,
      person: { id, name },
      nobody: null,
    })),
  };
}

export const people: PlanPersonDto[] = [
  person('ines', 'Ines Marlow', {
    blocks: [
      block('08:05', '10:05', 'Read R-2418'),
      block('10:45', '11:48', 'Fit R-2404'),
      block('13:56', '14:12', 'Clip on R-2418', 'clip-on'),
      block('14:13', '14:48', 'Hose', 'fill'),
      block('15:32', '17:05', 'Fit R-2411'),
    ],
    pauses: [['12:02', '12:45']],
    frees: [['14:53', '15:30']],
    looks: ['12:50', '13:50', '14:50'],
  }),
  person('bram', 'Bram Teal', {
    blocks: [
      block('08:05', '08:50', 'Clip on R-2406', 'clip-on'),
      block('09:00', '11:55', 'Brakes R-2410', 'fill'),
      block('12:42', '13:41', 'Seal lid', 'fill'),
      block('14:22', '14:55', 'Clips R-2406', 'clip-off'),
      block('15:00', '17:00', 'Fit R-2406'),
    ],
    pauses: [['12:00', '12:40']],
    frees: [['13:40', '14:20']],
    looks: ['09:50', '10:50'],
  }),
  person('suri', 'Suri Vance', {
    blocks: [
      block('08:20', '10:40', 'Coolant R-2405', 'fill'),
      block('10:50', '12:22', 'Read R-2412'),
      block('12:35', '14:02', 'Bearing R-2414', 'fill'),
      block('14:26', '16:00', 'Fit R-2412'),
    ],
    frees: [['16:05', '17:30']],
    looks: ['14:20'],
  }),
  person('marek', 'Marek Olsen', {
    blocks: [block('08:05', '11:30', 'Strip R-2415'), block('13:12', '14:52', 'Door lock R-2419', 'fill')],
    pauses: [['12:00', '12:40']],
    frees: [['14:56', '17:10']],
    looks: ['14:05', '15:05', '16:05'],
  }),
];

export const band = (early: string, likely: string, late: string) => ({
  early: iso(early),
  likely: iso(likely),
  late: iso(late),
});

/** Tuesday 9 June, 13:42: the drawing of the plan. */
export const plan: BenchPlanDto = {
  at: new Date(now).toISOString(),
  zone,
  day: '2026-06-09',
  days: 1,
  from: new Date(Date.parse('2026-06-09T00:00:00+02:00')).toISOString(),
  to: new Date(Date.parse('2026-06-10T00:00:00+02:00')).toISOString(),
  open: [span('08:00', '18:00')],
  channels: (
    [
      ['a1', '10 A', '13:42'],
      ['a2', '10 A', '15:30'],
      ['b1', '20 A', '17:05'],
      ['b2', '20 A', '14:55'],
      ['c1', '60 A', '13:42'],
      ['c2', 'two-way 10 A', '17:20'],
    ] as const
  ).map(([id, kind, freeAt]) => ({ id, name: id.toUpperCase(), kind, freeAt: iso(freeAt) })),
  charges,
  people,
  queue: [
    {
      chargeId: 'R-2418',
      rev: 1,
      title: 'R-2418',
      stage: 'queued',
      channelNames: ['B1'],
      clipOnAt: iso('14:00'),
      ready: band('16:40', '17:05', '18:05'),
      dueAt: iso('18:15'),
      lateByMinutes: 0,
      otherwise: null,
    },
    {
      chargeId: 'R-2421',
      rev: 1,
      title: 'R-2421',
      stage: 'planned',
      channelNames: ['A1'],
      clipOnAt: iso('14:45'),
      ready: band('17:10', '17:25', '17:55'),
      dueAt: new Date(Date.parse('2026-06-10T10:00:00+02:00')).toISOString(),
      lateByMinutes: 0,
      otherwise: 'On B1 at 15:30 it is ready 30 min later.',
    },
  ],
  counts: { charges: 6, late: 1 },
  waitsToday: { usedS: 33_600, lostS: 15_000 },
  lastChange: {
    id: 'change-1',
    text: 'R-2418 from A1 at 14:45 to B1 at 14:00',
    by: { id: 'hella', name: 'Hella Brandt' },
    at: iso('13:30'),
    lastingBecause: null,
  },
};
plan.channels.find(({ id }) => id === 'a1')!.freeAt = iso('14:00');
