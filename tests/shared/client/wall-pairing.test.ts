import { describe, expect, it } from 'vitest';
import { ApiProblem, OfflineError } from '@/shared/client/api-problem';
import { pairWall, type PairingState } from '@/shared/client/wall-pairing';

const start = Date.parse('2026-06-09T11:42:00Z');
const refusal = (code: string, retryAfterS: number | null = null) => new ApiProblem({ status: 400, code }, retryAfterS);

/** A wall whose answers are a script: each poll takes the next, 'ok' pairs. Time passes only by waiting. */
function wall(script: (Error | 'ok')[], codes: (Error | 'code')[] = []) {
  const seen = { waits: [] as number[], states: [] as PairingState[], codes: 0, polls: 0, now: start, stop: false };
  const run = pairWall({
    askCode: async () => {
      const answer = codes.shift() ?? 'code';
      if (answer instanceof Error) throw answer;
      seen.codes += 1;
      return {
        deviceCode: `device-${seen.codes}`,
        userCode: 'BCDF-GHJK',
        verificationUrl: 'http://localhost/approve',
        verificationUrlComplete: 'http://localhost/approve?code=BCDF-GHJK',
        expiresAt: new Date(seen.now + 600_000).toISOString(),
        intervalS: 5,
      };
    },
    askToken: async () => {
      seen.polls += 1;
      const answer = script.shift();
      if (answer === undefined) {
        seen.stop = true;
        throw refusal('authorization_pending');
      }
      if (answer instanceof Error) throw answer;
    },
    now: () => seen.now,
    wait: async (ms) => {
      seen.waits.push(ms);
      seen.now += ms;
    },
    show: (state) => seen.states.push(state),
    stopped: () => seen.stop,
  });
  return run.then(() => seen);
}

describe('pairing a wall', () => {
  it('asks every 5 s until somebody approves', async () => {
    const seen = await wall([refusal('authorization_pending'), refusal('authorization_pending'), 'ok']);
    expect(seen.waits).toEqual([5000, 5000, 5000]);
    expect(seen.states.at(-1)).toEqual({ kind: 'paired' });
  });

  it('asks 5 s less often after every slow_down, and stays slower (RFC 8628 §3.5)', async () => {
    const seen = await wall([refusal('slow_down'), refusal('slow_down'), refusal('authorization_pending'), 'ok']);
    expect(seen.waits).toEqual([5000, 10_000, 15_000, 15_000]);
  });

  it('waits at least as long as a throttled answer says', async () => {
    const seen = await wall([new ApiProblem({ status: 429, code: 'too_many' }, 42), 'ok']);
    expect(seen.waits).toEqual([5000, 42_000]);
  });

  it('keeps the code on the screen while the server is away', async () => {
    const seen = await wall([new OfflineError(), new OfflineError(), new ApiProblem({ status: 503 }), 'ok']);
    expect(seen.codes).toBe(1);
    expect(seen.states.map(({ kind }) => kind)).toEqual(['code', 'paired']);
  });

  it('shows a new code after ten minutes', async () => {
    const seen = await wall([...Array<Error>(120).fill(refusal('authorization_pending')), 'ok']);
    expect(seen.codes).toBe(2);
    expect(seen.now - start).toBe(605_000);
  });

  it('shows a new code when the server says that the old one is over, or that it was refused', async () => {
    const seen = await wall([refusal('expired_token'), refusal('access_denied'), 'ok']);
    expect(seen.codes).toBe(3);
    expect(seen.states.map(({ kind }) => kind)).toEqual(['code', 'code', 'refused', 'code', 'paired']);
  });

  it('goes on asking for a code until the server is there', async () => {
    const seen = await wall(['ok'], [new OfflineError(), new OfflineError()]);
    expect(seen.states.map(({ kind }) => kind)).toEqual(['unheard', 'unheard', 'code', 'paired']);
    expect(seen.waits).toEqual([5000, 5000, 5000]);
  });
});
