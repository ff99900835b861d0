import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { router } from 'expo-router';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import Mailbox from '@/app/(workshop)/demo/mailbox';
import type { MailboxDto, MailboxEntryDto } from '@/shared/contract/mailbox';
import { draw, emptyDevice, press, problem } from '../charges/bench-of';
import { fakeServer } from '../workshop/server';

const entry = (more: Partial<MailboxEntryDto> = {}): MailboxEntryDto => ({
  number: 1,
  at: '2026-06-09T11:42:00Z',
  way: 'phone-push',
  to: { name: 'Ines Marlow', address: 'ExponentPushToken[demo-1]' },
  alertId: 'a1',
  turn: 0,
  title: 'Overdue: R-2406 at B2',
  text: 'It should have been ready at 13:22.',
  html: null,
  again: false,
  ...more,
});
const letter = entry({
  number: 2,
  way: 'e-mail',
  to: { name: 'Ines Marlow', address: 'ines@example.com' },
  html: '<!doctype html><html><head><title>x</title></head><body><h1>R-2406</h1><script>parent.x = 1</script></body></html>',
});

let server: ReturnType<typeof fakeServer>;
let mailbox: MailboxDto;
function open(...entries: MailboxEntryDto[]) {
  mailbox = { since: '2026-06-09T08:00:00Z', entries, hasPhone: false };
  server = fakeServer('technician');
  server.answers['GET /api/demo/mailbox'] = () => Response.json(mailbox);
  draw(<Mailbox />);
}
const listed = () => within(screen.getByRole('list', { name: 'What was sent' })).getAllByRole('listitem');

beforeEach(() => {
  emptyDevice();
  vi.mocked(router.replace).mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the mailbox of the demo', () => {
  it('names of each message its way, its receiver and its time, the newest first as the server has them', async () => {
    open(letter, entry());
    await screen.findByText('E-mail to Ines Marlow');
    expect(listed().map((row) => row.textContent)).toEqual([
      expect.stringMatching(/^Overdue: R-2406 at B2.*E-mail to Ines Marlow/),
      expect.stringMatching(/^Overdue: R-2406 at B2.*Push to a phone to Ines Marlow/),
    ]);
  });

  it('shows a letter in a frame that runs no script, is of no origin and fetches nothing, and as text beside it', async () => {
    open(letter);
    fireEvent.click(await press(/^Read number 2/));
    const frame = screen.getByTitle<HTMLIFrameElement>('Letter: Overdue: R-2406 at B2');
    const may = (frame.getAttribute('sandbox') ?? 'everything').split(' ');
    for (const danger of ['everything', 'allow-scripts', 'allow-same-origin', 'allow-top-navigation', 'allow-forms'])
      expect(may).not.toContain(danger);
    // The policy stands before anything that the letter itself says.
    expect(frame.srcdoc).toMatch(/<head><meta http-equiv="Content-Security-Policy" content="default-src 'none';/);
    expect(frame.srcdoc).toContain('<h1>R-2406</h1>');
    expect(screen.getByText(/^To ines@example\.com\. Alert a1, turn 0\.$/)).toBeTruthy();
    fireEvent.click(screen.getByRole('radio', { name: 'Text' }));
    expect(screen.queryByTitle(/^Letter/)).toBeNull();
    expect(screen.getByText('It should have been ready at 13:22.')).toBeTruthy();
    fireEvent.click(await press(/^Close number 2/));
    expect(screen.queryByText(/^To ines@example\.com/)).toBeNull();
  });

  it('shows one way alone, each with its count', async () => {
    open(letter, entry());
    fireEvent.click(await screen.findByRole('radio', { name: 'Phone 1' }));
    expect(listed()).toHaveLength(1);
    fireEvent.click(screen.getByRole('radio', { name: 'Browser 0' }));
    expect(screen.getByText(/^None yet\. A browser gets them once pushes are switched on/)).toBeTruthy();
    expect(screen.getByRole('radio', { name: 'All 2' })).toBeTruthy();
  });

  it('marks what came twice, and names nobody for a device that is gone', async () => {
    open(entry({ again: true, to: { name: null, address: 'gone' } }));
    expect(await screen.findByText('came again: receivers show it once')).toBeTruthy();
    expect(screen.getByText('Push to a phone to somebody who is gone')).toBeTruthy();
  });

  it('gives who asks a phone, and says so; refused, it says why', async () => {
    open(entry());
    server.answers['POST /api/demo/phone'] = () => problem(409, 'There are ten devices already.');
    fireEvent.click(await press('Give me a phone of the demo'));
    expect(await screen.findByText('There are ten devices already.')).toBeTruthy();
    server.answers['POST /api/demo/phone'] = () => {
      mailbox = { ...mailbox, hasPhone: true };
      return Response.json(mailbox);
    };
    fireEvent.click(await press('Give me a phone of the demo'));
    expect(await screen.findByText('You have a phone of the demo.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Give me a phone of the demo' })).toBeNull();
  });

  it('with nothing sent says what will come', async () => {
    open();
    expect(await screen.findByText('Nothing was sent yet.')).toBeTruthy();
    expect(screen.queryByRole('radio')).toBeNull();
  });

  it('that could not be read says so and reads it again', async () => {
    server = fakeServer('technician');
    server.answers['GET /api/demo/mailbox'] = () => problem(400, 'Not now.');
    draw(<Mailbox />);
    expect(await screen.findByText('What was sent could not be read.')).toBeTruthy();
    server.answers['GET /api/demo/mailbox'] = () =>
      Response.json({ since: '2026-06-09T08:00:00Z', entries: [entry()], hasPhone: false });
    fireEvent.click(await press('Try again'));
    await waitFor(() => expect(listed()).toHaveLength(1));
  });

  it('of a server that is no demo is not there, and is not asked for again', async () => {
    server = fakeServer('manager');
    server.answers['GET /api/demo/mailbox'] = () => problem(404, 'There is nothing at this address.');
    draw(<Mailbox />);
    fireEvent.click(await press('Go to the bench'));
    expect(router.replace).toHaveBeenCalledWith('/bench');
    expect(server.sent.filter(({ path }) => path === '/api/demo/mailbox')).toHaveLength(1);
  });
});
