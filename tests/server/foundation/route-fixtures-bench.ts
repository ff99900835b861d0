/** Part of route-fixtures.ts: hours, skills, places, other work and the bench plan. */
import { staffingForm, workForm } from '@/tests/support/benched';
import type { Furnished } from '@/tests/support/furnished';
import type { Fit, RouteFixture } from './route-fixtures';

const technician = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'technician', fit });
const foreman = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'foreman', fit });
const manager = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'manager', fit });

const work =
  (body: (f: Furnished) => object = () => ({})) =>
  (f: Furnished): Fit => ({ params: { id: f.bench.workId }, body: body(f), rev: f.bench.workRev });
const stint =
  (body: object = {}) =>
  (f: Furnished): Fit => ({ params: { id: f.bench.workId, stintId: f.bench.stintId }, body });
const form = (f: Furnished) =>
  workForm({
    ...{ title: 'Changed', skillId: f.bench.skillId, placeId: f.bench.placeId, repairId: f.repairs.waitingRepairId },
    splittable: true,
  });

export const benchFixtures: Record<string, RouteFixture> = {
  'GET /api/staffing': technician(),
  'PATCH /api/staffing/:personId': manager((f) => ({
    params: { personId: f.workshop.people.technician.id },
    body: staffingForm({ skillIds: [f.bench.unusedSkillId] }),
  })),
  'POST /api/skills': manager(() => ({ body: { name: 'One more' } })),
  'PATCH /api/skills/:id': manager((f) => ({ params: { id: f.bench.skillId }, body: { name: 'Renamed' } })),
  'DELETE /api/skills/:id': manager((f) => ({ params: { id: f.bench.unusedSkillId } })),
  'POST /api/places': manager(() => ({ body: { name: 'One more', kind: 'bay' } })),
  'PATCH /api/places/:id': manager((f) => ({
    params: { id: f.bench.placeId },
    body: { name: 'Renamed', kind: 'bench' },
  })),
  'DELETE /api/places/:id': manager((f) => ({ params: { id: f.bench.unusedPlaceId } })),

  'GET /api/work': technician(),
  'POST /api/work': technician((f) => ({ body: form(f) })),
  'GET /api/work/:id': technician(work()),
  'PATCH /api/work/:id': technician(work(form)),
  'POST /api/work/:id/take': technician(
    // A day ahead, where the technician has nothing yet.
    work((f) => ({ personId: f.workshop.people.technician.id, from: '2026-06-10T08:00:00Z', minutes: '20' })),
  ),
  'POST /api/work/:id/stints/:stintId/begin': technician(stint()),
  'POST /api/work/:id/stints/:stintId/done': technician(stint({ minutesLeft: '10' })),
  'POST /api/work/:id/stints/:stintId/give-back': technician(stint()),
  'POST /api/work/:id/drop': technician(work(() => ({ reason: 'Another workshop does it.' }))),
  'POST /api/work/:id/reopen': technician((f) => ({ params: { id: f.bench.droppedWorkId } })),

  'GET /api/bench-plan': foreman(),
  'GET /api/bench-plan/proposal': foreman(),
  'GET /api/bench-plan/places': foreman((f) => ({ query: `chargeId=${f.chargeId}` })),
  'POST /api/bench-plan/accept': foreman(() => ({ body: { proposalId: 'none-of-today' } })),
  'POST /api/bench-plan/move': foreman((f) => ({
    body: { chargeId: f.chargeId, rev: f.chargeRev, channelId: f.channelId, clipOnAt: '2026-06-10T08:00:00Z' },
  })),
  'POST /api/bench-plan/undo/:id': foreman(() => ({ params: { id: 'no-change' } })),
  'GET /api/bench-plan/fits': technician(),
  'GET /api/bench-plan/my-day': technician(),
  'GET /api/bench-plan/start-now': technician(),
  'GET /api/bench-plan/day-sheet.pdf': technician(),
};
