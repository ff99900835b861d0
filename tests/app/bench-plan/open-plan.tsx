/** The bench plan's screen over a fake server, laid out on a desk or a phone. */
import { screen, within } from '@testing-library/react';
import { vi } from 'vitest';
import BenchPlan from '@/app/(workshop)/bench-plan';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import type { Role } from '@/shared/contract/roles';
import { draw } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';
import { fits, places, proposal, startNow, workOf } from './answers-of';
import { plan } from './plan-of';

export const change = { ...plan.lastChange!, id: 'change-2', text: 'R-2421 from A1 at 14:45 to C1 at 13:45' };
export let server: ReturnType<typeof fakeServer>;

/** jsdom has none: tells each box once that it has been laid out. */
class LaidOut {
  constructor(private readonly heard: (entries: { target: Element }[]) => void) {}
  observe(target: Element) {
    this.heard([{ target }]);
  }
  unobserve() {}
  disconnect() {}
}
vi.stubGlobal('ResizeObserver', LaidOut);

/** jsdom lays nothing out: a desk of 1440 px, on which every box is 984 px wide; or a phone. */
function onScreen(width: number) {
  vi.stubGlobal('ResizeObserver', LaidOut);
  for (const name of ['clientWidth', 'clientHeight'] as const)
    vi.spyOn(document.documentElement, name, 'get').mockReturnValue(name === 'clientWidth' ? width : 900);
  window.dispatchEvent(new Event('resize'));
  vi.spyOn(HTMLElement.prototype, 'offsetWidth', 'get').mockReturnValue(Math.min(984, width));
  vi.spyOn(HTMLElement.prototype, 'offsetHeight', 'get').mockReturnValue(60);
}

export function open(role: Role = 'foreman', width = 1440, shown: BenchPlanDto = plan, answers: object = {}) {
  onScreen(width);
  server = fakeServer(role);
  Object.assign(server.answers, {
    'GET /api/bench-plan?days=1': () => Response.json(shown),
    'GET /api/bench-plan?days=7': () => Response.json({ ...shown, days: 7 }),
    'GET /api/bench-plan/proposal': () => Response.json(proposal),
    'GET /api/bench-plan/fits': () => Response.json(fits),
    'GET /api/bench-plan/start-now': () => Response.json(startNow),
    'GET /api/bench-plan/places?chargeId=R-2421': () => Response.json(places),
    'GET /api/alerts': () => Response.json([]),
    'POST /api/bench-plan/move': () => Response.json(change),
    'POST /api/bench-plan/accept': () => Response.json(change),
    'POST /api/bench-plan/undo/change-1': () => Response.json(plan.lastChange),
    'POST /api/bench-plan/undo/change-2': () => Response.json(change),
    'POST /api/work/1/take': () => Response.json(workOf('1', 'Charge port flap')),
    ...answers,
  });
  draw(<BenchPlan />);
}
export const part = async (name: string | RegExp) => within(await screen.findByRole('region', { name }));
export const writes = (path: string) => server.writes().filter((one) => one.path === path);
