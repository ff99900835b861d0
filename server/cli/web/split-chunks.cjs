// Code splitting between routes, on top of Expo's.
//
// Expo puts every module that two routes share into one file that is loaded before the first screen: animation, charts
// and forms would weigh on the sign-in page. Here the shared modules are parted by which routes need them, and a
// route names all its files (shared/client/async-require.ts loads them). It hooks in where Expo names its files; the
// versions are pinned, and a change of Expo's inside stops the build with a sentence instead of going unnoticed.
const fs = require('node:fs');
const path = require('node:path');
const chunkModule = require('@expo/metro-config/build/serializer/serializeChunks');
const nameModule = require('@expo/metro-config/build/serializer/computeChunkFilenames');

/** A further file in a page load counts as much as this many characters of code. */
const requestWeight = 6_000;

const codeLength = (module) => module.output.reduce((total, { data }) => total + (data.code?.length ?? 0), 0);

/** The modules an async import reaches without a further async import, the target included. */
function closureOf(target, graph) {
  const found = new Set();
  const waiting = [graph.dependencies.get(target)];
  while (waiting.length > 0) {
    const module = waiting.pop();
    if (!module || found.has(module)) continue;
    found.add(module);
    for (const dependency of module.dependencies.values()) {
      if (dependency.absolutePath && !dependency.data.data.asyncType)
        waiting.push(graph.dependencies.get(dependency.absolutePath));
    }
  }
  return found;
}

/** Every module that is the target of an async import, by its path. */
function asyncTargets(graph) {
  const targets = new Set();
  for (const module of graph.dependencies.values()) {
    for (const dependency of module.dependencies.values()) {
      const type = dependency.data.data.asyncType;
      if (dependency.absolutePath && type && type !== 'worker') targets.add(dependency.absolutePath);
    }
  }
  return targets;
}

const minus = (a, b) => [...a].filter((item) => !b.has(item)).length;
const both = (a, b) => [...a].filter((item) => b.has(item)).length;

/** Joins groups while the requests saved outweigh the code that some route then loads without need. */
function joinSmall(groups) {
  for (;;) {
    let best = null;
    for (let i = 0; i < groups.length; i++) {
      for (let k = i + 1; k < groups.length; k++) {
        const [a, b] = [groups[i], groups[k]];
        const gain =
          requestWeight * both(a.users, b.users) - a.size * minus(b.users, a.users) - b.size * minus(a.users, b.users);
        if (gain > 0 && (!best || gain > best.gain)) best = { gain, i, k };
      }
    }
    if (!best) return;
    const [taken] = groups.splice(best.k, 1);
    const kept = groups[best.i];
    kept.size += taken.size;
    kept.always ||= taken.always;
    for (const user of taken.users) kept.users.add(user);
    for (const module of taken.modules) kept.modules.add(module);
  }
}

/** What weighs most in a part, for a file name that says something: a package, or 'own'. */
function nameOf(part) {
  const weights = new Map();
  for (const module of part.modules) {
    const inPackage = /[/\\]node_modules[/\\]((?:@[^/\\]+[/\\])?[^/\\]+)/.exec(module.path);
    const name = inPackage ? inPackage[1].replace(/[^a-z0-9-]+/gi, '-').replace(/^-+/, '') : 'own';
    weights.set(name, (weights.get(name) ?? 0) + codeLength(module));
  }
  return [...weights].sort((a, b) => b[1] - a[1])[0]?.[0] ?? 'own';
}

/** Parts the common chunk; afterwards each chunk knows which files an async import needs. */
function splitCommonChunk(chunks, chunksByPath) {
  const common = [...chunks].find((chunk) => chunk.name === '/__common.js');
  if (!common) return;
  const { graph, options } = common;
  const entry = [...chunks].find((chunk) => chunk.isEntry);
  const closures = new Map([...asyncTargets(graph)].map((target) => [target, closureOf(target, graph)]));
  const rootLayout = [...closures.keys()].find((target) => /[/\\]app[/\\]_layout\.tsx$/.test(target));
  if (!entry || !rootLayout)
    throw new Error('split-chunks: the entry or app/_layout.tsx was not found; Expo’s bundle has changed shape');

  // What the root layout needs is needed on every page and stays in the common file.
  const everywhere = new Set(closures.keys());
  const groups = new Map([['always', { users: everywhere, modules: new Set(), size: 0, always: true }]]);
  for (const module of common.deps) {
    const users = new Set([...closures].filter(([, closure]) => closure.has(module)).map(([target]) => target));
    const key = users.has(rootLayout) || users.size === 0 ? 'always' : [...users].sort().join('\n');
    if (!groups.has(key)) groups.set(key, { users, modules: new Set(), size: 0, always: false });
    groups.get(key).modules.add(module);
    groups.get(key).size += codeLength(module);
  }
  const parts = [...groups.values()];
  joinSmall(parts);

  parts.forEach((part, index) => {
    if (part.always) return;
    const chunk = new common.constructor(
      `/shared-${index}-${nameOf(part)}.js`,
      part.modules,
      graph,
      options,
      true,
      true,
    );
    for (const required of common.requiredChunks) chunk.requiredChunks.add(required);
    for (const module of part.modules) {
      common.deps.delete(module);
      chunksByPath.set(module.path, chunk);
    }
    chunks.add(chunk);
  });

  // The root layout is on every page too: from the common file it is there one round trip earlier.
  const layout = chunksByPath.get(rootLayout);
  if (layout.isAsync) {
    for (const module of layout.deps) {
      common.deps.add(module);
      chunksByPath.set(module.path, common);
    }
    chunks.delete(layout);
  }

  const loadedAtStart = (chunk) => !chunk || !chunk.isAsync;
  const filesOf = new Map();
  for (const [target, closure] of closures) {
    const own = chunksByPath.get(target);
    const needed = new Set(
      [...closure].map((module) => chunksByPath.get(module.path)).filter((chunk) => !loadedAtStart(chunk)),
    );
    if (!loadedAtStart(own)) needed.add(own);
    filesOf.set(target, needed);
  }
  for (const chunk of chunks) chunk.neededFor = (target) => filesOf.get(target);
}

/** Which modules went into which file, for the check of the first load (tests/bench/first-load.ts). */
function writeList(file, chunks, fileNames) {
  const list = [...chunks].map((chunk) => {
    const modules = [...chunk.deps].map((module) => path.relative(chunk.options.projectRoot, module.path));
    return [fileNames.get(chunk), modules.sort()];
  });
  fs.mkdirSync(path.dirname(file), { recursive: true });
  fs.writeFileSync(file, JSON.stringify(Object.fromEntries(list), null, 1));
}

/**
 * Hooks the splitting into Expo's serializer, for the bundles made by this process.
 * @param listFile where to write which modules went into which file
 */
function splitChunks(listFile) {
  const { Chunk } = chunkModule;
  const expected = ['getAsyncChunkTargets', 'getComputedPathsForAsyncDependencies'];
  if (
    !Chunk ||
    !nameModule.precomputeChunkFilenames ||
    expected.some((name) => typeof Chunk.prototype[name] !== 'function')
  ) {
    throw new Error('split-chunks: @expo/metro-config has changed inside; look at server/cli/web/split-chunks.cjs');
  }
  const { precomputeChunkFilenames } = nameModule;
  nameModule.precomputeChunkFilenames = (args) => {
    splitCommonChunk(args.chunks, args.chunksByPath);
    const fileNames = precomputeChunkFilenames(args);
    if (listFile) writeList(listFile, args.chunks, fileNames);
    return fileNames;
  };

  // File names carry a hash of what they lead to, so the shared files have to count as led to.
  const { getAsyncChunkTargets, getComputedPathsForAsyncDependencies } = Chunk.prototype;
  Chunk.prototype.getAsyncChunkTargets = function (chunkByPath) {
    const targets = getAsyncChunkTargets.call(this, chunkByPath);
    if (!this.neededFor) return targets;
    for (const module of this.deps) {
      for (const dependency of module.dependencies.values()) {
        if (!dependency.absolutePath || !dependency.data.data.asyncType) continue;
        for (const chunk of this.neededFor(dependency.absolutePath) ?? []) targets.add(chunk);
      }
    }
    return targets;
  };

  Chunk.prototype.getComputedPathsForAsyncDependencies = function (chunksByPath, filenamesByChunk) {
    const paths = getComputedPathsForAsyncDependencies.call(this, chunksByPath, filenamesByChunk);
    if (!paths || !this.neededFor) return paths;
    for (const target of Object.keys(paths)) {
      const files = [...(this.neededFor(target) ?? [])].map((chunk) => `/${filenamesByChunk.get(chunk)}`);
      if (files.length > 0) paths[target] = files.sort().join('|');
    }
    return paths;
  };
}

module.exports = { splitChunks };
