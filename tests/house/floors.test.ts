import { ESLint } from 'eslint';
import fs from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';

// The text is linted under the name of a file that exists, because the rules with types know only those.
const eslint = new ESLint({ cwd: fromRoot('.') });
const fileIn = (folder: string, extension: string) => {
  const name = fs
    .readdirSync(fromRoot(folder), { recursive: true, encoding: 'utf8' })
    .find((each) => each.endsWith(extension) && !each.endsWith('.d.ts'));
  return fromRoot(folder, name ?? `x${extension}`);
};

async function complaints(folder: string, code: string, extension = '.ts'): Promise<string> {
  const [result] = await eslint.lintText(code, { filePath: fileIn(folder, extension) });
  return (result?.messages ?? [])
    .filter((message) => message.severity === 2)
    .map((message) => message.message)
    .join('\n');
}

/** What TypeScript says to a file of that text in a floor, under the floor's own tsconfig.json. */
function typeErrors(floor: string, text: string): string {
  const probe = fromRoot(floor, 'probe.ts');
  const { config } = ts.readConfigFile(fromRoot(floor, 'tsconfig.json'), ts.sys.readFile);
  const { options } = ts.parseJsonConfigFileContent(config, ts.sys, fromRoot(floor));
  const host = ts.createCompilerHost(options);
  const { getSourceFile } = host;
  host.getSourceFile = (name, ...rest) =>
    path.resolve(name) === probe
      ? ts.createSourceFile(name, text, ts.ScriptTarget.ESNext)
      : getSourceFile(name, ...rest);
  const program = ts.createProgram([probe], { ...options, incremental: false, tsBuildInfoFile: undefined }, host);
  return ts
    .getPreEmitDiagnostics(program)
    .map((diagnostic) => ts.flattenDiagnosticMessageText(diagnostic.messageText, ' '))
    .join('\n');
}

const forbidden: [folder: string, code: string, says: string, extension?: string][] = [
  ['calc', 'export const t = () => Date.now();', 'calc has no clock'],
  ['calc', 'export const t = () => performance.now();', 'calc has no clock'],
  ['calc', 'export const t = () => new Date(0);', 'calc has no clock'],
  ['calc', 'export const r = () => Math.random();', 'seeded generator'],
  ['calc', "import fs from 'node:fs';\nexport const f = fs;", 'calc is pure numbers'],
  ['calc', "import { z } from 'zod';\nexport const f = z;", 'calc is pure numbers'],
  [
    'calc',
    "import { a } from '../../shared/contract/roles';\nexport const f = a;",
    'calc stands under every other floor',
  ],
  ['calc', "import { a } from '@/server/config';\nexport const f = a;", 'calc'],
  ['shared/contract', "import { a } from '@/calc';\nexport const f = a;", 'Only types of calc'],
  ['shared/contract', "import * as z from 'zod';\nexport const f = z;", 'zod/mini'],
  ['shared/contract', "import { a } from '../client/clock';\nexport const f = a;", 'what both sides stand on'],
  ['shared/client', "import { a } from '@/server/config';\nexport const f = a;", 'knows no server code'],
  ['shared/client', "import { a } from '../ui/theme';\nexport const f = a;", 'holds no screens'],
  ['shared/client', "import { a } from 'mathjs';\nexport const f = a;", 'mathjs/number'],
  ['shared/ui', "import { a } from '@/shared/client/clock';\nexport const f = a;", 'takes props and fetches nothing'],
  ['shared/ui', "import { useQuery } from '@tanstack/react-query';\nexport const f = useQuery;", 'fetches nothing'],
  ['shared/ui', 'export const F = () => <div />;', 'React Native primitives', '.tsx'],
  ['shared/ui', 'export default function F() {\n  return null;\n}', 'Default exports only in app/', '.tsx'],
  ['shared/ui', "import { a } from '@/shared/screens/plan/use-keep';\nexport const f = a;", 'takes props', '.tsx'],
  ['shared/client', "import { a } from '../screens/plan/use-keep';\nexport const f = a;", 'holds no screens'],
  ['shared/contract', "import { a } from '../screens/plan/use-keep';\nexport const f = a;", 'what both sides stand on'],
  ['shared/screens', "import { a } from '@/server/config';\nexport const f = a;", 'A route of app/ arranges them'],
  ['shared/screens', "import { a } from '@/app/estimate';\nexport const f = a;", 'A route of app/ arranges them'],
  ['shared/screens', "import { a } from '../../../tests/support/forms';\nexport const f = a;", 'arranges them', '.tsx'],
  ['shared/screens', "import { a } from '@/calc';\nexport const f = a;", 'does not compute', '.tsx'],
  ['shared/screens', "import { useQuery } from '@tanstack/react-query';\nexport const f = useQuery;", 'Use the hooks'],
  [
    'shared/screens',
    "import { Tabs } from 'expo-router';\nexport const f = Tabs;",
    'Left out of the web build',
    '.tsx',
  ],
  ['shared/screens', "import * as z from 'zod';\nexport const f = z;", 'zod/mini'],
  ['shared/screens', 'export const F = () => <div />;', 'React Native primitives', '.tsx'],
  ['shared/screens', 'export default function F() {\n  return null;\n}', 'Default exports only in app/', '.tsx'],
  ['shared/screens', "export * from './use-keep';", 'No barrels'],
  ['app', "import { a } from '@/server/config';\nexport const f = a;", 'never imports server code', '.tsx'],
  ['app', "import { a } from '@/calc';\nexport const f = a;", 'does not compute', '.tsx'],
  ['app', "import { Tabs } from 'expo-router';\nexport const f = Tabs;", 'Left out of the web build', '.tsx'],
  ['server', "import { a } from '@/shared/ui/theme';\nexport const f = a;", 'never imports screens'],
  ['server', "import { a } from '@/shared/screens/plan/use-keep';\nexport const f = a;", 'never imports screens'],
  ['server', "import { View } from 'react-native';\nexport const f = View;", 'draws nothing'],
  ['server', "export * from './config';", 'No barrels'],
  ['server/routes', "import { DataSource } from 'typeorm';\nexport const f = DataSource;", 'calls a service'],
  ['server/routes', "import { a } from '../repositories/charges.repository';\nexport const f = a;", 'calls a service'],
  ['server/services', "import type { Request } from 'express';\nexport type F = Request;", 'knows nothing of HTTP'],
];

const allowed: [folder: string, code: string, extension?: string][] = [
  ['calc', "import { a } from './types';\nexport const f = a;"],
  ['shared/contract', "import type { A } from '@/calc/types';\nexport type F = A;"],
  ['shared/client', "import { a } from '@/shared/contract/roles';\nexport const f = a;"],
  ['shared/ui', "import { a } from '@/calc';\nexport const f = a;"],
  ['shared/screens', "import type { A } from '@/calc/plan-types';\nexport type F = A;"],
  [
    'shared/screens',
    "import { a } from '@/shared/client/clock';\nimport { b } from '@/shared/ui/primitives/txt';\nexport const f = [a, b];",
    '.tsx',
  ],
  ['shared/screens', "import { useRouter } from 'expo-router';\nexport const f = useRouter;"],
  ['app', "import { a } from '@/shared/screens/plan/use-keep';\nexport const f = a;", '.tsx'],
  ['server', "import { a } from '@/shared/contract/roles';\nexport const f = a;"],
];

describe('the floors of the house', () => {
  test.each(forbidden)('lint stops this in %s: %s', async (folder, code, says, extension) => {
    expect(await complaints(folder, code, extension)).toContain(says);
  });

  test.each(allowed)('lint lets this stand in %s: %s', async (folder, code, extension) => {
    expect(await complaints(folder, code, extension)).toBe('');
  });

  test.each(['fetch', 'process', 'window', 'setTimeout', 'Buffer'])('%s in a formula does not compile', (name) => {
    expect(typeErrors('calc', `export const probe = ${name};`)).toContain(`Cannot find name '${name}'`);
  });

  test('the top level holds the six folders and no seventh', () => {
    const folders = fs
      .readdirSync(fromRoot('.'), { withFileTypes: true })
      .filter(
        (entry) =>
          entry.isDirectory() &&
          !entry.name.startsWith('.') &&
          !/^(node_modules|data|dist.*|coverage)$/.test(entry.name),
      )
      .map((entry) => path.basename(entry.name));
    expect(folders.sort()).toEqual(['app', 'assets', 'calc', 'server', 'shared', 'tests']);
  });
});
