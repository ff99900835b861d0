import compression from 'compression';
import express, { type Express } from 'express';
import type { Deps } from './deps';
import { metroProxy } from './middleware/metro-proxy';
import { refuseAnnounced } from './middleware/announced-size';
import { measure } from './middleware/measure';
import { notHere, problems } from './middleware/problems';
import { requestLog } from './middleware/request-log';
import { sameOrigin } from './middleware/same-origin';
import { securityHeaders } from './middleware/security-headers';
import { unbelievedProxy } from './middleware/unbelieved-proxy';
import { webApp } from './middleware/web-app';
import { routesModules } from './routes/all';
import { makeRegistrar } from './routes/register-route';

/** The HTTP application: API, health, and the web app's files. Opens no port and no database. */
export function createApp(deps: Deps): Express {
  const { config } = deps;
  const app = express();
  app.disable('x-powered-by');
  // Only as many forwarded headers are believed as proxies stand in front; none by default.
  app.set('trust proxy', config.proxyHops);
  app.set('query parser', 'simple');
  app.use(requestLog(deps.log));
  app.use(measure(deps.metrics));
  app.use(unbelievedProxy(deps.log, config.proxyHops));

  const web = webApp(config.webDir);
  // Metro's page and its answers to a reload hold scripts that no policy could name.
  app.use(securityHeaders(config.metroPort === null ? (web.html ?? '') : null));

  app.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  app.use(sameOrigin(config.publicUrl));
  // A board of twenty charges is tens of kilobytes of JSON to a phone in a metal hall.
  app.use('/api', compression());
  app.use('/api', refuseAnnounced(4 * 1024 * 1024));
  app.use('/api', express.json({ limit: '256kb', strict: false }));

  const router = express.Router();
  const route = makeRegistrar(router, deps);
  for (const addRoutes of routesModules) addRoutes(route, router);
  app.use(router);
  app.use('/api', notHere);
  app.use(config.metroPort === null ? web.serve : metroProxy(config.metroPort));
  app.use(notHere);
  app.use(problems(deps.log));
  return app;
}
