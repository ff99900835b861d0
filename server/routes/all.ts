/** Every routes file of the server; add yours here. */
import { alertSettingsRoutes } from './alert-settings.routes';
import { alertsRoutes } from './alerts.routes';
import { benchPlanRoutes } from './bench-plan.routes';
import { boardRoutes } from './board.routes';
import { chargesRoutes } from './charges.routes';
import { customersRoutes } from './customers.routes';
import type { RoutesModule } from './define-route';
import { demoRoutes } from './demo.routes';
import { digestRoutes } from './digest.routes';
import { equipmentRoutes } from './equipment.routes';
import { healthRoutes } from './health.routes';
import { metricsRoutes } from './metrics.routes';
import { peopleRoutes } from './people.routes';
import { photosRoutes } from './photos.routes';
import { plansRoutes } from './plans.routes';
import { repairsRoutes } from './repairs.routes';
import { searchRoutes } from './search.routes';
import { sessionRoutes } from './session.routes';
import { statusRoutes } from './status.routes';
import { staffingRoutes } from './staffing.routes';
import { stockRoutes } from './stock.routes';
import { waitsRoutes } from './waits.routes';
import { wallRoutes } from './wall.routes';
import { workRoutes } from './work.routes';
import { workshopRoutes } from './workshop.routes';

export const routesModules: RoutesModule[] = [
  healthRoutes,
  metricsRoutes,
  statusRoutes,
  sessionRoutes,
  peopleRoutes,
  workshopRoutes,
  wallRoutes,
  equipmentRoutes,
  stockRoutes,
  plansRoutes,
  repairsRoutes,
  photosRoutes,
  customersRoutes,
  searchRoutes,
  chargesRoutes,
  boardRoutes,
  benchPlanRoutes,
  alertsRoutes,
  alertSettingsRoutes,
  demoRoutes,
  waitsRoutes,
  digestRoutes,
  staffingRoutes,
  workRoutes,
];
