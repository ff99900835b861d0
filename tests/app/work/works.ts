import { serverClock } from '@/shared/client/clock';
import { vi } from 'vitest';
import type { FitDto, FitsDto, FreeStretchDto, MyDayDto, PlanBlockDto } from '@/shared/contract/bench-plan';
import type { Role } from '@/shared/contract/roles';
import type { StintDto, WorkDto, WorkListDto } from '@/shared/contract/work';
import { iso } from '../bench-plan/plan-of';
import { fakeServer } from '../workshop/server';

export { at, iso, now, zone } from '../bench-plan/plan-of';

export const petra = { id: 'p1', name: 'Petra Aldwin' };
export const bram = { id: 'p3', name: 'Bram Teal' };

export const skills = [{ id: 'brakes', name: 'brakes', people: 1, inUse: true, rev: 1 }];
export const places = [
  { id: 'b4', name: 'bay 4', kind: 'bay', inUse: true, rev: 1 },
  { id: 'k2', name: 'bench 2', kind: 'bench', inUse: false, rev: 1 },
];
const week = Array.from({ length: 7 }, () => ({ from: '08:00', to: '17:00' }));
const staff = (person: { id: string; name: string }, skillIds: string[]) => ({
  person,
  hours: null,
  hoursNow: week,
  breaks: [],
  daysOff: [],
  skillIds,
  rev: 1,
});
export const staffing = { people: [staff(petra, ['brakes']), staff(bram, [])], skills, places };

export const brakes: WorkDto = {
  id: 'w1',
  number: 'W-0012',
  title: 'Brake bleed',
  likelyMinutes: 20,
  longMinutes: 30,
  skill: { id: 'brakes', name: 'brakes' },
  place: { id: 'b4', name: 'bay 4' },
  repair: { id: 'r16', number: 'R-2416' },
  priority: 'high',
  dueAt: iso('17:00'),
  splittable: false,
  note: null,
  state: 'open',
  leftMinutes: 20,
  leftLongMinutes: 30,
  stints: [],
  createdBy: bram,
  createdAt: iso('09:00'),
  over: null,
  rev: 4,
};
export const cleaning: WorkDto = {
  ...brakes,
  id: 'w2',
  number: 'W-0013',
  title: 'Module cleaning',
  likelyMinutes: 40,
  longMinutes: 60,
  leftMinutes: 40,
  leftLongMinutes: 60,
  skill: null,
  place: { id: 'k2', name: 'bench 2' },
  repair: null,
  priority: 'usual',
  dueAt: null,
  splittable: true,
};

export const stint = (more: Partial<StintDto> = {}): StintDto => ({
  id: 's1',
  person: petra,
  givenBy: null,
  state: 'taken',
  from: iso('14:55'),
  to: iso('15:25'),
  begunAt: null,
  endedAt: null,
  waitOf: null,
  ...more,
});
/** The work as it is once these stints have all of it. */
export const inHands = (work: WorkDto, ...stints: StintDto[]): WorkDto => ({
  ...work,
  stints,
  state: stints.some(({ state }) => state === 'begun') ? 'begun' : 'taken',
  leftMinutes: 0,
  leftLongMinutes: 0,
  rev: work.rev + 1,
});

export const listOf = (work: WorkDto[], over = 0): WorkListDto => ({
  work,
  counts: {
    open: work.filter(({ state }) => state === 'open').length,
    taken: work.filter(({ state }) => state === 'taken').length,
    begun: work.filter(({ state }) => state === 'begun').length,
    over,
  },
  nextPage: null,
});

export const free = (from: string, to: string, waitOf: string | null = 'R-2411'): FreeStretchDto => ({
  from: iso(from),
  to: iso(to),
  minutes: (Date.parse(iso(to)) - Date.parse(iso(from))) / 60_000,
  waitOf: waitOf === null ? null : { chargeId: waitOf, title: waitOf },
  lookIns: [],
});
export const fit = (work: WorkDto, from: string, to: string, more: Partial<FitDto> = {}): FitDto => ({
  work,
  span: { from: iso(from), to: iso(to) },
  minutes: work.leftLongMinutes,
  suggested: true,
  overByMinutes: null,
  because: null,
  ...more,
});
export const fitsOf = (stretch: FreeStretchDto, ...fits: FitDto[]): FitsDto => ({
  at: iso('13:42'),
  proved: true,
  people: [{ person: petra, stretches: [{ ...stretch, fits }] }],
});

export const fill = (state: 'taken' | 'begun' | 'done', more: Partial<PlanBlockDto> = {}): PlanBlockDto => ({
  kind: 'fill',
  title: 'Brake bleed R-2416',
  chargeId: 'R-2411',
  repairId: 'r16',
  workId: 'w1',
  stint: { id: 's1', state },
  tooLong: null,
  place: 'bay 4',
  from: iso('14:55'),
  to: iso('15:25'),
  ...more,
});
export const myDay = (more: Partial<MyDayDto> = {}): MyDayDto => ({
  at: iso('13:42'),
  zone: 'Etc/GMT-2',
  day: '2026-06-09',
  person: petra,
  skills: ['brakes'],
  present: [
    { from: iso('08:00'), to: iso('12:00') },
    { from: iso('12:30'), to: iso('17:00') },
  ],
  breaks: [{ from: iso('12:00'), to: iso('12:30') }],
  daysOff: [],
  blocks: [],
  free: [],
  lookIns: [],
  ...more,
});

/** The API with these people, places and skills; nothing is open, and nobody has anything to do. */
export function workServer(role: Role) {
  const server = fakeServer(role);
  Object.assign(server.answers, {
    'GET /api/staffing': () => Response.json(staffing),
    'GET /api/repairs': () => Response.json({ repairs: [], counts: {}, nextPage: null }),
    'GET /api/bench-plan/my-day': () => Response.json(myDay()),
    'GET /api/bench-plan/fits': () => Response.json({ at: iso('13:42'), proved: true, people: [] }),
    'GET /api/alerts': () => Response.json([]),
  });
  return server;
}
export type WorkServer = ReturnType<typeof workServer>;

/** Stands the clock of the page still, at the moment of the drawings or at another. */
export const atClock = (ms: number) => {
  vi.useFakeTimers({ now: ms, toFake: ['Date'] });
  // A test before it may have left the clock later: the app takes that for a phone that was set back.
  serverClock.correct(0);
};
