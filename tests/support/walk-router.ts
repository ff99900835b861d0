import type { Express } from 'express';
import type { DeclaredHandler } from '@/server/routes/define-route';

export interface WalkedRoute {
  /** 'POST /api/charges/:id/start' */
  name: string;
  method: 'get' | 'post' | 'patch' | 'put' | 'delete';
  path: string;
  handler: DeclaredHandler;
}

interface Layer {
  handle: unknown;
  route?: { path: string; stack: { method?: string; handle: DeclaredHandler }[] };
}

/** Every route of a running application, as express itself holds them. */
export function walkRouter(app: Express): WalkedRoute[] {
  const walk = (layers: Layer[]): WalkedRoute[] =>
    layers.flatMap((layer) => {
      if (layer.route) {
        const { path, stack } = layer.route;
        return stack.map(({ method = 'all', handle }) => ({
          name: `${method.toUpperCase()} ${path}`,
          method: method as WalkedRoute['method'],
          path,
          handler: handle,
        }));
      }
      const inner = (layer.handle as { stack?: Layer[] }).stack;
      return inner ? walk(inner) : [];
    });
  return walk((app as unknown as { router: { stack: Layer[] } }).router.stack);
}
