import { randomUUID } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import pino, { type DestinationStream, type Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Whatever is logged under one of these names is left out: passwords, tokens, cookies, links. */
const secretNames = [
  'password',
  'newPassword',
  'token',
  'deviceCode',
  'userCode',
  'cookie',
  'authorization',
  'set-cookie',
  // A failed query tells its parameters: hashes, addresses, whatever was typed.
  'parameters',
  'passwordHash',
  'tokenHash',
];
const redactPaths = secretNames.flatMap((name) => [
  `["${name}"]`,
  `*["${name}"]`,
  `*.*["${name}"]`,
  `*.*.*["${name}"]`,
]);

/** The log of the process: JSON lines with UTC times, on stdout unless told otherwise. */
export function makeLog(level: string, destination?: DestinationStream): Logger {
  const options: pino.LoggerOptions = {
    level,
    base: { app: 'bidewell' },
    timestamp: pino.stdTimeFunctions.isoTime,
    // Errors are written out under either name.
    serializers: { err: pino.stdSerializers.err, error: pino.stdSerializers.err },
    redact: { paths: redactPaths, censor: '[left out]' },
  };
  return destination ? pino(options, destination) : pino(options);
}

/** A request id given by a proxy is taken over when it is a harmless one. */
function requestId(request: IncomingMessage): string {
  const given = request.headers['x-request-id'];
  return typeof given === 'string' && /^[A-Za-z0-9._-]{8,64}$/.test(given) ? given : randomUUID();
}

/** One-use links carry their token in the path. */
const withoutToken = (url: string): string =>
  url
    .replace(/^(\/api\/links\/|\/join\/|\/reset\/)[^/?]+/, '$1[left out]')
    .replace(/([?&](?:token|code)=)[^&]*/g, '$1[left out]');

/** Logs each request once it is answered, with its id, which the answer carries as x-request-id. Headers and bodies are not logged. */
export const requestLog = (log: Logger) =>
  pinoHttp({
    logger: log,
    genReqId: (request, response) => {
      const id = requestId(request);
      response.setHeader('x-request-id', id);
      return id;
    },
    customLogLevel: (_request, response, error) => {
      if (error || response.statusCode >= 500) return 'error';
      return response.statusCode === 401 || response.statusCode === 403 || response.statusCode === 429
        ? 'warn'
        : 'debug';
    },
    serializers: {
      req: (request: { id: unknown; method: string; url: string; raw?: { ip?: string } }) => ({
        id: request.id,
        method: request.method,
        url: withoutToken(request.url),
        ip: request.raw?.ip,
      }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
    },
  });
