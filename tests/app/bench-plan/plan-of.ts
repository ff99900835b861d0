import type {
  BenchPlanDto,
  FitDto,
  FitsDto,
  MovePlacesDto,
  PlacedDto,
  PlanBlockDto,
  PlanChargeDto,
  PlanPersonDto,
  ProposalDto,
  StartNowDto,
} from '@/shared/contract/bench-plan';
import type { ChargeCardDto, Stage } from '@/shared/contract/charge';
import type { WorkDto } from '@/shared/contract/work';
import { at, card, now, zone } from '../wall/cards';

export { at, now, zone };
/** The wire's instant of a clock of the drawings. */
export const iso = (clock: string): string => new Date(at(clock)).toISOString();
const span = (from: string, to: string) => ({ from: iso(from), to: iso(to) });

type Rows = [ChargeCardDto['segments'][number]['kind'], string, string][];

/** A charge of the drawing of the plan: where it holds which channel, and its silhouette. */
export function planned(
  title: string,
  channelId: string,
  stage: Stage,
  rows: Rows,
  {
    ready = null,
    more = {},
    fixed = null,
    lookIns = [],
  }: {
    ready?: [string, string, string] | null;
    more?: Partial<ChargeCardDto>;
    fixed?: string | null;
    lookIns?: [string, 'done' | 'open'][];
  } = {},
): PlanChargeDto {
  const begin = rows[0]![1];
  const end = rows.at(-1)![2];
  const open = stage === 'queued' || stage === 'planned';
  return {
    card: card(title, stage, ready, {
      channelNames: [channelId.toUpperCase()],
      clipOnAt: iso(begin),
      startedAt: open ? null : iso(begin),
      segments: rows.map(([kind, from, to]) => ({ kind, ...span(from, to) })),
      lookIns: lookIns.map(([clock, state], index) => ({
        id: `${title}-${index}`,
        dueAt: iso(clock),
        doneAt: state === 'done' ? iso(clock) : null,
        by: null,
      })),
      ...more,
    }),
    holds: [{ channelId, ...span(begin, end) }],
    fixedBecause: fixed ?? (open ? null : `${title} has begun: it stays where it is.`),
    lookIns: [],
  };
}

const r2421 = planned(
  'R-2421',
  'a1',
  'planned',
  [
    ['cc', '14:45', '15:50'],
    ['taper', '15:50', '16:20'],
    ['rest', '16:20', '17:20'],
  ],
  { ready: ['17:10', '17:25', '17:55'] },
);
const r2418 = planned(
  'R-2418',
  'b1',
  'queued',
  [
    ['queue', '13:42', '14:00'],
    ['cc', '14:00', '15:30'],
    ['rest', '15:30', '17:00'],
  ],
  { ready: ['16:40', '17:05', '18:05'], more: { clipOnAt: iso('14:00') } },
);
r2418.holds = [{ channelId: 'b1', ...span('14:00', '17:00') }];

export const charges: PlanChargeDto[] = [
  planned(
    'R-2409',
    'a1',
    'check-due',
    [
      ['cc', '08:48', '11:12'],
      ['taper', '11:12', '11:45'],
      ['rest', '11:45', '13:30'],
    ],
    { more: { checkDueAt: iso('13:30') } },
  ),
  r2421,
  planned(
    'R-2404',
    'a2',
    'fitted',
    [
      ['cc', '08:05', '09:20'],
      ['taper', '09:20', '09:45'],
      ['rest', '09:45', '10:36'],
    ],
    { more: { readyAt: iso('10:41') } },
  ),
  planned(
    'R-2411',
    'a2',
    'charging',
    [
      ['cc', '11:50', '13:52'],
      ['taper', '13:52', '14:25'],
      ['rest', '14:25', '15:25'],
    ],
    {
      ready: ['15:15', '15:30', '15:55'],
      lookIns: [
        ['12:50', 'done'],
        ['13:50', 'open'],
        ['14:50', 'open'],
      ],
    },
  ),
  planned(
    'R-2408',
    'b1',
    'ready',
    [
      ['cc', '10:10', '12:02'],
      ['taper', '12:02', '12:32'],
      ['rest', '12:32', '13:32'],
    ],
    { more: { readyAt: iso('13:35') } },
  ),
  r2418,
  planned(
    'R-2406',
    'b2',
    'tapering',
    [
      ['cc', '08:50', '11:20'],
      ['taper', '11:20', '13:54'],
      ['rest', '13:54', '14:54'],
    ],
    { ready: ['14:45', '14:55', '15:30'], more: { overdueSince: iso('13:20') } },
  ),
  planned(
    'R-2412',
    'c1',
    'resting',
    [
      ['cc', '12:25', '13:20'],
      ['rest', '13:20', '14:20'],
    ],
    { ready: ['14:18', '14:25', '14:50'], more: { channelNames: [] } },
  ),
  planned(
    'R-2415',
    'c2',
    'discharging',
    [
      ['cc', '13:05', '15:53'],
      ['taper', '15:53', '16:15'],
      ['rest', '16:15', '17:15'],
    ],
    {
      ready: ['16:55', '17:20', '18:05'],
      more: { direction: 'discharge' },
      lookIns: [
        ['14:05', 'open'],
        ['15:05', 'open'],
        ['16:05', 'open'],
      ],
    },
  ),
];

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
const free = (from: string, to: string): PlanPersonDto['free'][number] => ({
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

const band = (early: string, likely: string, late: string) => ({
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

export const placed = (
  channelName: string,
  clipOn: string,
  [early, likely, late]: [string, string, string],
  lateByMinutes = 0,
): PlacedDto => ({
  channelNames: [channelName],
  clipOnAt: iso(clipOn),
  ready: band(early, likely, late),
  lateByMinutes,
});

/** Where R-2421 could go. */
export const places: MovePlacesDto = {
  chargeId: 'R-2421',
  rev: 1,
  places: [
    { channelId: 'a1', channelName: 'A1', soonest: placed('A1', '14:00', ['16:25', '16:40', '17:10']), because: null },
    {
      channelId: 'a2',
      channelName: 'A2',
      soonest: placed('A2', '15:45', ['18:10', '18:25', '18:55'], 40),
      because: null,
    },
    { channelId: 'b1', channelName: 'B1', soonest: null, because: 'R-2418 has B1 until 17:05.' },
    { channelId: 'b2', channelName: 'B2', soonest: null, because: 'R-2406 has B2, and nobody can say until when.' },
    { channelId: 'c1', channelName: 'C1', soonest: placed('C1', '13:45', ['14:55', '15:05', '15:20']), because: null },
    { channelId: 'c2', channelName: 'C2', soonest: null, because: 'C2 goes no higher than 10 V.' },
  ],
};

export const workOf = (id: string, title: string, more: Partial<WorkDto> = {}): WorkDto => ({
  id,
  number: `W-${id}`,
  title,
  likelyMinutes: 30,
  longMinutes: 40,
  skill: null,
  place: { id: 'bay-1', name: 'bay 1' },
  repair: { id: 'r19', number: 'R-2419' },
  priority: 'usual',
  dueAt: null,
  splittable: false,
  note: null,
  state: 'open',
  leftMinutes: 30,
  leftLongMinutes: 40,
  stints: [],
  createdBy: { id: 'hella', name: 'Hella Brandt' },
  createdAt: iso('08:00'),
  over: null,
  rev: 4,
  ...more,
});

const fit = (work: WorkDto, more: Partial<FitDto> = {}): FitDto => ({
  work,
  span: span('14:56', '15:36'),
  minutes: work.leftLongMinutes,
  suggested: false,
  overByMinutes: null,
  because: null,
  ...more,
});

export const fits: FitsDto = {
  at: plan.at,
  proved: true,
  people: [
    {
      person: { id: 'marek', name: 'Marek Olsen' },
      stretches: [
        {
          ...free('14:56', '17:10'),
          fits: [
            fit(workOf('1', 'Charge port flap'), { suggested: true }),
            fit(
              workOf('2', 'Module cleaning', {
                repair: null,
                place: { id: 'bench-2', name: 'bench 2' },
                longMinutes: 60,
                leftLongMinutes: 60,
              }),
            ),
            fit(workOf('3', 'Gearbox oil', { leftLongMinutes: 146 }), {
              span: null,
              overByMinutes: 12,
              because: '12 min too long',
            }),
          ],
        },
      ],
    },
    {
      person: { id: 'suri', name: 'Suri Vance' },
      stretches: [{ ...free('16:05', '17:30'), fits: [fit(workOf('1', 'Charge port flap'))] }],
    },
  ],
};

export const proposal: ProposalDto = {
  id: 'p-7',
  at: plan.at,
  because: 'R-2406 is 22 min late on B2.',
  moves: [
    {
      chargeId: 'R-2421',
      rev: 1,
      title: 'R-2421',
      dueAt: plan.queue[1]!.dueAt,
      now: placed('A1', '14:45', ['17:10', '17:25', '17:55']),
      then: placed('C1', '15:15', ['17:40', '17:55', '18:25']),
      text: 'R-2421 ready 30 min later, on time',
    },
  ],
  asTheyAre: ['R-2418 as it is'],
  unplaced: [],
  lateMinutes: { now: 44, then: 0 },
  proved: true,
};

export const startNow: StartNowDto[] = [
  {
    repairId: 'r24',
    number: 'R-2424',
    vehicle: 'Blue van',
    typeName: '2-series 66 Ah',
    usualVolts: 3.85,
    arrivals: 12,
    spare: { id: 's22', label: 'S-0422', shelfPlace: 'D3' },
    channelName: 'C1',
    takes: { p10S: 6600, p50S: 7800, p90S: 9600 },
    thenS: 1500,
    savesS: 5700,
  },
];
