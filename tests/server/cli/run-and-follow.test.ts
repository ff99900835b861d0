import { spawn } from 'node:child_process';
import { expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';

/** Follows a process of this code as `npm start` follows the server; gives its exit status and what it wrote. */
function follow(code: string, onOutput: (output: string, kill: (signal: NodeJS.Signals) => void) => void = () => {}) {
  const script = `
    import { runAndFollow } from ${JSON.stringify(fromRoot('server/cli/tools.mjs'))};
    runAndFollow(process.execPath, ['-e', ${JSON.stringify(code)}], {}, ({ address }) => console.log('ready at ' + address));
  `;
  const parent = spawn(process.execPath, ['--input-type=module', '-e', script], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let output = '';
  parent.stdout.on('data', (chunk: Buffer) => {
    output += chunk.toString();
    onOutput(output, (signal) => parent.kill(signal));
  });
  return new Promise<{ status: number | null; output: string }>((resolve) =>
    parent.on('close', (status) => resolve({ status, output })),
  );
}
const dies = (signal: string) => `process.kill(process.pid, '${signal}'); setTimeout(() => {}, 60000)`;
const stays = "console.log('up'); setTimeout(() => {}, 60000)";

// 128 and the signal's number, as shells have it: SIGABRT is 6, SIGKILL 9, SIGSEGV 11, SIGTERM 15 (signal(7)).
test.each([
  ['its own status 3', 'process.exit(3)', 3],
  ['0', 'process.exit(0)', 0],
  ['SIGABRT', dies('SIGABRT'), 134],
  ['SIGKILL', dies('SIGKILL'), 137],
  ['SIGSEGV', dies('SIGSEGV'), 139],
  ['a SIGTERM that nobody here sent', dies('SIGTERM'), 143],
])('a server that ends by %s', async (_how, code, status) => {
  expect((await follow(code)).status).toBe(status);
});

test.each(['SIGTERM', 'SIGINT'] as const)(
  'a server ended by the %s that was handed on is no failure',
  async (signal) => {
    const { status } = await follow(stays, (output, kill) => output.includes('up') && kill(signal));
    expect(status).toBe(0);
  },
);

test('says where it is ready by the server’s own word, and nothing where the server says nothing', async () => {
  const ready = "process.send({ ready: { address: 'http://127.0.0.1:40123' } }, () => process.exit(0))";
  expect(await follow(ready)).toEqual({ status: 0, output: 'ready at http://127.0.0.1:40123\n' });
  expect(await follow('process.exit(1)')).toEqual({ status: 1, output: '' });
});
