/**
 * The weekly digest by a mail server on this machine. In the week of 25 May ten charges of 60 min became ready, in that of
 * 1 June ten of 180 min, all of them on working days; the letter comes on Monday 8 June at 07:00 by Berlin's clock.
 */
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { seededRandom } from '@/calc/index';
import { makeWays, type Ways } from '@/server/alerts/ways/all';
import { Person } from '@/server/entities/person';
import { WeeklyDigest } from '@/server/entities/weekly-digest';
import type { DueLoop } from '@/server/live/due-loop';
import { makeWeeklyDigests } from '@/server/services/waits/weekly-digests';
import type { WeeklyDigestDto } from '@/shared/contract/weekly-digest';
import { startMailCatcher, type MailCatcher } from '../../support/fakes/mail-catcher';
import { makeTestServer, type TestServer } from '../../support/server';
import { stock } from '../../support/stocked';
import { writePast } from './history';
import fs from 'node:fs';

const MINUTE = 60_000;
const site = 'https://bench.example.com';
const due = Date.parse('2026-06-08T05:00:00Z');

let server: TestServer;
let mail: MailCatcher;
let ways: Ways;
let digests: DueLoop;
beforeEach(async () => {
  mail = await startMailCatcher();
  const letters = { url: mail.url, from: 'Bidewell <alerts@bench.example.com>' };
  server = await makeTestServer({ now: due - 60 * MINUTE, config: { publicUrl: site, mail: letters } });
  fs.mkdirSync(server.deps.config.dataDir, { recursive: true });
  ways = makeWays(server.deps.config);
  // They were here long before.
  await server.deps.dataSource.query('UPDATE person SET created_at = 0');
  restart();
  const { type, spare, charger } = await stock(server.agentFor('manager'));
  const week = (monday: string, waitMin: number, first: number) =>
    Array.from({ length: 10 }, (_, at) => ({
      ...{ number: first + at, workshopId: server.own.id, spareId: spare.id, typeId: type.id, lateMin: 0 },
      ...{ personId: server.own.people.technician.id, channelIds: [charger.channels[0]!.id] },
      // Two a day at 13:00 UTC, Monday to Friday.
      readyAt: Date.parse(`${monday}T13:00:00Z`) + Math.floor(at / 2) * 1440 * MINUTE + at * MINUTE,
      ...{ waitMin, queueMin: 10, taperMin: 0, restMin: 20, checkMin: 5 },
    }));
  await writePast(server.deps.dataSource.manager, [...week('2026-05-25', 60, 1), ...week('2026-06-01', 180, 11)]);
});
afterEach(async () => {
  await digests.stop();
  ways.close();
  await server.close();
  await mail.close();
});

/** A process that was started anew. */
function restart(): void {
  digests = makeWeeklyDigests({ ...server.deps, ways, random: seededRandom(3) });
}
const rows = () => server.deps.dataSource.manager.find(WeeklyDigest, { order: { monday: 'ASC', personId: 'ASC' } });
const linkOf = (text: string): string =>
  /https:\/\/\S+\/api\/digest\/stop\?token=\S+/.exec(text)![0].slice(site.length);

describe('the weekly digest', () => {
  it('comes on Monday at 07:00 to the manager alone, once, with the three facts that changed most', async () => {
    await digests.runDue();
    expect(mail.caught).toHaveLength(0);
    server.clock.advance(60 * MINUTE);
    await digests.runDue();
    await digests.runDue();
    restart();
    server.clock.advance(26 * 60 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(1);
    const [letter] = mail.caught;
    expect(letter!.to).toEqual(['manager@own.example.com']);
    expect(letter!.headers.subject).toBe('Waits of 1 June to 7 June');
    const text = letter!.parts['text/plain']!.replaceAll('\u00a0', ' ');
    const facts = text.split('\n').filter((line) => line.startsWith('– '));
    expect(facts).toEqual([
      // Charging: 180 − 35 = 145 min, after 25: the greatest change of all.
      '– Charging, the middle of it took 2 h 25, 2 h 00 more than in the week before.',
      // Working hours hold all of it: ten times 3 h, after ten times 1 h.
      '– Working hours lost in waiting: 30 h, 20 h 00 more than in the week before.',
      '– Half of the waits were over within 3 h 00, 2 h 00 more than in the week before.',
    ]);
    expect(text).toContain(`${site}/waits`);
    expect(letter!.headers['list-unsubscribe-post']).toBe('List-Unsubscribe=One-Click');
    expect((await rows()).map(({ state, personId }) => [state, personId])).toEqual([
      // Nothing became ready in the other workshop.
      ['dropped', server.other.people.manager.id],
      ['sent', server.own.people.manager.id],
    ]);
  });

  it('is tried again where the mail server does not take it, as the same letter', async () => {
    mail.refuse.push(451);
    server.clock.advance(60 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(0);
    server.clock.advance(15 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(1);
    const row = (await rows()).find(({ personId }) => personId === server.own.people.manager.id);
    expect(row).toMatchObject({ state: 'sent', tries: 2 });
    expect(mail.caught[0]!.headers['message-id']).toBe(`<digest.${row!.id}@bench.example.com>`);
  });

  it('comes no more after its link was opened and the button pressed; opening it alone changes nothing', async () => {
    server.clock.advance(60 * MINUTE);
    await digests.runDue();
    const link = linkOf(mail.caught[0]!.parts['text/plain']!);
    const manager = server.agentFor('manager');
    const on = async () => ((await manager.get('/api/me/weekly-digest').expect(200)).body as WeeklyDigestDto).on;
    expect((await server.anyone.get(link).expect(200)).text).toContain(
      '<button type="submit">No more letters</button>',
    );
    expect(await on()).toBe(true);
    await server.anyone.post(link).expect(200);
    expect(await on()).toBe(false);
    server.clock.advance(7 * 1440 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(1);
    // Another's name before the same mark is no link of ours.
    const other = link.replace(server.own.people.manager.id, server.other.people.manager.id);
    await server.anyone.post(other).expect(404);
  });

  it('is switched off and on by the manager, and is nothing of a technician’s', async () => {
    const manager = server.agentFor('manager');
    await manager.patch('/api/me/weekly-digest', { on: false }).expect(200);
    server.clock.advance(60 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(0);
    const { body } = await manager.patch('/api/me/weekly-digest', { on: true }).expect(200);
    expect(body).toMatchObject({ on: true, eMail: { address: 'manager@own.example.com' } });
    restart();
    await digests.runDue();
    expect(mail.caught).toHaveLength(1);
    await server.agentFor('technician').get('/api/me/weekly-digest').expect(403);
  });

  it('is not for who became a manager after it was due, and says where five charges are missing', async () => {
    const { manager } = server.deps.dataSource;
    await manager.update(Person, { id: server.own.people.manager.id }, { createdAt: due + MINUTE });
    await manager.query("DELETE FROM finished_wait WHERE monday = '2026-06-01' AND charge_id > 'charge-13'");
    server.clock.advance(90 * MINUTE);
    await digests.runDue();
    expect(mail.caught).toHaveLength(0);
    await manager.update(Person, { id: server.own.people.manager.id }, { createdAt: 0 });
    restart();
    await digests.runDue();
    expect(mail.caught[0]!.parts['text/plain']).toContain('3 charges became ready, after 10 in the week before.');
    expect(mail.caught[0]!.parts['text/plain']).toContain('Fewer than 5 in a week say too little to compare it.');
  });
});
