/** A bench whose alerts go out to stand-ins of the services, with the dispatcher moved by hand. */
import fs from 'node:fs';
import { seededRandom } from '@/calc/index';
import { makeDispatcher } from '@/server/alerts/dispatcher';
import { makeWays, type Ways } from '@/server/alerts/ways/all';
import { OutboxEntry } from '@/server/entities/outbox-entry';
import type { DueLoop } from '@/server/live/due-loop';
import { makeSleeper } from '@/server/live/sleeper-loop';
import type { AlertDto } from '@/shared/contract/alert';
import type { ChangeAlertSettingsInput } from '@/shared/contract/alert-settings';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Role } from '@/shared/contract/roles';
import { startMailCatcher, type MailCatcher } from '@/server/demo/outside/mail-catcher';
import { startPhoneService, type FakePhoneService } from '@/server/demo/outside/phone-service';
import { startPushService, type FakePushService } from '@/server/demo/outside/push-service';
import type { TestServerOptions } from '@/tests/support/server';
import { alertsOf, at, did, makeBench, minute, running, seen, type Bench } from '../charges/bench';

export const site = 'https://bench.example.com';

export interface Post {
  bench: Bench;
  push: FakePushService;
  phones: FakePhoneService;
  mail: MailCatcher;
  ways: Ways;
  dispatcher: DueLoop;
  /** The dispatcher and the sleeper of a process that was started anew: only the rows are left of the one before. */
  restart(): void;
  /** Moves the clock on, lets the sleeper do what is due, and then the dispatcher. */
  live(ms: number, stepMs?: number): Promise<void>;
  entries(): Promise<OutboxEntry[]>;
  close(): Promise<void>;
}

export async function makePost(options: TestServerOptions & { mail?: boolean } = {}): Promise<Post> {
  const [push, phones, mail] = await Promise.all([startPushService(), startPhoneService(), startMailCatcher()]);
  const letters = options.mail === false ? null : { url: mail.url, from: 'Bidewell <alerts@bench.example.com>' };
  const bench = await makeBench({
    ...options,
    config: { localPush: true, publicUrl: site, mail: letters, ...options.config },
  });
  const { deps } = bench.server;
  fs.mkdirSync(deps.config.dataDir, { recursive: true });
  const ways = makeWays(deps.config, { push: push.agent, phones: phones.dispatcher });
  const post: Post = {
    ...{ bench, push, phones, mail, ways },
    dispatcher: undefined as unknown as DueLoop,
    restart() {
      const random = seededRandom(11);
      post.dispatcher = makeDispatcher({ ...deps, ways, random });
      deps.outbox = { poke: post.dispatcher.poke, pushKey: ways.pushKey, eMail: ways.eMail !== null };
      bench.sleeper = makeSleeper(deps);
      deps.sleeper = bench.sleeper;
    },
    async live(ms, stepMs = minute) {
      const end = bench.server.clock.now() + ms;
      while (bench.server.clock.now() < end) {
        bench.server.clock.advance(Math.min(stepMs, end - bench.server.clock.now()));
        await bench.sleeper.runDue();
        await post.dispatcher.runDue();
      }
    },
    entries: () =>
      deps.dataSource.manager.find(OutboxEntry, { order: { createdAt: 'ASC', way: 'ASC', personId: 'ASC' } }),
    async close() {
      await post.dispatcher.stop();
      ways.close();
      await bench.server.close();
      await Promise.all([push.close(), phones.close(), mail.close()]);
    },
  };
  post.restart();
  return post;
}

/** A browser of somebody, subscribed as the page does it. */
export async function withBrowser(post: Post, role: Role, name: string = role): Promise<void> {
  const { endpoint, keys } = post.push.subscribe(name);
  await post.bench.as(role).post('/api/me/push-devices', { kind: 'browser', endpoint, keys }).expect(201);
}

/** A phone of somebody. */
export async function withPhone(post: Post, role: Role, token: string = `ExponentPushToken[${role}]`): Promise<void> {
  await post.bench.as(role).post('/api/me/push-devices', { kind: 'phone', token }).expect(201);
}

export const wish = (post: Post, role: Role, change: ChangeAlertSettingsInput) =>
  post.bench.as(role).patch('/api/me/alert-settings', change).expect(200);

/** A charge of the technician that is due for its check; the alert of that is raised, and the dispatcher has not looked. */
export async function checkDue(post: Post): Promise<{ charge: ChargeDto; alert: AlertDto }> {
  const { bench } = post;
  const charge = await running(bench, { spareId: await bench.spare(`S-${++spares}`), repairRef: 'R-2409' });
  await bench.live(at(charge.currentEndAt) + minute - bench.server.clock.now(), 10 * minute);
  const off = await did(bench, await seen(bench, charge.id), 'current-off');
  // What came before the check is not looked at here.
  await post.dispatcher.runDue();
  for (const list of [post.push.taken, post.phones.taken, post.mail.caught]) list.splice(0);
  bench.server.clock.set(at(off.checkDueAt));
  await bench.sleeper.runDue();
  const alert = (await alertsOf(bench)).find((one) => one.kind === 'check-due' && one.clearedAt === null);
  return { charge: await seen(bench, charge.id), alert: alert! };
}
let spares = 0;
