const { getDefaultConfig } = require('expo/metro-config');
const { createHash } = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');
const { leaveOut } = require('./server/cli/web/leave-out.cjs');
const { leanZod } = require('./server/cli/web/lean-zod.cjs');
const { splitChunks } = require('./server/cli/web/split-chunks.cjs');

const config = getDefaultConfig(__dirname);

// Metro's default cache is one folder in the system's temp folder for ALL projects, and its keys do not cover
// app.json, which Babel inlines into expo-constants: keep our own store and put app.json into the key.
config.cacheStores = ({ FileStore }) => [new FileStore({ root: path.join(__dirname, 'node_modules/.cache/metro') })];
config.cacheVersion = createHash('sha256')
  .update(fs.readFileSync(path.join(__dirname, 'app.json')))
  .digest('hex');

// What the web app never imports need not be crawled or watched.
const root = __dirname.replace(/[/\\^$.*+?()[\]{}|]/g, '\\$&');
const ours = new RegExp(`^${root}/(tests|server/(?!cli/web/)|data|dist[^/]*|\\.tsbuild|\\.git)/.*`);
config.resolver.blockList = [config.resolver.blockList ?? [], ours].flat();

// The first load carries what its screen shows and no more. In development the packages are taken as they are.
splitChunks(process.env.BIDEWELL_CHUNK_LIST);
config.transformer.asyncRequireModulePath = path.join(__dirname, 'shared/client/async-require.ts');
if (process.env.NODE_ENV === 'production') {
  const zodMini = leanZod(__dirname);
  const resolveFurther = config.resolver.resolveRequest;
  config.resolver.resolveRequest = (context, moduleName, platform) => {
    if (moduleName === 'zod/mini') return { type: 'sourceFile', filePath: zodMini };
    const found = (resolveFurther ?? context.resolveRequest)(context, moduleName, platform);
    return (found.type === 'sourceFile' && leaveOut(context.originModulePath, found.filePath)) || found;
  };
}

module.exports = config;
