/** The routes of alerts, of where they go, and of what could not be brought. */
import type { RouteFixture } from './route-fixtures';

const technician = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'technician', fit });
const manager = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'manager', fit });

export const alertFixtures: Record<string, RouteFixture> = {
  'GET /api/alerts': technician(),
  'POST /api/alerts/:id/take': technician((f) => ({ params: { id: f.alertId } })),
  'POST /api/alerts/:id/pass': technician((f) => ({
    params: { id: f.alertId },
    body: { personId: f.workshop.people.foreman.id },
  })),
  'GET /api/alerts/undelivered': manager(),
  'POST /api/alerts/undelivered/:id/again': manager((f) => ({ params: { id: f.undeliveredId } })),
  'POST /api/alerts/undelivered/:id/drop': manager((f) => ({ params: { id: f.undeliveredId } })),
  'GET /api/me/alert-settings': technician(),
  'PATCH /api/me/alert-settings': technician(() => ({ body: { quiet: { from: '22:00', to: '06:00' } } })),
  'GET /api/push-key': technician(),
  'GET /api/demo/mailbox': technician(),
  'POST /api/demo/phone': technician(),
  'POST /api/me/push-devices': technician(() => ({ body: { kind: 'phone', token: 'ExponentPushToken[new]' } })),
  'DELETE /api/me/push-devices/:id': technician((f) => ({ params: { id: f.deviceId } })),
};
