const { getDefaultConfig } = require('expo/metro-config');
const { createHash } = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');

const config = getDefaultConfig(__dirname);

// Metro's default cache is one folder in the system's temp folder for ALL projects, and its keys do not cover
// app.json, which Babel inlines into expo-constants: keep our own store and put app.json into the key.
config.cacheStores = ({ FileStore }) => [new FileStore({ root: path.join(__dirname, 'node_modules/.cache/metro') })];
config.cacheVersion = createHash('sha256')
  .update(fs.readFileSync(path.join(__dirname, 'app.json')))
  .digest('hex');

// What the web app never imports need not be crawled or watched.
const root = __dirname.replace(/[/\\^$.*+?()[\]{}|]/g, '\\$&');
const ours = new RegExp(`^${root}/(tests|server|data|dist[^/]*|\\.tsbuild|\\.git)/.*`);
config.resolver.blockList = [config.resolver.blockList ?? [], ours].flat();

// zod re-exports every language of its messages (about 65 KiB gzip) from one barrel. Ours are English sentences of
// our own, so the barrel is replaced by its English file; `z.locales` is not used anywhere.
const resolveFurther = config.resolver.resolveRequest;
config.resolver.resolveRequest = (context, moduleName, platform) => {
  const resolve = resolveFurther ?? context.resolveRequest;
  const found = resolve(context, moduleName, platform);
  if (found.type === 'sourceFile' && /[/\\]zod[/\\]v4[/\\]locales[/\\]index\.c?js$/.test(found.filePath)) {
    return { ...found, filePath: found.filePath.replace(/index(\.c?js)$/, 'en$1') };
  }
  return found;
};

module.exports = config;
