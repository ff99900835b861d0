import fs from 'node:fs';
import path from 'node:path';
import type { StatusDto } from '@/shared/contract/status';
import type { Deps, Member } from '../deps';
import { databaseFile } from '../data-files';
import { DomainError } from '../errors/domain-error';
import { countDueBefore } from '../repositories/charges.repository';
import { countEntries } from '../repositories/outbox.repository';
import { toInstant } from './instants';
import { version } from './version';

/** Copies that are named one by one. */
const NAMED = 10;
/** A look that is this late is no longer on its way, ms. */
const OVERDUE_MS = 60_000;

const sizeOf = (file: string): number => (fs.existsSync(file) ? fs.statSync(file).size : 0);

function freeBytes(folder: string): number | null {
  try {
    const { bavail, bsize } = fs.statfsSync(folder);
    return bavail * bsize;
  } catch {
    // Not every file system tells.
    return null;
  }
}

/** How the installation is, as a manager sees it. */
export async function status(deps: Deps, member: Member, now: number): Promise<StatusDto> {
  const { config } = deps;
  const { copies, failed } = deps.backups.state();
  const file = databaseFile(config.dataDir);
  return {
    version,
    startedAt: toInstant(deps.lifecycle.startedAt),
    at: toInstant(now),
    databaseBytes: sizeOf(file) + sizeOf(`${file}-wal`),
    freeBytes: freeBytes(config.dataDir),
    backups: {
      everyHours: config.backupHours,
      latest: copies.slice(0, NAMED).map((copy) => ({
        name: path.basename(copy.file),
        at: toInstant(copy.at),
        bytes: copy.bytes,
        byClock: copy.byClock,
      })),
      count: copies.length,
      bytes: copies.reduce((sum, { bytes }) => sum + bytes, 0),
      failed: failed === null ? null : { at: toInstant(failed.at), reason: failed.reason },
    },
    sockets: deps.hub.connected(member.workshopId),
    overdueLooks: await countDueBefore(deps.dataSource.manager, member.workshopId, now - OVERDUE_MS),
    outbox: await countEntries(deps.dataSource.manager, member.workshopId),
  };
}

/**
 * Makes a copy of all data now.
 * @throws DomainError 503 where it cannot be made, with the reason
 */
export async function backUpNow(deps: Deps, member: Member, now: number): Promise<StatusDto> {
  try {
    await deps.backups.backUpNow(null);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    throw new DomainError(503, 'not_backed_up', `No copy could be made: ${reason} What is there is unharmed.`);
  }
  return status(deps, member, now);
}
