/** Every routes file of the server; add yours here. */
import type { RoutesModule } from './define-route';
import { equipmentRoutes } from './equipment.routes';
import { healthRoutes } from './health.routes';
import { plansRoutes } from './plans.routes';
import { stockRoutes } from './stock.routes';
import { waitsRoutes } from './waits.routes';

export const routesModules: RoutesModule[] = [healthRoutes, equipmentRoutes, stockRoutes, plansRoutes, waitsRoutes];
