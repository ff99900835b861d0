import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Workshop from '@/app/(workshop)/workshop/index';
import { draw, emptyDevice } from '../charges/bench-of';
import { fakeServer } from './server';

vi.mock('@/shared/ui/theme/use-breakpoint', async (original) => ({
  ...(await original<object>()),
  useBreakpoint: () => 'wide',
}));

const person = (n: number) => ({
  id: `p${n}`,
  name: `Person ${n}`,
  email: `person${n}@example.com`,
  role: n === 9 ? 'foreman' : 'technician',
  disabled: false,
  lastSeenAt: null,
  rev: 1,
});
const channel = (n: number) => ({
  id: `k${n}`,
  name: `K${n}`,
  chargerId: `c${n}`,
  chargerName: `Supply ${n}`,
  maxAmps: 20,
  maxVolts: 30,
  direction: 'charge',
  heldBy: null,
});
const type = (n: number) => ({
  id: `t${n}`,
  name: `Type ${n}`,
  chemistry: n === 9 ? 'nimh' : 'nmc',
  groupsInSeries: 2,
  cellsInParallel: 1,
  ratedAh: 66,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 2.7,
  rev: 1,
});
/** What each part lists, and a word that is said of the ninth alone. */
const parts = [
  ['People and roles', 'people', person, 'Name, role or e-mail', 'foreman', 'Person 9'],
  ['Module types', 'module-types', type, 'Name or chemistry', 'nimh', 'Type 9'],
  [
    'Chargers and channels',
    'chargers',
    (n: number) => ({
      id: `c${n}`,
      name: `Supply ${n}`,
      place: n === 9 ? 'by the lift' : null,
      meterId: null,
      channels: [channel(n)],
      retired: false,
      rev: 1,
    }),
    'Charger, place or channel',
    'LIFT',
    'K9',
  ],
  [
    'Meters',
    'meters',
    (n: number) => ({ id: `m${n}`, name: `Meter ${n}`, offsetMillivolts: 0, checkedAt: null, rev: 1 }),
    'Name of the meter',
    '9',
    'Meter 9',
  ],
  [
    'Pack types',
    'pack-types',
    (n: number) => ({
      id: `k${n}`,
      name: `Pack ${n}`,
      note: null,
      pack: {
        moduleTypeId: null,
        groupCount: 96,
        groupsPerModule: 2,
        positionOfGroup: null,
        bleedAmps: null,
        aimMillivolts: 10,
        moduleTypeName: null,
        moduleCount: 48,
      },
      rev: 1,
    }),
    'Name or module type',
    'pack 9',
    'Pack 9',
  ],
  [
    'Levelling resistors',
    'resistors',
    (n: number) => ({ id: `r${n}`, name: `Resistor ${n}`, ohm: 1, maxWatts: 50, rev: 1 }),
    'Name of the resistor',
    'resistor 9',
    'Resistor 9',
  ],
] as const;

/** The settings on the desk, with so many of each. */
function open(count: number): void {
  const { answers } = fakeServer('manager');
  Object.assign(answers, {
    'GET /api/invitations': () => Response.json([]),
    'GET /api/walls': () => Response.json([]),
    'GET /api/spares': () => Response.json([]),
    'GET /api/board': () => Response.json({ rev: 1, at: '2026-06-09T11:00:00Z', charges: [], channels: [] }),
  });
  for (const [, path, make] of parts)
    answers[`GET /api/${path}`] = () => Response.json(Array.from({ length: count }, (_, n) => make(n + 1)));
  draw(<Workshop />);
}
const part = (name: string) => within(screen.getByRole('region', { name }));

beforeEach(() => emptyDevice());
// jsdom lays nothing out, so it cannot scroll.
Element.prototype.scrollIntoView = () => {};
afterEach(() => vi.unstubAllGlobals());

describe('a table of the settings', () => {
  it.each(parts)(
    '%s of 9 rows is looked in, and says where nothing matches',
    async (title, _path, _make, label, word, ninth) => {
      open(9);
      const first = ninth.replace('9', '1');
      await waitFor(() => expect(part(title).getAllByText(first).length).toBeGreaterThan(0));
      const box = part(title).getByLabelText(label);
      fireEvent.change(box, { target: { value: word } });
      expect(part(title).getAllByText(ninth).length).toBeGreaterThan(0);
      expect(part(title).queryByText(first)).toBeNull();
      fireEvent.change(box, { target: { value: 'zzz' } });
      expect(part(title).getByText(/^No .* matches “zzz”\.$/)).toBeTruthy();
      fireEvent.click(part(title).getByLabelText('Clear the search'));
      expect(part(title).getAllByText(first).length).toBeGreaterThan(0);
    },
  );

  it('of 8 rows is seen at a glance', async () => {
    open(8);
    await waitFor(() => expect(part('Meters').getByText('Meter 8')).toBeTruthy());
    expect(screen.queryAllByRole('search')).toEqual([]);
  });
});
