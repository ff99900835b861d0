/** A workshop with places, skills and other work, for tests; acts of its people by the API. */
import { expect } from 'vitest';
import type { PlaceDto, SkillDto, StaffingDto, StaffingListDto } from '@/shared/contract/staffing';
import type { StintDto, WorkDto } from '@/shared/contract/work';
import type { Role } from '@/shared/contract/roles';
import { staffingForm, workForm } from '@/tests/support/benched';
import type { TestServer } from '@/tests/support/server';
import { key, minute } from '../charges/bench';

type Sent = ReturnType<ReturnType<TestServer['agentFor']>['post']>;

export interface Crew {
  server: TestServer;
  /** Posts as somebody with a key of its own. */
  send: (path: string, body?: object, role?: Role) => Sent;
  skill: (name: string) => Promise<SkillDto>;
  place: (name: string) => Promise<PlaceDto>;
  /** Hours, breaks, days off and skills of a person of the own workshop. */
  staff: (role: Role, change: object) => Promise<StaffingDto>;
  staffing: () => Promise<StaffingListDto>;
  add: (change?: object) => Promise<WorkDto>;
  take: (work: Pick<WorkDto, 'id'>, body?: object, role?: Role) => Promise<WorkDto>;
  /** An act on a stint: begin, done, give-back. */
  act: (work: WorkDto, what: string, body?: object, role?: Role) => Sent;
  acted: (work: WorkDto, what: string, body?: object, role?: Role) => Promise<WorkDto>;
  seen: (id: string) => Promise<WorkDto>;
  /** So many minutes after the test's beginning, Tuesday 10:00 in Berlin, as an instant of the wire. */
  minutes: (after: number) => string;
}

export async function taken<Dto = WorkDto>(test: Promise<{ status: number; body: unknown }>): Promise<Dto> {
  const { status, body } = await test;
  expect([200, 201], JSON.stringify(body)).toContain(status);
  return body as Dto;
}
/** Status, code and sentence of a refusal. */
export async function refused(
  test: Promise<{ status: number; body: { code?: string; detail?: string; fields?: Record<string, string> } }>,
): Promise<[status: number, code: string | undefined, told: string | Record<string, string> | undefined]> {
  const { status, body } = await test;
  return [status, body.code, body.fields ?? body.detail?.replaceAll('\u00a0', ' ')];
}

/** The stint that stands, of the work as it was answered; else the last. */
export const stintOf = (work: WorkDto): StintDto =>
  work.stints.find(({ state }) => state === 'taken' || state === 'begun') ?? work.stints.at(-1)!;
/** 'HH:MM–HH:MM' UTC of a stint. */
export const spanOf = ({ from, to }: Pick<StintDto, 'from' | 'to'>): string =>
  `${from.slice(11, 16)}–${to.slice(11, 16)}`;

export function makeCrew(server: TestServer): Crew {
  const began = server.clock.now();
  const send: Crew['send'] = (path, body = {}, role = 'technician') =>
    server.agentFor(role).post(`/api/${path}`, body).set('Idempotency-Key', key());
  const act: Crew['act'] = (work, what, body = {}, role = 'technician') =>
    send(`work/${work.id}/stints/${stintOf(work).id}/${what}`, body, role);
  const staffing = async () =>
    (await server.agentFor('manager').get('/api/staffing').expect(200)).body as StaffingListDto;
  return {
    server,
    send,
    act,
    staffing,
    acted: (work, what, body, role) => taken(act(work, what, body, role)),
    skill: (name) => taken<SkillDto>(send('skills', { name }, 'manager')),
    place: (name) => taken<PlaceDto>(send('places', { name, kind: 'bay' }, 'manager')),
    async staff(role, change) {
      const personId = server.own.people[role].id;
      const known = (await staffing()).people.find(({ person }) => person.id === personId);
      return taken<StaffingDto>(
        server
          .agentFor('manager')
          .patch(`/api/staffing/${personId}`, staffingForm(change))
          .set('If-Match', `"${known?.rev ?? 0}"`),
      );
    },
    add: (change) => taken(send('work', workForm(change))),
    take: (work, body, role) => taken(send(`work/${work.id}/take`, body, role)),
    seen: async (id) => (await server.agentFor('technician').get(`/api/work/${id}`).expect(200)).body as WorkDto,
    minutes: (after) => new Date(began + after * minute).toISOString(),
  };
}
