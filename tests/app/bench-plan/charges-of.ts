import type { PlanChargeDto } from '@/shared/contract/bench-plan';
import type { ChargeCardDto, Stage } from '@/shared/contract/charge';
import { at, card, now, zone } from '../wall/cards';

export { at, now, zone };
/** The wire's instant of a clock of the drawings. */
export const iso = (clock: string): string => new Date(at(clock)).toISOString();
export const span = (from: string, to: string) => ({ from: iso(from), to: iso(to) });

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
