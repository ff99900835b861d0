import fs from 'node:fs';
import { expect, test } from 'vitest';
import { fromRoot } from '@/server/cli/tools.mjs';

/** The packages the product is designed on. */
const design = [
  'expo',
  'expo-router',
  'react-native-web',
  'react-native-reanimated',
  'express',
  'typeorm',
  'better-sqlite3',
  'socket.io',
  'socket.io-client',
  'mathjs',
  'bcryptjs',
  'jsonwebtoken',
  'expo-notifications',
  'vitest',
  'supertest',
];

const read = (file: string) => fs.readFileSync(fromRoot(file), 'utf8');
const table = [...read('DEVELOPERS.md').matchAll(/^\| `([^`]+)` \| `([^`]+)` \| `([^`]+)` \|$/gm)].map(
  ([, name = '', file = '', testFile = '']) => ({ name, file, testFile }),
);

test('the developers’ guide names every package of the design', () => {
  expect(table.map(({ name }) => name).sort()).toEqual([...design].sort());
});

test.each(design)('%s is installed, imported where the guide says, and its test is there', (name) => {
  const row = table.find((each) => each.name === name);
  const { dependencies, devDependencies } = JSON.parse(read('package.json')) as Record<string, Record<string, string>>;
  expect({ ...dependencies, ...devDependencies }).toHaveProperty([name]);
  expect(read(row?.file ?? '')).toMatch(new RegExp(`'${name.replaceAll('.', '\\.')}(/[^']*)?'`));
  expect(fs.existsSync(fromRoot(row?.testFile ?? ''))).toBe(true);
});
