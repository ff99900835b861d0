/** How the installation itself is: what a manager looks at before asking whoever runs it. */
import type { Instant } from './common';

export interface BackupCopyDto {
  /** Name of the file in the folder of backups. */
  name: string;
  at: Instant;
  bytes: number;
  /** Made by the clock; the others were made by hand or before a migration. */
  byClock: boolean;
}

export interface StatusDto {
  version: string;
  startedAt: Instant;
  at: Instant;
  /** Size of the database with its log. */
  databaseBytes: number;
  /** What is left on its disk; null: not known here. */
  freeBytes: number | null;
  backups: {
    /** Hours between two copies by the clock; 0: none. */
    everyHours: number;
    /** Newest first, at most ten. */
    latest: BackupCopyDto[];
    count: number;
    bytes: number;
    /** The last try, where it failed. */
    failed: { at: Instant; reason: string } | null;
  };
  /** Screens of this workshop that are connected now. */
  sockets: number;
  /** Charges of this workshop whose due instant has passed without the server having looked at them. */
  overdueLooks: number;
  /** Alerts of this workshop on their way out by push or e-mail, and those that were given up. */
  outbox: { waiting: number; dead: number };
}
