import { screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Label from '@/app/(workshop)/charges/[id]/label';
import More from '@/app/(workshop)/more';
import Approve from '@/app/approve';
import { charge, iso } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, serverWith } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

vi.mock('expo-router', async (original) => ({
  ...(await original<object>()),
  useLocalSearchParams: () => ({ id: 'c1' }),
}));

const camera = /^The camera is off in this page: a browser opens it only over https\. Type the code, or scan it/;
const ready = charge('ready', {
  readyAt: iso('13:44'),
  restChecks: [
    {
      id: 'k1',
      at: iso('13:42'),
      by: { id: 'ines', name: 'Ines Marlow' },
      groupVolts: [3.906, 3.905, 3.902],
      celsius: 21,
      early: false,
      verdict: {
        within: true,
        groups: [3.906, 3.905, 3.902].map((volts, group) => ({
          group,
          volts,
          deviationVolts: volts - 3.905,
          within: true,
          ampHoursToGo: 0,
        })),
        spreadVolts: 0.004,
        worstGroup: 2,
      },
    },
  ],
});

/** A browser that has everything, at an address that is secure or not. */
function browser(secure: boolean) {
  vi.stubGlobal('isSecureContext', secure);
  vi.stubGlobal(
    'Notification',
    Object.assign(function Notification() {}, { permission: 'default' }),
  );
  const worker = {
    register: async () => null,
    ready: new Promise(() => {}),
    addEventListener() {},
    removeEventListener() {},
  };
  for (const [name, value] of Object.entries({ wakeLock: {}, mediaDevices: {}, serviceWorker: worker }))
    Object.defineProperty(navigator, name, { configurable: true, value });
}

beforeEach(() => emptyDevice());
afterEach(() => vi.unstubAllGlobals());

describe('over plain http', () => {
  beforeEach(() => browser(false));

  it('More says all four: notices, camera, opening without a connection, sleep', async () => {
    fakeServer('foreman');
    draw(<More />);
    expect(await screen.findByText(/^Notices outside this page are off: .* over https\.$/)).toBeTruthy();
    expect(screen.getByText(camera)).toBeTruthy();
    expect(screen.getByText(/^Opening without a connection is off: .* over https\.$/)).toBeTruthy();
    expect(screen.getByText(/^This screen may fall asleep: .* over https\.$/)).toBeTruthy();
  });

  it('the approval of a wall says that the code is typed', async () => {
    fakeServer('foreman');
    draw(<Approve />);
    expect(await screen.findByText(camera)).toBeTruthy();
  });

  it('the label says so, and how else its charge is found', async () => {
    serverWith(ready);
    draw(<Label />);
    expect((await screen.findByText(camera)).textContent).toMatch(/S-0398 finds it in Spares\.$/);
  });
});

/** The session of a foreman beside the answers that are there. */
function fakeServerOfForeman(): void {
  const { answers } = serverWith(ready);
  const foreman = fakeServer('foreman');
  Object.assign(foreman.answers, { ...answers, ...foreman.answers });
}

describe('over https', () => {
  beforeEach(() => browser(true));

  it.each([
    ['More', <More key="m" />],
    ['the approval', <Approve key="a" />],
    ['the label', <Label key="l" />],
  ])('%s says nothing of it', async (_name, ui) => {
    fakeServerOfForeman();
    draw(ui);
    await screen.findAllByText(/More|Approve a wall|Label/);
    expect(screen.queryByText(/https|camera is off/)).toBeNull();
  });
});
