import fs from 'node:fs';
import path from 'node:path';
import type { RequestHandler, Response } from 'express';
import { DomainError } from '../errors/domain-error';

interface WebFile {
  file: string;
  encodings: ('br' | 'gzip')[];
}

const suffixes = { br: '.br', gzip: '.gz' } as const;
/** Names that carry a hash of their content are never another content. */
const hashed = /^\/_expo\/static\/|[.-][0-9a-f]{32}\.[a-z0-9]+$/;
const types: Record<string, string> = { '.webmanifest': 'application/manifest+json', '.map': 'application/json' };

/** All files of the export by their address, each with the encodings that lie beside it. Read once: a request touches no other name. */
function listFiles(folder: string): Map<string, WebFile> {
  const names = fs
    .readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(folder, path.join(entry.parentPath, entry.name)));
  const all = new Set(names);
  const files = new Map<string, WebFile>();
  for (const name of names) {
    if (/\.(br|gz)$/.test(name) || path.basename(name).startsWith('.')) continue;
    const encodings = (['br', 'gzip'] as const).filter((encoding) => all.has(name + suffixes[encoding]));
    files.set(`/${name.split(path.sep).join('/')}`, { file: path.join(folder, name), encodings });
  }
  return files;
}

function sendFile(
  response: Response,
  address: string,
  { file, encodings }: WebFile,
  done: (error: Error) => void,
): void {
  const { req: request } = response;
  const extension = path.extname(file);
  response.type(types[extension] ?? extension);
  response.set('Cache-Control', hashed.test(address) ? 'public, max-age=31536000, immutable' : 'no-cache');
  let sent = file;
  if (encodings.length > 0) {
    response.vary('Accept-Encoding');
    // The smaller one that is taken; browsers name them in no order of preference.
    const encoding = encodings.find((offered) => request.acceptsEncodings(offered) === offered);
    if (encoding) {
      response.set('Content-Encoding', encoding);
      sent = file + suffixes[encoding];
    }
  }
  response.sendFile(sent, { cacheControl: false }, (error) => {
    if (error && !response.headersSent) done(error);
  });
}

export interface WebApp {
  /** The page of all screens; null where the web app is not built. */
  html: string | null;
  serve: RequestHandler;
}

/**
 * Serves the exported web app: its files as they were compressed when it was built, and its page for every address that
 * could be a screen. An address that names a file, or belongs to the API, is no screen.
 */
export function webApp(folder: string): WebApp {
  const index = path.join(folder, 'index.html');
  const built = fs.existsSync(index);
  const files = built ? listFiles(folder) : new Map<string, WebFile>();
  const serve: RequestHandler = (request, response, next) => {
    if (request.method !== 'GET' && request.method !== 'HEAD') {
      next();
      return;
    }
    let address: string;
    try {
      address = decodeURIComponent(request.path);
    } catch (error) {
      next(error);
      return;
    }
    const found = files.get(address);
    if (found) {
      sendFile(response, address, found, next);
      return;
    }
    const isScreen = !/^\/(api|_expo|assets|socket\.io)(\/|$)/.test(address) && !/\.[^/]*$/.test(address);
    if (!isScreen || !request.accepts('html')) {
      next();
      return;
    }
    const page = files.get('/index.html');
    if (!page) throw new DomainError(503, 'not_built', 'The screens are not built. Run npm start, or npm run build.');
    sendFile(response, '/index.html', page, next);
  };
  return { html: built ? fs.readFileSync(index, 'utf8') : null, serve };
}
