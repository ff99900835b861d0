/** What the server answers beside the plan: places of a move, what fits, a better plan, what could be started now. */
import type { FitDto, FitsDto, MovePlacesDto, PlacedDto, ProposalDto, StartNowDto } from '@/shared/contract/bench-plan';
import type { WorkDto } from '@/shared/contract/work';
import { iso, span } from './charges-of';
import { band, free, plan } from './plan-of';

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
    aimVolts: 3.85,
    arrivals: 12,
    spare: { id: 's22', label: 'S-0422', shelfPlace: 'D3' },
    channelName: 'C1',
    takes: { p10S: 6600, p50S: 7800, p90S: 9600 },
    thenS: 1500,
    savesS: 5700,
  },
];
