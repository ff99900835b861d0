import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import type { Role } from '@/shared/contract/roles';
import type { Clock } from './clock';
import type { Config } from './config';
import type { LiveHub } from './live/hub';
import type { Sleeper } from './live/sleeper';

/** What every service gets. Made once in create-app. */
export interface Deps {
  dataSource: DataSource;
  clock: Clock;
  config: Config;
  log: Logger;
  hub: LiveHub;
  sleeper: Sleeper;
}

/** Who asks, from the session; never from the request's body. */
export interface Member {
  workshopId: string;
  personId: string;
  sessionId: string;
  name: string;
  role: Role;
}
