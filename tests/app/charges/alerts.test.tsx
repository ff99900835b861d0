import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Alerts from '@/app/(workshop)/alerts';
import type { AlertDto } from '@/shared/contract/alert';
import { charge, iso } from '../../shared/ui/charge/charges';
import { draw, emptyDevice, press, problem, serverWith } from './bench-of';

const alert = (more: Partial<AlertDto> = {}): AlertDto => ({
  id: 'a1',
  kind: 'overdue',
  level: 'alarm',
  chargeId: 'c1',
  title: 'R-2406 at B2',
  for: null,
  forRole: null,
  turn: 0,
  seen: 'It was to be ready by 13:20. Now 14:55.',
  checkFirst: 'Warmth at group 4, then its clips.',
  raisedAt: iso('13:20'),
  lateByS: 0,
  takenBy: null,
  takenAt: null,
  passedAt: null,
  clearedAt: null,
  ...more,
});
const petra = { id: 'p1', name: 'Petra Aldwin' };
const hella = { id: 'p2', name: 'Hella Brandt' };
const withAlerts = (...alerts: AlertDto[]) => {
  const server = serverWith(charge('tapering'));
  const state = { alerts };
  server.answers['GET /api/alerts'] = () => Response.json(state.alerts);
  return { ...server, become: (...next: AlertDto[]) => (state.alerts = next) };
};

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.push).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('an open alert', () => {
  it('says what was seen, what to check first and that nobody has it; taken, it leads to what is to be done', async () => {
    const server = withAlerts(alert({ kind: 'check-due', level: 'amber', seen: 'Rested 1 h 45.' }));
    server.answers['POST /api/alerts/a1/take'] = () => {
      const taken = alert({ kind: 'check-due', level: 'amber', takenBy: petra, takenAt: iso('13:43') });
      server.become(taken);
      return Response.json(taken);
    };
    draw(<Alerts />);
    const card = within(await screen.findByRole('region', { name: 'Check due, R-2406 at B2' }));
    expect(card.getByText(/· nobody has it$/)).toBeTruthy();
    expect(card.getByText('Rested 1 h 45.')).toBeTruthy();
    expect(card.getByText(/warmth at group 4, then its clips\./)).toBeTruthy();
    fireEvent.click(await press('I have it: R-2406 at B2'));
    fireEvent.click(await press('Check now, R-2406 at B2'));
    expect(router.push).toHaveBeenCalledWith('/charges/c1/check');
    expect(screen.getByText(/· you have it$/)).toBeTruthy();
  });

  it('that a colleague took a moment before is refused with the name, and is shown as the colleague’s', async () => {
    const server = withAlerts(alert());
    server.answers['POST /api/alerts/a1/take'] = () => {
      server.become(alert({ takenBy: hella, takenAt: iso('13:43') }));
      return problem(409, 'Hella Brandt has it already.', { code: 'taken_already' });
    };
    draw(<Alerts />);
    fireEvent.click(await press('I have it: R-2406 at B2'));
    expect(await screen.findByText('Hella Brandt has it already.')).toBeTruthy();
    expect(await screen.findByText(/· Hella has it$/)).toBeTruthy();
    await waitFor(() => expect(screen.queryByRole('button', { name: 'I have it: R-2406 at B2' })).toBeNull());
  });

  it('is passed to somebody out of the list, oneself not among them', async () => {
    const server = withAlerts(alert());
    server.answers['POST /api/alerts/a1/pass'] = () => Response.json(alert({ for: hella }));
    draw(<Alerts />);
    fireEvent.click(await press('Pass R-2406 at B2 on to a colleague'));
    const sheet = within(await screen.findByRole('dialog'));
    await sheet.findByRole('radio', { name: /Hella Brandt/ });
    expect(sheet.queryByRole('radio', { name: /Petra/ })).toBeNull();
    const pass = sheet.getByRole('button', { name: 'Choose a person first' });
    expect(pass.getAttribute('aria-disabled')).toBe('true');
    fireEvent.click(sheet.getByRole('radio', { name: /Hella Brandt/ }));
    fireEvent.click(sheet.getByRole('button', { name: 'Pass it to Hella' }));
    await waitFor(() => expect(server.writes()[0]?.body).toEqual({ personId: 'p2' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
  });
});

describe('the list of alerts', () => {
  it('counts those nobody has, and keeps what was settled apart with what came of it', async () => {
    withAlerts(
      alert(),
      alert({ id: 'a2', takenBy: hella, takenAt: iso('13:41') }),
      alert({
        id: 'a3',
        kind: 'look-in-due',
        level: 'tell',
        title: 'Look in at R-2411 at A2',
        takenBy: petra,
        takenAt: iso('12:51'),
        clearedAt: iso('12:52'),
      }),
    );
    draw(<Alerts />);
    expect(await screen.findByText(/^1 open · /)).toBeTruthy();
    expect(screen.getByText('Look-in due, R-2411 at A2')).toBeTruthy();
    expect(screen.getByText(/Petra took it at .*12:51\. Settled .*12:52\.$/)).toBeTruthy();
  });

  it('of none says so', async () => {
    withAlerts();
    draw(<Alerts />);
    expect(await screen.findByText('No open alerts.')).toBeTruthy();
  });
});
