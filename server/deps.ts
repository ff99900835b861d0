import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import type { Role } from '@/shared/contract/roles';
import type { Outbox } from './alerts/outbox';
import type { Clock } from './clock';
import type { Config } from './config';
import type { Outside } from './demo/outside/outside';
import type { Lifecycle } from './lifecycle';
import type { LiveHub } from './live/hub';
import type { Sleeper } from './live/sleeper';
import type { Backups } from './services/backups';
import type { BenchSolver } from './services/bench-plan/bench-solver';
import type { Limits } from './services/limits';
import type { Metrics } from './services/metrics';
import type { Passwords } from './services/passwords';
import type { Secrets } from './services/secrets';
import type { WaitsSolver } from './services/waits/waits-solver';
import type { WallBoards } from './services/wall-boards';

/** What every service gets. Made once in create-app. */
export interface Deps {
  dataSource: DataSource;
  clock: Clock;
  config: Config;
  log: Logger;
  hub: LiveHub;
  /** Boards of the walls, read once for all who ask. The hub tells them what changed. */
  wallBoards: WallBoards;
  sleeper: Sleeper;
  /** What goes out of the house. */
  outbox: Outbox;
  lifecycle: Lifecycle;
  /** Hashes and compares off the event loop. */
  passwords: Passwords;
  /** Reckons for the bench plan off the event loop. */
  bench: BenchSolver;
  /** Reckons over the history of waits off the event loop. */
  waits: WaitsSolver;
  /** Keys of this installation. */
  secrets: Secrets;
  /** Throttles, kept in memory. */
  limits: Limits;
  /** Copies of the data. */
  backups: Backups;
  metrics: Metrics;
  /** The services outside as the demo has them; null: the real ones. */
  outside: Outside | null;
}

/** Who asks, from the session; never from the request's body. */
export interface Member {
  workshopId: string;
  personId: string;
  sessionId: string;
  name: string;
  role: Role;
}
