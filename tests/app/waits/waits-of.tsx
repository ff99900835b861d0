/** The waits' screens over a fake server that answers everything they ask, on a desk or a phone. */
import { vi } from 'vitest';
import type { CompareWaitsDto, WaitChargesDto, WaitGroupDto, WaitRowDto, WaitsDto } from '@/shared/contract/waits';
import type { Role } from '@/shared/contract/roles';
import { fakeServer } from '../workshop/server';

/** Tuesday 9 June 2026, 13:42 in UTC. */
export const now = Date.parse('2026-06-09T13:42:00Z');
export const eight = 'from=2026-04-20&to=2026-06-09';

const spread = (charges: number) => ({
  ...{ charges, few: charges < 5, waitHours: 90, medianS: 12_300, p90S: 22_200, usedHours: 58, lostHours: 42 },
});
const plan = { againstPlanS: 240, biasS: 780, absErrorS: 540, insideBand: 0.83 };
export const groupOf = (key: string, name: string, charges: number): WaitGroupDto => ({
  ...{ key, name },
  ...spread(charges),
  ...plan,
});
const groups = [groupOf('t1', '2-series 66 Ah', 104), groupOf('t2', '4-series 105 Ah', 3)];

export const waitsOf = (change: Partial<WaitsDto> = {}): WaitsDto => ({
  ...spread(107),
  ...{ from: '2026-04-20', to: '2026-06-09', plan },
  weeks: [
    { monday: '2026-05-25', week: 22, ...spread(12), lostHours: 76 },
    { monday: '2026-06-01', week: 23, ...spread(14), lostHours: 49 },
    { monday: '2026-06-08', week: 24, ...spread(2), lostHours: 3 },
  ],
  stages: [
    { stage: 'queue', charges: 40, few: false, waitHours: 16, medianS: 1500, p90S: 4000 },
    { stage: 'charging', charges: 107, few: false, waitHours: 60, medianS: 5280, p90S: 9000 },
    { stage: 'tapering', charges: 3, few: true, waitHours: 2, medianS: 1860, p90S: 2000 },
  ],
  byModuleType: groups,
  channels: [
    { channelId: 'a1', name: 'A1', chargerName: 'A', retired: false, busyHours: 36, openHours: 100, share: 0.36 },
    { channelId: 'c2', name: 'C2', chargerName: 'C', retired: false, busyHours: 0, openHours: 0, share: null },
  ],
  ...change,
});

export const rowOf = (title: string, change: Partial<WaitRowDto> = {}): WaitRowDto => ({
  ...{ chargeId: `charge-${title}`, title, typeName: '2-series 66 Ah', chargerName: 'A', channelName: 'A1' },
  ...{ technicianName: 'Ines Holm', way: 'terminals', insideBand: true },
  ...{ askedAt: '2026-06-08T08:00:00.000Z', readyAt: '2026-06-08T11:25:00.000Z' },
  ...{ waitS: 12_300, usedS: 3600, lostS: 8700, plannedS: 12_060, actualS: 12_300, stages: [] },
  ...change,
});
const page = (rows: WaitRowDto[], next: string | null = null): WaitChargesDto => ({ rows, next });

export const comparison: CompareWaitsDto = {
  before: { ...spread(90), from: '2026-02-23', to: '2026-04-14', lostHoursPerWeek: 76.2 },
  then: { ...spread(107), from: '2026-04-20', to: '2026-06-09', lostHoursPerWeek: 49.1 },
  difference: { medianS: -1500, lowS: -2400, highS: -600, p: 0.003, clear: true, text: 'Shorter: −25 min.' },
};

/** jsdom has none: tells each box once that it has been laid out. */
class LaidOut {
  constructor(private readonly heard: (entries: { target: Element }[]) => void) {}
  observe(target: Element) {
    this.heard([{ target }]);
  }
  unobserve() {}
  disconnect() {}
}

export function serverOf(role: Role = 'manager', width = 1440) {
  vi.stubGlobal('ResizeObserver', LaidOut);
  for (const name of ['clientWidth', 'clientHeight'] as const)
    vi.spyOn(document.documentElement, name, 'get').mockReturnValue(name === 'clientWidth' ? width : 900);
  window.dispatchEvent(new Event('resize'));
  vi.spyOn(HTMLElement.prototype, 'offsetWidth', 'get').mockReturnValue(Math.min(760, width - 32));
  vi.spyOn(HTMLElement.prototype, 'offsetHeight', 'get').mockReturnValue(60);
  const server = fakeServer(role);
  Object.assign(server.answers, {
    'GET /api/module-types': () => Response.json([{ id: 't1', name: '2-series 66 Ah' }]),
    'GET /api/chargers': () => Response.json([{ id: 'ca', name: 'A', channels: [{ id: 'a1', name: 'A1' }] }]),
    [`GET /api/waits?${eight}`]: () => Response.json(waitsOf()),
    [`GET /api/waits/groups?${eight}&by=module-type`]: () => Response.json({ by: 'module-type', groups }),
    [`GET /api/waits/charges?${eight}`]: () => Response.json(page([rowOf('R-2411'), rowOf('R-2408')])),
    [`GET /api/waits/compare?${eight}&compareFrom=2026-02-23&compareTo=2026-04-14`]: () => Response.json(comparison),
  });
  return server;
}
export { page };
