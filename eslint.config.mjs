// The floors of the house, enforced: every folder may import what lies under it, and the message says what to do instead.
import expo from 'eslint-config-expo/flat.js';
import { defineConfig, globalIgnores } from 'eslint/config';
import tseslint from 'typescript-eslint';

/** Regex for an import of one of our own folders, by alias or by a relative path that climbs out. */
const own = (...folders) => `^(@/|(\\.\\./)+)(${folders.join('|')})(/|$)`;
const code = (folder) => [`${folder}/**/*.ts`, `${folder}/**/*.tsx`];
const imports = (...patterns) => ({ '@typescript-eslint/no-restricted-imports': ['error', { patterns }] });

const serverOnly = {
  regex:
    '^(node:|express$|typeorm$|better-sqlite3$|web-push$|nodemailer$|expo-server-sdk$|undici$|socket\\.io$|pino|helmet$|jsonwebtoken$|bcryptjs$|compression$|selfsigned$|reflect-metadata$|rate-limiter-flexible)',
  message: 'Runs in the browser: this package works on the server only. Ask the server through the API client.',
};
const clientOnly = {
  regex: '^(react($|-)|react-native|expo($|-(?!server-sdk$)|/)|@expo/|@tanstack/|@hookform/|socket\\.io-client$)',
  message: 'The server draws nothing. What both sides need goes to shared/contract or calc.',
};
const noScreens = {
  regex: `${own('app', 'tests')}|^(@/|(\\.\\./)+)shared/(client|ui|screens)(/|$)`,
  message: 'The server never imports screens or hooks. Move what both need to shared/contract or calc.',
};
const wholeMathjs = {
  regex: '^mathjs$',
  message: "Pulls 200 KiB into the page. Import the few functions by name from 'mathjs/number', in a part loaded late.",
};

const wholeZod = {
  regex: '^(zod($|/(?!mini$))|@hookform/resolvers/zod$)',
  message:
    "Pulls all of zod into the page. Import 'zod/mini', of which the web build keeps only what is used, and '@hookform/resolvers/standard-schema'.",
};

const leftOutHead = {
  regex: '^expo-router/head$',
  message: "Left out of the web build (server/cli/web/leave-out.cjs). Set the title by the stack's options.",
};
const leftOutRouter = {
  regex: '^expo-router$',
  importNames: ['Tabs', 'ExperimentalStack', 'Sitemap', 'useSitemap'],
  message: 'Left out of the web build (server/cli/web/leave-out.cjs). Navigate with Stack and our own bar and rail.',
};

/** What every floor that draws leaves alone. */
const inThePage = [serverOnly, wholeMathjs, wholeZod, leftOutRouter, leftOutHead];
const noBareQueries = {
  regex: '^(@tanstack/react-query|socket\\.io-client)$',
  message: 'Use the hooks of shared/client.',
};

// no-restricted-syntax does not merge between blocks, so each floor lists its own set out of these.
const noDefaultExport = {
  selector: 'ExportDefaultDeclaration',
  message: 'Default exports only in app/, where the router wants them. Export it by name.',
};
const noBarrel = {
  selector: 'ExportAllDeclaration',
  message: 'No barrels but calc/index.ts. Import from the file that has it.',
};
const noDecorator = { selector: 'Decorator', message: 'Decorators live in server/ only.' };
const noHtmlTag = {
  selector: 'JSXOpeningElement > JSXIdentifier[name=/^[a-z]/]',
  message: 'Only React Native primitives here. What only the web has goes into a .web.tsx file.',
};
const noAnimatedList = {
  selector:
    ':matches(MemberExpression, JSXMemberExpression)[object.name="Animated"][property.name=/^(FlatList|SectionList)$/]',
  message: 'Left out of the web build (server/cli/web/leave-out.cjs). Animate the rows, not the list.',
};
const noRandom = {
  selector: 'MemberExpression[object.name="Math"][property.name="random"]',
  message: 'calc is repeatable. Take a seeded generator as an argument.',
};
const syntax = (...rules) => ({ 'no-restricted-syntax': ['error', ...rules] });

export default defineConfig([
  globalIgnores([
    'dist*/**',
    '.expo/**',
    '.tsbuild/**',
    'data/**',
    'coverage/**',
    'assets/**',
    'expo-env.d.ts',
    '**/*.d.ts',
  ]),
  expo,
  {
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      'max-lines': ['warn', { max: 300, skipBlankLines: true, skipComments: true }],
      // TypeScript resolves imports and checks names; these only slow the run down or contradict it.
      'import/namespace': 'off',
      'import/no-unresolved': 'off',
      'import/no-named-as-default': 'off',
      'import/no-named-as-default-member': 'off',
      'no-redeclare': 'off',
    },
  },
  {
    files: ['**/*.{mjs,cjs}'],
    languageOptions: {
      globals: Object.fromEntries(
        [
          'process',
          'Buffer',
          'console',
          'require',
          'module',
          '__dirname',
          'setTimeout',
          'clearTimeout',
          'URL',
          'fetch',
        ].map((name) => [name, 'readonly']),
      ),
    },
  },
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.recommended],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-redeclare': 'off',
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { fixStyle: 'inline-type-imports', disallowTypeAnnotations: false },
      ],
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
    },
  },

  {
    files: code('calc'),
    rules: {
      ...imports(
        {
          regex: '^(?!\\.{1,2}/|@/calc(/|$)|mathjs/number$)',
          message: 'calc is pure numbers. Take what you need as an argument.',
        },
        {
          regex: own('app', 'server', 'shared', 'tests', 'assets'),
          message: 'calc stands under every other floor. Move what you need into calc, or take it as an argument.',
        },
      ),
      ...syntax(noDefaultExport, noBarrel, noDecorator, noRandom),
      'no-restricted-globals': [
        'error',
        ...['Date', 'performance'].map((name) => ({
          name,
          message: 'calc has no clock. Take the instant as an argument (epoch milliseconds).',
        })),
        ...[
          'crypto',
          'fetch',
          'process',
          'globalThis',
          'window',
          'document',
          'console',
          'setTimeout',
          'setInterval',
          'localStorage',
          'require',
        ].map((name) => ({
          name,
          message: 'calc does no input or output. Do it in the caller and pass the value in.',
        })),
      ],
    },
  },
  { files: ['calc/index.ts'], rules: syntax(noDefaultExport, noDecorator) },

  {
    files: code('shared/contract'),
    rules: {
      ...imports(
        {
          regex: '^(?!\\.{1,2}/|@/|zod/mini$)',
          message: 'shared/contract imports zod/mini and types of calc, nothing else.',
        },
        {
          regex: `${own('app', 'server', 'tests')}|^(@/shared|(\\.\\./)+)/?(client|ui|screens)(/|$)`,
          message: 'shared/contract is what both sides stand on. Move the type or schema here.',
        },
        {
          regex: own('calc'),
          allowTypeImports: true,
          message: "Only types of calc here ('import type'). Compute in a service or a hook.",
        },
      ),
      ...syntax(noDefaultExport, noBarrel, noDecorator),
    },
  },

  {
    files: code('shared/client'),
    rules: {
      ...imports(serverOnly, wholeMathjs, {
        regex: `${own('app', 'server', 'tests')}|^(@/shared|(\\.\\./)+)/?(ui|screens)(/|$)`,
        message: 'shared/client holds no screens and knows no server code. Share a type through shared/contract.',
      }),
      ...syntax(noDefaultExport, noBarrel, noDecorator),
    },
  },

  {
    files: code('shared/ui'),
    rules: {
      ...imports(
        ...inThePage,
        {
          regex: `${own('app', 'server', 'tests')}|^(@/shared|(\\.\\./)+)/?(client|screens)(/|$)`,
          message:
            'shared/ui takes props and fetches nothing. Call the hook in a part of shared/screens or in the route, and pass the data down.',
        },
        {
          regex: '^(@tanstack/react-query|socket\\.io-client)',
          message:
            'shared/ui fetches nothing. Call the hook in a part of shared/screens or in the route, and pass the data down.',
        },
      ),
      ...syntax(noDefaultExport, noBarrel, noDecorator, noAnimatedList, noHtmlTag),
    },
  },
  { files: ['shared/ui/**/*.web.tsx'], rules: syntax(noDefaultExport, noBarrel, noDecorator) },

  {
    files: code('shared/screens'),
    rules: {
      ...imports(
        ...inThePage,
        {
          regex: own('app', 'server', 'tests'),
          message:
            'shared/screens holds parts of a screen that ask for their own data. A route of app/ arranges them, not the other way round; share a type with the server through shared/contract.',
        },
        {
          regex: own('calc'),
          allowTypeImports: true,
          message:
            'A part of a screen does not compute. Put the call of calc into a hook of shared/client or a part of shared/ui.',
        },
        noBareQueries,
      ),
      ...syntax(noDefaultExport, noBarrel, noDecorator, noAnimatedList, noHtmlTag),
    },
  },

  {
    files: code('app'),
    rules: {
      ...imports(
        ...inThePage,
        {
          regex: own('server', 'tests'),
          message:
            'A screen never imports server code. Share a type through shared/contract, data through a hook of shared/client.',
        },
        {
          regex: own('calc'),
          allowTypeImports: true,
          message:
            'A route arranges; it does not compute. Put the call of calc into a hook of shared/client or a part of shared/ui.',
        },
        noBareQueries,
      ),
      ...syntax(noBarrel, noDecorator, noAnimatedList, noHtmlTag),
    },
  },

  {
    files: code('server'),
    rules: {
      ...imports(clientOnly, noScreens),
      ...syntax(noDefaultExport, noBarrel),
      'no-console': 'error',
    },
  },
  {
    files: code('server/routes'),
    rules: imports(clientOnly, noScreens, {
      regex: '^(typeorm|better-sqlite3)$|(^|/)(repositories|entities|migrations)/',
      message:
        'A route says who may, what shape, and calls a service. Put the query into a repository and call it from the service.',
    }),
  },
  {
    files: code('server/services'),
    rules: imports(clientOnly, noScreens, {
      regex: '^express$|(^|/)routes/',
      message: 'A service knows nothing of HTTP. Throw a domain error with a code; the middleware makes the answer.',
    }),
  },
  // The commands talk to a person at a terminal.
  { files: ['server/cli/**'], rules: { 'no-console': 'off' } },

  // Forgotten awaits lose errors and writes; the check needs types, so it runs where promises are the daily bread.
  {
    files: [...code('server'), ...code('shared/client')],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { arguments: false, attributes: false } },
      ],
      '@typescript-eslint/await-thenable': 'error',
    },
  },

  { files: code('tests'), rules: syntax(noBarrel) },
  // Tables of published values are data, not code to keep short.
  { files: ['tests/**/reference/**'], rules: { 'max-lines': 'off' } },
  // The tests' stand-ins for components are allowed to be anonymous.
  { files: ['tests/**/*.tsx'], rules: { 'react/display-name': 'off' } },
]);
