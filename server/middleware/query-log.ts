import type { Logger as TypeOrmLogger } from 'typeorm';
import type { Logger } from 'pino';
import type { Metrics } from '../services/metrics';

/** Statements that take longer are named in the log, ms. */
export const SLOW_QUERY_MS = 100;

/**
 * What TypeORM has to say, and services that hold nothing but its manager, in the log of the process; an Error with its
 * stack and cause. The parameters of a statement are left out: they are what people typed.
 */
export const queryLog = (log: Logger, metrics: Metrics): TypeOrmLogger => ({
  logQuery: () => {},
  logQueryError: (error, query) => log.debug({ err: error, query: short(query) }, 'a statement failed'),
  logQuerySlow: (ms, query) => {
    metrics.slowQuery();
    log.warn({ ms: Math.round(ms), query: short(query) }, 'a slow statement');
  },
  logSchemaBuild: () => {},
  logMigration: (message) => log.debug(message),
  log: (level, message: unknown) => {
    const [what, text] = message instanceof Error ? [{ err: message }, message.message] : [{}, String(message)];
    if (level === 'warn') log.warn(what, text);
    else log.debug(what, text);
  },
});

/** Lists of columns run to pages. */
const short = (query: string): string => (query.length > 1000 ? `${query.slice(0, 1000)} …` : query);
