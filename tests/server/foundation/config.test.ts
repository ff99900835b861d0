import fs from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readConfig } from '@/server/config';
import { fromRoot } from '@/server/cli/tools.mjs';

const hostWith = (env: Record<string, string>): string => readConfig(env).host;

describe('the address to listen on', () => {
  it('is this machine alone with the demo, whose sign-in is open to anyone who reaches it', () => {
    expect(hostWith({})).toBe('127.0.0.1');
    expect(hostWith({ BIDEWELL_DEMO: 'on' })).toBe('127.0.0.1');
  });

  it('is every address without the demo', () => {
    expect(hostWith({ BIDEWELL_DEMO: 'off' })).toBe('0.0.0.0');
  });

  it.each(['on', 'off'])('is what somebody says, with the demo %s', (BIDEWELL_DEMO) => {
    expect(hostWith({ BIDEWELL_DEMO, BIDEWELL_HOST: '::' })).toBe('::');
    expect(hostWith({ BIDEWELL_DEMO, BIDEWELL_HOST: '192.0.2.7' })).toBe('192.0.2.7');
  });

  it('is decided in one place', () => {
    const deciding = fs
      .readdirSync(fromRoot('server'), { recursive: true, encoding: 'utf8' })
      .filter((name) => /\.(ts|mjs)$/.test(name))
      .filter((name) => fs.readFileSync(fromRoot('server', name), 'utf8').includes('BIDEWELL_HOST ?? '));
    expect(deciding).toEqual(['config.ts']);
  });
});

describe('the environment', () => {
  it('is 4300, data beside the program and no proxy where nothing is set', () => {
    expect(readConfig({})).toMatchObject({ port: 4300, demo: true, tls: null, proxyHops: 0, publicUrl: null });
    expect(readConfig({}).dataDir).toBe(fromRoot('data'));
  });

  it.each([
    [{ PORT: '65536' }, 'PORT'],
    [{ BIDEWELL_DEMO: 'yes' }, 'BIDEWELL_DEMO'],
    [{ BIDEWELL_URL: 'bench' }, 'BIDEWELL_URL'],
    [{ BIDEWELL_PROXY_HOPS: '-1' }, 'BIDEWELL_PROXY_HOPS'],
    [{ BIDEWELL_TLS_CERT: '/a.crt' }, 'BIDEWELL_TLS_KEY'],
  ])('%j is refused by its name', (env, name) => {
    expect(() => readConfig(env)).toThrow(name);
  });
});
