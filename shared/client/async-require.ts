// What `import('…')` becomes in the web build (metro.config.cjs names this file). A route may need several files
// (server/cli/web/split-chunks.cjs joins their addresses with '|'); all of them are fetched at the same time, and the
// module runs when the last has arrived. Not to be imported.

type ModuleId = number | string;
type Paths = Record<ModuleId, string> | null | undefined;
type Load<T> = Promise<T> & { _result?: T | Promise<T> };
type AsyncRequire = (<T>(id: ModuleId, paths: Paths, name?: string) => Load<T>) & {
  unstable_importMaybeSync: <T>(id: ModuleId, paths: Paths) => T | Promise<T>;
  prefetch: (id: ModuleId, paths: Paths, name?: string) => void;
};

// eslint-disable-next-line @typescript-eslint/no-require-imports -- Metro calls this file as CommonJS
const expoRequire: AsyncRequire = require('expo/internal/async-require-module');

const arrived = new Set<string>();

/** Fetches the files of a module that are not there yet; null when all are. */
function fetchFiles(id: ModuleId, paths: Paths): Promise<unknown> | null {
  const missing = (paths?.[id] ?? '').split('|').filter((file) => file !== '' && !arrived.has(file));
  if (missing.length === 0) return null;
  // Expo's loader fetches each address once and lets a failed one be tried again.
  const load = (globalThis as { __loadBundleAsync?: (file: string) => Promise<void> }).__loadBundleAsync;
  if (!load) return null;
  return Promise.all(missing.map((file) => load(file).then(() => arrived.add(file))));
}

function importNow<T>(id: ModuleId, paths: Paths): T | Promise<T> {
  const fetching = fetchFiles(id, paths);
  // Without paths Expo's function only runs the module.
  return fetching
    ? fetching.then(() => expoRequire.unstable_importMaybeSync<T>(id, null))
    : expoRequire.unstable_importMaybeSync<T>(id, null);
}

const asyncRequire: AsyncRequire = Object.assign(
  <T>(id: ModuleId, paths: Paths): Load<T> => {
    const result = importNow<T>(id, paths);
    const promise: Load<T> = Promise.resolve(result);
    // Read by the router: a module that is already here is drawn without a flash of nothing.
    promise._result = result;
    return promise;
  },
  expoRequire,
  {
    unstable_importMaybeSync: importNow,
    prefetch: (id: ModuleId, paths: Paths) => {
      fetchFiles(id, paths)?.catch(() => undefined);
    },
  },
);

module.exports = asyncRequire;
