import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import fc from 'fast-check';
import { DateTime } from 'luxon';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { LogChoices } from '@/shared/contract/charge-log';
import { DomainError } from '@/server/errors/domain-error';
import { loadFile, type ChargeFile } from '@/server/services/charge-file';
import { readLog } from '@/server/services/charge-log/read-log';
import { logLines } from '@/server/services/charge-log/log-lines';
import { makeBench, running, type Bench } from './bench';

let bench: Bench;
let file: ChargeFile;
beforeAll(async () => {
  bench = await makeBench();
  const charge = await running(bench, { spareId: await bench.spare('S-0398') });
  file = await loadFile(bench.server.deps.dataSource.manager, bench.server.own.id, charge.id);
});
afterAll(() => bench.server.close());

/** The charge as if it had begun then. */
const begunAt = (startedAt: number): ChargeFile => ({ ...file, charge: { ...file.charge, startedAt } });
async function* inPieces(bytes: Uint8Array, sizes: readonly number[]) {
  for (let from = 0, turn = 0; from < bytes.length; turn += 1) {
    const size = sizes[turn % sizes.length]!;
    yield bytes.subarray(from, from + size);
    from += size;
  }
}
const bytesOf = (text: string) => new TextEncoder().encode(text);
const read = (text: string | Uint8Array, choices: LogChoices | null = null, of = file) => {
  const now = of.charge.startedAt! + 48 * 3_600_000;
  return readLog(inPieces(typeof text === 'string' ? bytesOf(text) : text, [64 * 1024]), choices, of, now);
};

/** How a logger may write the same five readings. */
const styles = fc.record({
  separator: fc.constantFrom(',', ';', '\t'),
  comma: fc.boolean(),
  mark: fc.boolean(),
  end: fc.constantFrom('\n', '\r\n', '\r'),
  quoted: fc.boolean(),
  preamble: fc.integer({ min: 0, max: 3 }),
  last: fc.boolean(),
  order: fc.shuffledSubarray(['t', 'v', 'a', 'c', 'g1', 'g2', 'w'], { minLength: 7 }),
  pieces: fc.array(fc.integer({ min: 1, max: 200 }), { minLength: 1, maxLength: 5 }),
});
const heads: Record<string, string> = {
  t: 'Time [s]',
  v: 'Voltage',
  a: 'Current',
  c: 'Temp °C',
  g1: 'Cell 1',
  g2: 'Cell 2',
  w: 'Energy Wh',
};
const values = [0, 1, 2, 3, 4].map((n): Record<string, number> => ({
  t: n * 60,
  v: 7.7 + n / 100,
  a: 9.5 - n / 10,
  c: 21 + n,
  g1: 3.84 + n / 200,
  g2: 3.86 + n / 200,
  w: n * 3,
}));

describe('a file of readings', () => {
  test('reads the same however it is written: separators, commas, marks, line ends, quotes, order, pieces (300 files)', async () => {
    await fc.assert(
      fc.asyncProperty(styles, async (style) => {
        const decimal = style.comma && (style.separator !== ',' || style.quoted);
        const cell = (value: string) => (style.quoted ? `"${value}"` : value);
        const number = (value: number) => cell(decimal ? value.toFixed(3).replace('.', ',') : value.toFixed(3));
        const lines = [
          ...Array.from({ length: style.preamble }, (_, at) => `Logger note ${at}`),
          style.order.map((key) => cell(heads[key]!)).join(style.separator),
          ...values.map((row) => style.order.map((key) => number(row[key]!)).join(style.separator)),
        ];
        const text = `${style.mark ? '\ufeff' : ''}${lines.join(style.end)}${style.last ? style.end : ''}`;
        const now = file.charge.startedAt! + 3_600_000;
        const log = await readLog(inPieces(bytesOf(text), style.pieces), null, file, now);
        expect(log.problem, text).toBeNull();
        expect(log.leftOut).toEqual([]);
        expect(
          log.rows.map(({ at, terminalVolts, amps, celsius, groupVolts }) => ({
            at,
            terminalVolts,
            amps,
            celsius,
            groupVolts,
          })),
        ).toEqual(
          values.map((row) => ({
            at: file.charge.startedAt! + row.t! * 1000,
            terminalVolts: Number(row.v!.toFixed(3)),
            amps: Number(row.a!.toFixed(3)),
            celsius: row.c,
            groupVolts: [Number(row.g1!.toFixed(3)), Number(row.g2!.toFixed(3))],
          })),
        );
      }),
      { numRuns: 300 },
    );
  });

  test('garbage of any kind is answered with a sentence or a count of lines, never with a fault (500 files)', async () => {
    const garbage = fc.oneof(
      fc.uint8Array({ maxLength: 600 }),
      fc
        .array(
          fc
            .array(
              fc.oneof(
                fc.string({ maxLength: 12 }),
                fc.double().map(String),
                fc.constantFrom('"', '""', '', '-', '1e999', '12:61', '31.02.2026 10:00'),
              ),
              { maxLength: 6 },
            )
            .map((row) => row.join(';')),
          { maxLength: 20 },
        )
        .map((rows) => bytesOf(rows.join('\n'))),
    );
    await fc.assert(
      fc.asyncProperty(garbage, async (bytes) => {
        const log = await read(bytes).catch((error: unknown) => {
          expect(error).toBeInstanceOf(DomainError);
          return null;
        });
        if (log === null) return;
        if (log.readings === 0) expect(log.problem).toMatch(/\.$/);
        const left = log.leftOut.reduce((sum, { count }) => sum + count, 0);
        expect(left + log.readings).toBeLessThanOrEqual(log.lines);
        for (const point of log.points) expect(Number.isFinite(point.at)).toBe(true);
      }),
      { numRuns: 500 },
    );
  });

  test('UTF-16 with its mark is read as UTF-8 is; an empty file, and one of blank lines, say so', async () => {
    const text = 'time_s,volts,amps\n0,7.7,10\n60,7.7,10\n';
    const wide = Buffer.concat([Buffer.from([0xff, 0xfe]), Buffer.from(text, 'utf16le')]);
    expect((await read(wide)).points).toEqual((await read(text)).points);
    expect((await read('')).problem).toBe('This file is empty. Choose another one.');
    expect((await read('\n\n\n')).problem).not.toBeNull();
  });

  test('a quote that nothing closes spoils its own line alone', async () => {
    const log = await read('time_s,volts,amps\n0,7.7,10\n60,"7.7,10\n120,7.7,10\n');
    expect(log.readings).toBe(2);
    expect(log.leftOut).toEqual([{ reason: 'A quote is not closed.', count: 1, lines: [3] }]);
  });

  test('a line of 4,001 characters, and the line after a million, are refused with what to do', async () => {
    await expect(read(`s,V\n${'7'.repeat(4001)}\n`)).rejects.toMatchObject({ status: 400 });
    const many = bytesOf('0\n'.repeat(100_000));
    const count = async (times: number) => {
      let lines = 0;
      for await (const batch of logLines(inPieces(Buffer.concat(Array(times).fill(many) as Uint8Array[]), [65_536])))
        lines += batch.length;
      return lines;
    };
    expect(await count(10)).toBe(1_000_000);
    await expect(count(11)).rejects.toMatchObject({
      extra: { fields: { file: expect.stringMatching(/1,000,000 lines/) as string } },
    });
  });
});

describe('times', () => {
  const zone = 'Europe/Berlin';
  const localDay = { separator: ';', decimal: ',', headerLine: 1, zeroAt: null, takenAt: null } as const;
  const choices = (unit: string): LogChoices => ({
    ...localDay,
    columns: [
      { use: 'time', unit },
      { use: 'amps', unit: 'A' },
    ],
  });
  const ats = async (begin: string, unit: string, times: string[]) => {
    const of = begunAt(DateTime.fromISO(begin, { zone }).toMillis());
    const log = await read(['t;A', ...times.map((time, at) => `${time};${at}`)].join('\n'), choices(unit), of);
    return { log, utc: log.rows.map(({ at }) => new Date(at).toISOString().slice(0, 16)) };
  };
  beforeAll(() => expect(file.workshop.zone).toBe(zone));

  test('by the clock through the night in which 02:30 comes twice: in their order, an hour apart (25 October 2026)', async () => {
    const { utc } = await ats('2026-10-25T01:00', 'dmy', [
      '25.10.2026 01:30',
      '25.10.2026 02:30',
      '25.10.2026 02:30',
      '25.10.2026 02:10',
      '25.10.2026 03:30',
    ]);
    // 02:30 in summer time is 00:30 UTC; the clock runs back to 02:10, so that this one is winter time: 01:10 UTC.
    expect(utc).toEqual([
      '2026-10-24T23:30',
      '2026-10-25T00:30',
      '2026-10-25T00:30',
      '2026-10-25T01:10',
      '2026-10-25T02:30',
    ]);
  });

  test('through the night without 02:30: it is left out by name, 01:30 and 03:30 are an hour apart (29 March 2026)', async () => {
    const { utc, log } = await ats('2026-03-29T00:00', 'dmy', [
      '29.03.2026 01:30',
      '29.03.2026 02:30',
      '29.03.2026 03:30',
    ]);
    expect(utc).toEqual(['2026-03-29T00:30', '2026-03-29T01:30']);
    expect(log.leftOut).toMatchObject([
      { reason: 'This time did not exist: the clocks were put forward over it.', lines: [3] },
    ]);
  });

  test('elapsed ones take no notice of either night: 5 h are 5 h', async () => {
    for (const day of ['2026-10-24', '2026-03-28']) {
      const { log } = await ats(`${day}T23:00`, 'h', ['0', '2,5', '5']);
      expect(log.rows.map(({ at }) => at - log.rows[0]!.at)).toEqual([0, 9_000_000, 18_000_000]);
    }
    expect((await ats('2026-06-01T08:00', 'span', ['0:00:00', '26:30:00'])).utc).toEqual([
      '2026-06-01T06:00',
      '2026-06-02T08:30',
    ]);
  });

  test('a time of day alone begins on the day of the charge and goes on after midnight', async () => {
    const { utc } = await ats('2026-06-01T22:00', 'clock', ['22:30', '23:59:59', '00:10', '12:00', '00:05']);
    expect(utc).toEqual(['2026-06-01T20:30', '2026-06-01T21:59', '2026-06-01T22:10', '2026-06-02T10:00']);
  });

  test('with an offset, month first, and since 1970, all the same instant', async () => {
    const want = ['2026-06-01T07:15'];
    expect((await ats('2026-06-01T08:00', 'ymd', ['2026-06-01T09:15:00+02:00'])).utc).toEqual(want);
    expect((await ats('2026-06-01T08:00', 'ymd', ['2026-06-01 07:15:00Z'])).utc).toEqual(want);
    expect((await ats('2026-06-01T08:00', 'mdy', ['6/1/2026 9:15 AM'])).utc).toEqual(want);
    expect((await ats('2026-06-01T08:00', 'epoch-s', [String(Date.UTC(2026, 5, 1, 7, 15) / 1000)])).utc).toEqual(want);
    expect((await ats('2026-06-01T08:00', 'epoch-ms', [String(Date.UTC(2026, 5, 1, 7, 15))])).utc).toEqual(want);
  });
});

/** Bytes of heap that something still needs: all that nothing does is thrown away first. */
function held(): number {
  setFlagsFromString('--expose_gc');
  (runInNewContext('gc') as () => void)();
  return process.memoryUsage().heapUsed;
}

describe('a log of a million lines', () => {
  test('is read in pieces and never holds 20 MB, and at most 1,000 of its readings are stored', async () => {
    const lines = 999_999;
    async function* long() {
      yield bytesOf('time_s,volts,amps\n');
      for (let from = 0; from < lines; from += 1000)
        yield bytesOf(
          Array.from({ length: 1000 }, (_, at) => from + at)
            .filter((n) => n < lines)
            // A meter that scatters by 5 mV and 20 mA, worked out from the line's number.
            .map(
              (n) =>
                `${n / 10},${(7.7 + ((n * 7919) % 11) / 1000).toFixed(3)},${(9.9 + ((n * 104729) % 5) / 100).toFixed(2)}`,
            )
            .join('\n') + '\n',
        );
    }
    const before = held();
    let most = 0;
    const watched = async function* () {
      let turn = 0;
      for await (const piece of long()) {
        if ((turn += 1) % 50 === 0) most = Math.max(most, held() - before);
        yield piece;
      }
    };
    const log = await readLog(watched(), null, file, file.charge.startedAt! + 48 * 3_600_000);
    expect(log).toMatchObject({ lines: lines + 1, readings: lines, leftOut: [], problem: null });
    expect(log.points.length).toBeLessThanOrEqual(1000);
    expect(log.points.length).toBeGreaterThan(150);
    // Scatter of 10 mV in all needs no deadband beyond four widenings.
    expect(log.within.terminalVolts).toBeLessThanOrEqual(0.004 * 31);
    expect(most / 1024 / 1024).toBeLessThan(20);
  }, 120_000);
});
