/** The routes of the waits, of their replays, and of the weekly digest. */
import type { RouteFixture } from './route-fixtures';

const foreman = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'foreman', fit });
const manager = (fit?: RouteFixture['fit']): RouteFixture => ({ who: 'manager', fit });

export const waitsFixtures: Record<string, RouteFixture> = {
  'GET /api/waits': foreman(),
  'GET /api/waits.csv': foreman(),
  'GET /api/waits/groups': foreman(() => ({ query: 'by=way' })),
  'GET /api/waits/charges': foreman(),
  'GET /api/waits/compare': foreman(() => ({ query: 'compareFrom=2026-04-01&compareTo=2026-04-30' })),

  'GET /api/me/weekly-digest': manager(),
  'PATCH /api/me/weekly-digest': manager(() => ({ body: { on: true } })),
  'GET /api/digest/stop': { who: 'anyone', fit: (f) => ({ query: `token=${f.digestToken}` }) },
  'POST /api/digest/stop': { who: 'anyone', fit: (f) => ({ query: `token=${f.digestToken}` }) },
  'POST /api/waits/what-if': foreman((f) => ({
    body: { questions: [{ moreLikeChannelId: f.channelId }], together: false },
  })),
  'POST /api/waits/channels-needed': foreman((f) => ({ body: { channelId: f.channelId, wishedP90Hours: 4 } })),
  'POST /api/waits/shelf': foreman((f) => ({ body: { moduleTypeId: f.typeId } })),
  'GET /api/waits/replays/:id': foreman((f) => ({ params: { id: f.replayId } })),
  'POST /api/waits/replays/:id/cancel': foreman((f) => ({ params: { id: f.replayId } })),
};
