import { expect, test } from 'vitest';
import { makeDataSource } from '@/server/data-source';
import type { ChargeFile } from '@/server/services/charge-file';
import { lookInPerson } from '@/server/services/look-in-person';
import { makeMetrics } from '@/server/services/metrics';
import { queryLog } from '@/server/middleware/query-log';
import { makeLog } from '@/server/middleware/request-log';
import { testNow } from '@/tests/support/server';

test('where the day cannot be laid out nobody is named, and the log says which charge and what failed', async () => {
  const lines: string[] = [];
  const log = makeLog('warn', { write: (line) => void lines.push(line) });
  // A database without tables: the first question fails.
  const dataSource = await makeDataSource(':memory:', queryLog(log, makeMetrics('1.2.3'))).initialize();
  const file = { charge: { id: 'charge-7', workshopId: 'w' }, workshop: { id: 'w', zone: 'Europe/Berlin' } };
  expect(await lookInPerson(dataSource.manager, file as ChargeFile, testNow)).toBeNull();
  await dataSource.destroy();
  expect(lines.length).toBe(1);
  const { level, err, msg } = JSON.parse(lines[0]!) as { level: number; err: { stack: string }; msg: string };
  expect(level).toBe(40);
  expect(msg).toContain('charge-7');
  expect(err.stack).toContain('no such table');
});
