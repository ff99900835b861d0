/** What must be true of a workshop after every single thing that happens in it, asked of the rows alone. */
import { expect } from 'vitest';
import type { Stage } from '@/shared/contract/charge';
import { hour, minute, type Bench } from '../charges/bench';

interface ChargeRow {
  id: string;
  stage: Stage;
  started: number | null;
  taper: number | null;
  currentEnd: number | null;
  checkDue: number | null;
  nextDue: number | null;
  reckonedAt: number | null;
}

const flowing: Stage[] = ['charging', 'discharging', 'tapering'];
const over: Stage[] = ['fitted', 'shelved', 'stopped'];
/** The stages that may follow one, a step at a time; time may make several of them at once. */
const next: Record<Stage, Stage[]> = {
  planned: ['queued', 'charging', 'discharging'],
  queued: ['planned', 'charging', 'discharging'],
  charging: ['tapering', 'resting', 'held', 'stopped'],
  discharging: ['tapering', 'resting', 'held', 'stopped'],
  tapering: ['resting', 'held', 'stopped'],
  held: ['charging', 'discharging', 'tapering', 'stopped'],
  resting: ['check-due', 'ready', 'stopped'],
  'check-due': ['ready', 'shelved', 'stopped'],
  ready: ['fitted', 'shelved'],
  fitted: [],
  shelved: [],
  stopped: [],
};
/** Only with a line in the history that says why: the next step begins, or readings say that current flows. */
const back: [Stage, Stage, string][] = [
  ['tapering', 'charging', 'next-step'],
  ['tapering', 'discharging', 'next-step'],
  ['tapering', 'charging', 'back'],
  ['resting', 'tapering', 'back'],
  ['resting', 'charging', 'back'],
  ['check-due', 'resting', 'back'],
];

function reachable(from: Stage, lines: readonly string[]): Set<Stage> {
  const found = new Set<Stage>([from]);
  for (const stage of found) {
    for (const to of next[stage]) found.add(to);
    for (const [before, to, line] of back) if (before === stage && lines.includes(line)) found.add(to);
  }
  return found;
}

export interface Truths {
  /** @throws AssertionError naming what happened last and what is not so */
  hold(told: string): Promise<void>;
  /** How many changes of stage were seen. */
  transitions(): number;
}

export function makeTruths(bench: Bench): Truths {
  const { dataSource } = bench.server.deps;
  const all = <T>(sql: string, values: unknown[] = []): Promise<T[]> => dataSource.query(sql, values);
  const before = new Map<string, { stage: Stage; lines: number }>();
  let transitions = 0;

  /** Each charge where it may be from where it was, and what is over stays over. */
  async function stagesFollow(charges: ChargeRow[], told: string): Promise<void> {
    for (const { id, stage } of charges) {
      const was = before.get(id);
      if (was && over.includes(was.stage)) {
        expect(stage, `${told}: what is over stays so`).toBe(was.stage);
        continue;
      }
      const lines = await all<{ kind: string }>('SELECT kind FROM charge_event WHERE charge_id = ? ORDER BY rowid', [
        id,
      ]);
      const fresh = lines.slice(was?.lines ?? 0).map(({ kind }) => kind);
      if (was && was.stage !== stage) {
        transitions += 1;
        expect([...reachable(was.stage, fresh)], `${told}: ${was.stage} to ${stage} by ${fresh.join()}`).toContain(
          stage,
        );
      }
      before.set(id, { stage, lines: lines.length });
    }
  }

  async function channelsAreOnes(told: string): Promise<void> {
    const holds = await all<{ channel: string; charges: number }>(
      `SELECT h.channel_id AS channel, count(DISTINCT h.charge_id) AS charges FROM channel_hold h
       JOIN charge c ON c.id = h.charge_id
       WHERE h.state = 'running' AND c.stage IN ('charging','discharging','tapering','held') GROUP BY h.channel_id`,
    );
    for (const { channel, charges } of holds) expect(charges, `${told}: charges on ${channel}`).toBe(1);
    const strays = await all(
      `SELECT c.stage FROM channel_hold h JOIN charge c ON c.id = h.charge_id
       WHERE h.state = 'running' AND c.stage NOT IN ('charging','discharging','tapering','held')`,
    );
    expect(strays, `${told}: channels of what does not run`).toEqual([]);
  }

  async function alertsAreOnce(told: string): Promise<void> {
    const doubled = await all(
      `SELECT cause AS what FROM alert GROUP BY cause HAVING count(*) > 1
       UNION SELECT kind || charge_id FROM alert WHERE cleared_at IS NULL GROUP BY kind, charge_id HAVING count(*) > 1`,
    );
    expect(doubled, `${told}: alerts of one cause`).toEqual([]);
    const entries = await all(
      'SELECT alert_id FROM outbox_entry GROUP BY alert_id, turn, person_id, way HAVING count(*) > 1',
    );
    expect(entries, `${told}: messages of one alert to one person`).toEqual([]);
    const ofOver = await all(
      `SELECT a.kind, c.stage FROM alert a JOIN charge c ON c.id = a.charge_id
       WHERE a.cleared_at IS NULL AND c.stage IN ('fitted','shelved','stopped')`,
    );
    expect(ofOver, `${told}: open alerts of what is over`).toEqual([]);
  }

  /** The instant that the sleeper sleeps to is not after anything that is to come. */
  async function sleepEndsInTime(charges: ChargeRow[], now: number, told: string): Promise<void> {
    for (const charge of charges) {
      if (charge.nextDue !== null) expect(charge.nextDue, `${told}: nothing due is left`).toBeGreaterThan(now);
      if (!flowing.includes(charge.stage) && charge.stage !== 'resting') continue;
      // A charge stands still while a clock that was set back catches up.
      const at = Math.max(now, charge.reckonedAt ?? now);
      const looks = await all<{ due: number }>(
        'SELECT due_at AS due FROM look_in WHERE charge_id = ? AND done_at IS NULL AND due_at > ? ORDER BY due_at LIMIT 1',
        [charge.id, at],
      );
      const ends = charge.stage === 'resting' ? [charge.checkDue] : [charge.taper, charge.currentEnd];
      // An end a digit ahead is now: a reading says that the current flows beyond it.
      const toCome = [...ends, looks[0]?.due ?? null].filter((one) => one !== null).filter((one) => one > at + 1);
      expect(charge.nextDue, `${told}: ${charge.stage} is looked at again`).not.toBeNull();
      for (const instant of toCome)
        expect(charge.nextDue!, `${told}: ${charge.stage} sleeps past what comes`).toBeLessThanOrEqual(instant);
      expect(charge.nextDue! - at, `${told}: ${charge.stage} is looked at again soon`).toBeLessThanOrEqual(5 * minute);
    }
    const passed = await all(
      'SELECT kind FROM alert WHERE pass_due_at <= ? AND cleared_at IS NULL AND taken_at IS NULL',
      [now],
    );
    expect(passed, `${told}: alerts that should have gone on`).toEqual([]);
  }

  /** Somebody is asked for the look-in that is due, and the next one is written down. */
  async function somebodyLooksIn(charges: ChargeRow[], now: number, told: string): Promise<void> {
    for (const charge of charges) {
      if (!flowing.includes(charge.stage) && charge.stage !== 'resting') continue;
      const at = Math.max(now, charge.reckonedAt ?? now);
      const looks = await all<{ due: number; done: number | null }>(
        'SELECT due_at AS due, done_at AS done FROM look_in WHERE charge_id = ? ORDER BY due_at',
        [charge.id],
      );
      const last = Math.max(-Infinity, ...looks.filter(({ done }) => done !== null).map(({ due }) => due));
      const due = looks.filter((one) => one.done === null && one.due > last && one.due <= at);
      const asked = await all<{ kind: string }>(
        "SELECT kind FROM alert WHERE charge_id = ? AND cleared_at IS NULL AND kind IN ('look-in-due','look-in-missed')",
        [charge.id],
      );
      if (due.length > 0) expect(asked.length, `${told}: a look-in is due and nobody is asked`).toBeGreaterThan(0);
      else expect(asked, `${told}: somebody is asked for no look-in`).toEqual([]);
      const coming = looks.some((one) => one.done === null && one.due > at && one.due <= Math.max(at, last) + hour);
      const isChecked = charge.checkDue !== null && charge.checkDue <= Math.max(at, last) + hour;
      expect(coming || isChecked, `${told}: ${charge.stage} has its next look-in or its check`).toBe(true);
    }
  }

  /** From the first current to its end every moment is in a stretch of current or between two of them. */
  async function timesAddUp(charges: ChargeRow[], told: string): Promise<void> {
    for (const { id, stage, started, currentEnd, checkDue } of charges) {
      if (started === null) continue;
      const runs = await all<{ from: number; to: number | null }>(
        'SELECT from_at AS "from", to_at AS "to" FROM run_stretch WHERE charge_id = ? ORDER BY from_at',
        [id],
      );
      expect(runs[0]!.from, `${told}: it runs from its start`).toBe(started);
      for (const [place, run] of runs.entries()) {
        if (place > 0)
          expect(run.from, `${told}: one stretch after the other`).toBeGreaterThanOrEqual(runs[place - 1]!.to!);
        if (run.to !== null)
          expect(run.to, `${told}: no stretch ends before it begins`).toBeGreaterThanOrEqual(run.from);
      }
      const said = runs.at(-1)!.to;
      if (said !== null && (stage === 'resting' || stage === 'check-due' || stage === 'ready')) {
        const flows = runs.reduce((sum, { from, to }) => sum + to! - from, 0);
        const breaks = runs.slice(1).reduce((sum, { from }, place) => sum + from - runs[place]!.to!, 0);
        expect(flows + breaks, `${told}: current and breaks`).toBe(currentEnd! - started);
      }
      if (stage === 'resting' || stage === 'check-due') {
        expect(currentEnd!, `${told}: rests from the end of current`).toBeGreaterThanOrEqual(started);
        expect(checkDue!, `${told}: rests before it is checked`).toBeGreaterThanOrEqual(currentEnd!);
      }
    }
  }

  return {
    transitions: () => transitions,
    async hold(told) {
      const now = bench.server.clock.now();
      const charges = await all<ChargeRow>(
        `SELECT id, stage, started_at AS started, taper_at AS taper, current_end_at AS currentEnd,
           check_due_at AS checkDue, next_due_at AS nextDue, json_extract(reckoning, '$.at') AS reckonedAt FROM charge`,
      );
      await stagesFollow(charges, told);
      const open = charges.filter(({ stage }) => !over.includes(stage));
      await channelsAreOnes(told);
      await alertsAreOnce(told);
      await sleepEndsInTime(open, now, told);
      await somebodyLooksIn(open, now, told);
      await timesAddUp(open, told);
    },
  };
}
