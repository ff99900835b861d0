/** A technician's device in front of a server that dies: what got no answer is sent again with the same key. */
import Database from 'better-sqlite3';
import { databaseFile } from '@/server/data-files';
import { signAccessToken } from '@/server/services/access-token';
import { loadSecrets } from '@/server/services/secrets';
import type { Role } from '@/shared/contract/roles';
import type { MortalServer } from './mortal-server';

export interface Answer {
  status: number;
  body: unknown;
}

export interface Write {
  rev?: number;
  /** A write that is done once, however often it is sent. */
  key?: string;
}

export interface RepeatingClient {
  get(path: string, role?: Role): Promise<Answer>;
  post(path: string, body: object, write?: Write, role?: Role): Promise<Answer>;
  patch(path: string, body: object, role: Role): Promise<Answer>;
  /** Calls back once, at a moment between the next write with a key and its usual answer. */
  strikeNextWrite(strike: () => void): void;
  /** What became of the writes whose first answer never came. */
  unanswered: { repeated: number; doneAlready: number; answerLost: number };
}

/** No server is away for longer in this test. */
const MOST_TRIES = 50;

/** @param random seeded, for the moments of strikes */
export function makeClient(server: MortalServer, dataDir: string, random: () => number): RepeatingClient {
  const secrets = loadSecrets(dataDir);
  const unanswered = { repeated: 0, doneAlready: 0, answerLost: 0 };
  let strike: (() => void) | null = null;
  /** What a write takes, a mean that forgets, ms. */
  let usualMs = 40;

  /** Whether the effect of a key is committed, as another process sees it. */
  function isCommitted(key: string): boolean {
    const database = new Database(databaseFile(dataDir), { readonly: true });
    try {
      return database.prepare('SELECT 1 FROM idempotency_key WHERE key = ?').get(key) !== undefined;
    } finally {
      database.close();
    }
  }

  async function send(method: string, path: string, body: object | null, write: Write, role: Role): Promise<Answer> {
    for (let tries = 1; tries <= MOST_TRIES; tries += 1) {
      await server.ready();
      const sessionId = `session-own-${role}`;
      const token = signAccessToken(
        secrets,
        { personId: `own-${role}`, workshopId: 'workshop-own', sessionId },
        server.now(),
      );
      const headers: Record<string, string> = { cookie: `bidewell_access=${token}`, origin: server.url };
      if (body) headers['content-type'] = 'application/json';
      if (write.key !== undefined) headers['idempotency-key'] = write.key;
      if (write.rev !== undefined) headers['if-match'] = `"${write.rev}"`;
      const sentAt = performance.now();
      if (write.key !== undefined && strike) {
        setTimeout(strike, random() * usualMs);
        strike = null;
      }
      try {
        const answer = await fetch(`${server.url}${path}`, {
          method,
          headers,
          body: body ? JSON.stringify(body) : null,
        });
        const text = await answer.text();
        if (write.key !== undefined) usualMs += 0.2 * (performance.now() - sentAt - usualMs);
        return { status: answer.status, body: text === '' ? null : (JSON.parse(text) as unknown) };
      } catch {
        if (write.key === undefined) continue;
        await server.ready();
        unanswered.repeated += 1;
        if (isCommitted(write.key)) unanswered.doneAlready += 1;
      }
    }
    throw new Error(`No answer to ${method} ${path}:\n${server.output()}`);
  }

  return {
    unanswered,
    strikeNextWrite: (next) => void (strike = next),
    get: (path, role = 'technician') => send('GET', path, null, {}, role),
    async post(path, body, write = {}, role = 'technician') {
      const answer = await send('POST', path, body, write, role);
      if ((answer.body as { code?: string } | null)?.code === 'done_already') unanswered.answerLost += 1;
      return answer;
    },
    patch: (path, body, role) => send('PATCH', path, body, {}, role),
  };
}
