import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { LogChoices, LogPreviewDto, LogTakenDto } from '@/shared/contract/charge-log';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Role } from '@/shared/contract/roles';
import { loadFile } from '@/server/services/charge-file';
import { previewLog, type LogUpload } from '@/server/services/charge-log/charge-log.service';
import { PassThrough } from 'node:stream';
import { at, key, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
let charge: ChargeDto;
beforeEach(async () => {
  bench = await makeBench();
  charge = await running(bench, { spareId: await bench.spare('S-0398') });
  bench.server.clock.advance(40 * minute);
});
afterEach(() => bench.server.close());

const send = (what: 'log-preview' | 'log-file', text: string, choices?: LogChoices, role: Role = 'technician') => {
  const query = new URLSearchParams({ name: 'day.csv', ...(choices ? { choices: JSON.stringify(choices) } : {}) });
  // As a string it is sent as it is, whatever the agent's type says.
  const body = text as unknown as object;
  return bench.as(role).post(`/api/charges/${charge.id}/${what}?${query}`, body).type('text/csv');
};
const preview = async (text: string, choices?: LogChoices): Promise<LogPreviewDto> => {
  const answer = await send('log-preview', text, choices);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as LogPreviewDto;
};
const take = async (text: string, choices?: LogChoices): Promise<LogTakenDto> => {
  const answer = await send('log-file', text, choices);
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body as LogTakenDto;
};

/** Half an hour at a constant 8 A, a line a second, 7.7 V rising by 1 mV a minute. */
const halfHour = (): string => {
  const lines = Array.from(
    { length: 1801 },
    (_, s) => `${s};${(7.7 + (s / 60) * 0.001).toFixed(4).replace('.', ',')};8,0`,
  );
  return ['Zeit (s);Spannung (V);Strom (A)', ...lines].join('\r\n');
};

describe('a log of a charge', () => {
  test('is understood before anything is written: 1,801 lines of a semicolon file with decimal commas, few stored', async () => {
    const read = await preview(halfHour());
    expect(read.choices).toMatchObject({ separator: ';', decimal: ',', headerLine: 1 });
    expect(read.choices.columns.map(({ use, unit }) => `${use} ${unit}`)).toEqual(['time s', 'volts V', 'amps A']);
    expect(read).toMatchObject({ lines: 1802, readings: 1801, there: 0, leftOut: [], problem: null });
    expect(at(read.firstAt!)).toBe(at(charge.startedAt));
    expect(at(read.lastAt!)).toBe(at(charge.startedAt) + 30 * minute);
    // A straight course: one reading in ten minutes.
    expect(read.stored).toBe(4);
    expect((await seen(bench, charge.id)).readings).toEqual([]);
  });

  test('taken, it is reckoned with as typed readings are: 4 Ah after half an hour at 8 A; again it adds nothing', async () => {
    const { choices } = await preview(halfHour());
    const taken = await take(halfHour(), choices);
    expect(taken).toMatchObject({ added: 4, there: 0 });
    expect(taken.charge.readings.map(({ source }) => source)).toEqual(['file', 'file', 'file', 'file']);
    expect(taken.charge.events.at(-1)!.text).toBe('Log “day.csv”: 4 readings added, of 1801 in 1802 lines.');
    const stored = await loadFile(bench.server.deps.dataSource.manager, bench.server.own.id, charge.id);
    expect(stored.readings.every(({ amps }) => amps === 8)).toBe(true);

    // The same readings typed into a twin reckon the same course.
    const twin = await makeBench();
    try {
      const typed = await running(twin, { spareId: await twin.spare('S-0398') });
      twin.server.clock.advance(40 * minute);
      for (const one of taken.charge.readings) {
        const when = new Date(at(typed.startedAt) + at(one.at) - at(charge.startedAt)).toISOString();
        const body = { at: when, terminalVolts: one.terminalVolts, amps: one.amps };
        const path = `/api/charges/${typed.id}/readings`;
        const answer = await twin.as('technician').post(path, body).set('Idempotency-Key', key());
        expect(answer.status, JSON.stringify(answer.body)).toBe(200);
      }
      const after = await seen(twin, typed.id);
      expect(taken.charge.deliveredAh).toBeGreaterThan(4);
      expect(taken.charge.deliveredAh).toBeCloseTo(after.deliveredAh, 1);
    } finally {
      await twin.server.close();
    }

    expect((await preview(halfHour(), choices)).there).toBe(4);
    const again = await take(halfHour(), choices);
    expect(again).toMatchObject({ added: 0, there: 4 });
    expect(again.charge.rev).toBe(taken.charge.rev);
    expect((await seen(bench, charge.id)).readings).toHaveLength(4);
  });

  test('one that was corrected since does not come back with the same file', async () => {
    const { charge: after } = await take(halfHour());
    const [first] = after.readings;
    await bench.as('technician').patch(`/api/charges/${charge.id}/readings/${first!.id}`, { amps: '8.1' }).expect(200);
    expect(await take(halfHour())).toMatchObject({ added: 0 });
  });

  test('says of each line that is left out why, with its number', async () => {
    const start = at(charge.startedAt);
    const time = (seconds: number) => new Date(start + seconds * 1000).toISOString();
    const read = await preview(
      [
        'time,volts,amps',
        `${time(-3600)},7.7,10`,
        `${time(0)},7.70,10`,
        `${time(60)},OL,10`,
        `${time(120)},7.71,ten`,
        `${time(180)},77.1,10`,
        `${time(240)},7.72,100`,
        `${time(300)},7.73,-10`,
        `${time(200)},7.73,10`,
        `${time(360)},7.73,10`,
        `${time(360)},7.73,10`,
        `${time(420)},,`,
        `${time(480)}`,
        'yesterday,7.7,10',
        '',
        `${time(86400)},7.7,10`,
      ].join('\n'),
    );
    expect(read.readings).toBe(3);
    expect(Object.fromEntries(read.leftOut.map(({ reason, lines }) => [lines.join(), reason.slice(0, 22)]))).toEqual({
      2: 'Before the start of th',
      4: 'volts: “OL” is no numb',
      5: 'amps: “ten” is no numb',
      6: 'More volts than 2 grou',
      7: 'Over twice the planned',
      8: 'Amps out of the module',
      11: 'The same as the line b',
      12: 'Nothing was read in it',
      13: 'Fewer columns than the',
      14: 'The time cannot be rea',
      16: 'Still to come, by the ',
    });
    // 200 s comes after 180 to 300 s, which are no readings: it is in order after all.
    expect(read.rows.map(({ line }) => line)).toEqual([3, 9, 10]);
  });

  test('an odd reading among a thousand that agree is kept, and shown as odd', async () => {
    const lines = Array.from({ length: 1000 }, (_, s) => `${s},7.75,${s === 999 ? 0 : 10}`);
    const { charge: after } = await take(['s,V,A', ...lines].join('\n'));
    expect(after.readings.map(({ amps }) => amps)).toContain(0);
    expect(after.odd).toMatchObject({ kind: 'no-current', seen: 0 });
  });

  test('choices that cannot be are answered with what to change, and nothing of them is lost', async () => {
    const { choices } = await preview(halfHour());
    const with_ = (columns: LogChoices['columns']) => preview(halfHour(), { ...choices, columns });
    const [time, volts, amps] = choices.columns as [
      LogChoices['columns'][0],
      LogChoices['columns'][0],
      LogChoices['columns'][0],
    ];
    const none = { use: 'none', unit: '' } as const;
    expect((await with_([none, volts, amps])).problem).toBe('No column is the time. Choose the one that is.');
    expect((await with_([time, none, none])).problem).toMatch(/^No column holds volts/);
    expect((await with_([time, volts, volts])).problem).toMatch(/^2 columns are the volts at the clips/);
    const grouped = await with_([time, { use: 'group', unit: 'V' }, amps]);
    expect(grouped.problem).toBe('This module has 2 groups, 1 columns are groups. Choose all of them, or none.');
    expect(grouped.choices.columns[1]).toEqual({ use: 'group', unit: 'V' });
    const refused = await send('log-file', halfHour(), { ...choices, columns: [none, volts, amps] });
    expect(refused.status).toBe(400);
    expect(refused.body.detail).toBe('No column is the time. Choose the one that is.');
    const broken = await bench.as('technician').post(`/api/charges/${charge.id}/log-preview?choices=%7B`);
    expect(broken.status).toBe(400);
  });

  test.each([
    ['at once, of a small file', () => `${'x'.repeat(5000)}\n0;7,7\n`],
    ['at once, of 3 MB', () => 'x'.repeat(5000) + '\n0;7,7;8'.repeat(400_000)],
    ['in the midst of 4 MB', () => '0;7,7;8\n'.repeat(250_000) + 'x'.repeat(5000) + '\n0;7,7;8'.repeat(250_000)],
  ])('that is refused %s, is told why, and the connection and the server go on', async (_when, text) => {
    const refused = await send('log-preview', text());
    expect([refused.status, refused.body.fields.file]).toEqual([
      400,
      expect.stringMatching(/^Line \d+ is longer than 4000 characters\./),
    ]);
    expect((await preview(halfHour())).readings).toBe(1801);
  });

  test('counts from another instant, in milliseconds and milliamps, with the sign turned and in °F', async () => {
    const zeroAt = new Date(at(charge.startedAt) + 10 * minute).toISOString();
    const text = 'x,y,z,w\n0,7700,-8000,77\n60000,7701,-8000,77\n';
    const columns: LogChoices['columns'] = [
      { use: 'time', unit: 'ms' },
      { use: 'volts', unit: 'mV' },
      { use: 'amps', unit: '-mA' },
      { use: 'celsius', unit: 'F' },
    ];
    const choices = { separator: ',', decimal: '.', headerLine: 1, columns, zeroAt, takenAt: 'module' } as const;
    const { charge: after } = await take(text, choices);
    expect(after.readings).toMatchObject([
      { at: zeroAt, terminalVolts: 7.7, amps: 8, celsius: 25, takenAt: 'module' },
      { terminalVolts: 7.701 },
    ]);
  });

  test('is refused of a charge that is not under way, of another workshop, and while another of the same person comes in', async () => {
    const waiting = new PassThrough() as unknown as LogUpload & PassThrough;
    waiting.headers = {};
    const member = { ...bench.server.own.people.technician, workshopId: bench.server.own.id };
    const who = {
      ...member,
      personId: bench.server.own.people.technician.id,
      sessionId: 's',
      role: 'technician',
    } as never;
    const first = previewLog(bench.server.deps, who, charge.id, {}, waiting, bench.server.clock.now());
    const second = await send('log-preview', halfHour());
    expect(second.status).toBe(409);
    expect(second.body.detail).toMatch(/^Another file of yours is still on its way/);
    waiting.end('s,V\n0,7.7\n');
    expect((await first).readings).toBe(1);
    // One that breaks off is no fault of the server, and leaves the way free.
    const left = Object.assign(new PassThrough(), { headers: {} });
    const broken = previewLog(bench.server.deps, who, charge.id, {}, left, bench.server.clock.now());
    left.write('s,V\n');
    left.destroy(Object.assign(new Error('aborted'), { code: 'ECONNRESET' }));
    await expect(broken).rejects.toMatchObject({ status: 400, code: 'broke_off' });
    expect((await preview(halfHour())).readings).toBe(1801);
    const stranger = bench.server.agentFor('technician', bench.server.other);
    await stranger.post(`/api/charges/${charge.id}/log-file`).expect(404);
    await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/stop`, { reason: 'Too warm.' })
      .set('If-Match', `"${(await seen(bench, charge.id)).rev}"`)
      .set('Idempotency-Key', key())
      .expect(200);
    const over = await send('log-file', halfHour());
    expect(over.status).toBe(409);
    expect(over.body.detail).toMatch(/^Readings belong to a charge that is under way/);
  });
});
