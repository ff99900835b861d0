import { afterEach, expect, test } from 'vitest';
import { kept, makeBench, type Bench } from './bench';

let bench: Bench;
afterEach(() => bench.server.close());

test.each([
  ['0.0.0.0', null, ''],
  ['::', null, ''],
  ['127.0.0.1', 'https://bidewell.example.com', 'https://bidewell.example.com'],
  ['0.0.0.0', 'https://bidewell.example.com/', 'https://bidewell.example.com'],
])('listening on %s with %j set, the label leads to %j/charges/…', async (host, publicUrl, origin) => {
  bench = await makeBench({ config: { host, publicUrl } });
  const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
  expect(charge.labelUrl).toBe(`${origin}/charges/${charge.id}`);
});
