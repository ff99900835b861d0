import http from 'node:http';
import https from 'node:https';
import type { RequestListener } from 'node:http';
import type { Config } from './config';

export interface Patience {
  /** Until the head of a request is there, ms. */
  headersTimeout: number;
  /** Until all of a request is there, ms: a photo of 16 MB through a weak link. */
  requestTimeout: number;
  /** How often connections are looked through, ms. */
  connectionsCheckingInterval: number;
}

/** Who sends byte by byte to hold a connection open loses it. */
const patience: Patience = { headersTimeout: 15_000, requestTimeout: 180_000, connectionsCheckingInterval: 5_000 };

/** The server of the port: with a certificate https, else http. */
export const makeHttpServer = (
  { tls }: Pick<Config, 'tls'>,
  app: RequestListener,
  limits: Patience = patience,
): http.Server => (tls ? https.createServer({ ...tls, ...limits }, app) : http.createServer(limits, app));
