import { transformAsync } from '@babel/core';
import path from 'node:path';
import { transformWithOxc, type Plugin } from 'vite';
import { defineConfig } from 'vitest/config';

const root = import.meta.dirname;

/** Reanimated's hooks need the worklets Babel plugin (Metro runs it through babel-preset-expo). */
const worklets = (): Plugin => ({
  name: 'worklets',
  enforce: 'pre',
  async transform(code, id) {
    if (id.includes('node_modules') || !/\.tsx?$/.test(id) || !code.includes('react-native-reanimated')) return null;
    const out = await transformAsync(code, {
      filename: id,
      babelrc: false,
      configFile: false,
      parserOpts: { plugins: ['typescript', 'jsx'] },
      plugins: ['react-native-worklets/plugin'],
    });
    return out?.code ? { code: out.code, map: null } : null;
  },
});

/** Some Expo packages publish JSX in plain .js files, and Reanimated require()s where inlined ESM has no require. */
const expoSources = (): Plugin => ({
  name: 'expo-sources',
  enforce: 'pre',
  async transform(code, id) {
    if (id.endsWith('js-reanimated/webUtils.web.js')) {
      const styles = 'react-native-web/dist/exports/StyleSheet';
      return {
        code: `import c from '${styles}/compiler/createReactDOMStyle';import p from '${styles}/preprocess';import * as P from '${styles}/preprocess';export const createReactDOMStyle=c;export const createTransformValue=P.createTransformValue;export const createTextShadowValue=P.createTextShadowValue;`,
        map: null,
      };
    }
    if (!/node_modules\/expo-[^/]+\/.*\.js$/.test(id)) return null;
    const out = await transformWithOxc(code, id, { lang: 'jsx' });
    return { code: out.code, map: null };
  },
});

const alias = [{ find: /^@\//, replacement: `${root}/` }];

export default defineConfig({
  resolve: { alias },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/e2e/**'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        plugins: [worklets(), expoSources()],
        resolve: {
          alias: [
            { find: /^react-native$/, replacement: 'react-native-web' },
            { find: /^expo-router$/, replacement: path.join(root, 'tests/mocks/expo-router.tsx') },
          ],
          mainFields: ['browser', 'module', 'main'],
          extensions: ['.web.tsx', '.web.ts', '.web.mjs', '.web.js', '.tsx', '.ts', '.mjs', '.js', '.jsx', '.json'],
        },
        define: { __DEV__: 'true', 'process.env.EXPO_OS': '"web"' },
        test: {
          name: 'ui',
          environment: 'jsdom',
          include: ['tests/**/*.test.tsx'],
          setupFiles: ['tests/support/setup-ui.ts'],
          server: { deps: { inline: [/react-native/, /expo/, /standard-navigation/] } },
          testTimeout: 30_000,
        },
      },
      {
        // A built server and a real browser; one file at a time, because two cores do not carry two Chromiums.
        extends: true,
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.e2e.ts'],
          fileParallelism: false,
          testTimeout: 180_000,
          hookTimeout: 300_000,
          sequence: { groupOrder: 1 },
        },
      },
    ],
  },
});
