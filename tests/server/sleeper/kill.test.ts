import { spawn } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { expect, test } from 'vitest';
import { seededRandom } from '@/calc/index';
import { makeDataSource } from '@/server/data-source';
import { Alert } from '@/server/entities/alert';
import { Charge } from '@/server/entities/charge';
import { ChargeEvent } from '@/server/entities/charge-event';
import { at, hour, makeBench, running } from '../charges/bench';

const root = path.resolve(import.meta.dirname, '../../..');
/** Test seconds are these many seconds of the bench: the five hours of the charges pass in half a minute. */
const speed = 600;
const kills = 6;

/** Runs the sleeper in a process of its own until it is done, or is killed `lifeMs` after it was up. */
function life(args: string[], lifeMs: number | null): Promise<{ told: string[]; done: boolean }> {
  return new Promise((resolve, reject) => {
    const child = spawn(
      process.execPath,
      ['--import', 'tsx', path.join(import.meta.dirname, 'kill-child.ts'), ...args],
      {
        cwd: root,
        stdio: ['ignore', 'pipe', 'pipe'],
      },
    );
    let out = '';
    let errors = '';
    let timer: NodeJS.Timeout | null = null;
    child.stderr.on('data', (chunk: Buffer) => (errors += chunk.toString()));
    child.stdout.on('data', (chunk: Buffer) => {
      out += chunk.toString();
      if (lifeMs !== null && timer === null && out.includes('up\n'))
        timer = setTimeout(() => child.kill('SIGKILL'), lifeMs);
    });
    child.on('error', reject);
    child.on('exit', (code, signal) => {
      if (timer) clearTimeout(timer);
      if (code !== 0 && signal !== 'SIGKILL') reject(new Error(`The sleeper ended with ${code}: ${errors}`));
      const lines = out.split('\n');
      const told = lines.filter((line) => line.startsWith('told ')).map((line) => line.slice(5));
      resolve({ told, done: lines.includes('done') });
    });
  });
}

test(`killed ${kills} times at any moment, the sleeper brings 3 charges to their check with one alert a cause`, async () => {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-kill-'));
  const bench = await makeBench();
  try {
    const charges = [
      await running(bench, { spareId: await bench.spare('S-1') }),
      await running(bench, { spareId: await bench.spare('S-2') }, { channel: 'B1', finish: 'on-the-mark' }),
      await running(bench, { spareId: await bench.spare('S-3') }, { channel: 'C1', way: 'group-by-group' }),
    ];
    const file = path.join(folder, 'bidewell.sqlite');
    await bench.server.deps.dataSource.query(`VACUUM INTO '${file}'`);
    const end = Math.max(...charges.slice(0, 2).map((charge) => at(charge.checkDueAt))) + hour;
    const args = [file, bench.server.clock.now(), Date.now(), speed, end].map(String);
    const random = seededRandom(5);
    const told = new Set<string>();
    for (let kill = 0; kill < kills; kill += 1)
      for (const id of (await life(args, 100 + random() * 1500)).told) told.add(id);
    const last = await life(args, null);
    expect(last.done).toBe(true);
    for (const id of last.told) told.add(id);

    const dataSource = await makeDataSource(file).initialize();
    try {
      const alerts = await dataSource.manager.find(Alert);
      const rows = await dataSource.manager.find(Charge);
      const stage = new Map(rows.map((row) => [row.id, row.stage]));
      expect(charges.slice(0, 2).map((charge) => stage.get(charge.id))).toEqual(['check-due', 'check-due']);
      // The third waits for its swap since hours: nobody has been there.
      expect(alerts.filter((alert) => alert.kind === 'step-swap').map((alert) => alert.chargeId)).toEqual([
        charges[2]!.id,
      ]);
      for (const charge of charges.slice(0, 2)) {
        const own = alerts.filter((alert) => alert.chargeId === charge.id);
        expect(own.filter((alert) => alert.kind === 'check-due')).toHaveLength(1);
        expect(own.filter((alert) => alert.kind === 'overdue')).toHaveLength(1);
        expect(own.filter((alert) => alert.kind === 'charge-done').length).toBeLessThanOrEqual(1);
        const events = await dataSource.manager.findBy(ChargeEvent, { chargeId: charge.id });
        for (const kind of ['resting', 'check-due'])
          expect(
            events.filter((event) => event.kind === kind),
            kind,
          ).toHaveLength(1);
      }
      expect(new Set(alerts.map((alert) => alert.cause)).size).toBe(alerts.length);
      // Whatever was told is in the database under the same id.
      const known = new Set(alerts.map((alert) => alert.id));
      expect([...told].filter((id) => !known.has(id))).toEqual([]);
    } finally {
      await dataSource.destroy();
    }
  } finally {
    await bench.server.close();
    fs.rmSync(folder, { recursive: true, force: true });
  }
}, 300_000);
