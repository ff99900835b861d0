/** Part of route-fixtures.ts: hours, skills, places and other work. */
import { staffingForm, workForm } from '@/tests/support/benched';
import type { Furnished } from '@/tests/support/furnished';
import type { Fit, RouteFixture } from './route-fixtures';

const technician = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'technician', fit });
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
};
