import { createHash } from 'node:crypto';
import type { Readable } from 'node:stream';
import {
  logChoicesSchema,
  type LogChoices,
  type LogPreviewDto,
  type LogQuery,
  type LogTakenDto,
} from '@/shared/contract/charge-log';
import type { ReadingDto } from '@/shared/contract/charge';
import { MOST_LOG_BYTES } from '@/shared/contract/charge-log-words';
import type { Deps, Member } from '../../deps';
import type { ChargeReading } from '../../entities/charge-reading';
import { conflict, DomainError, invalid } from '../../errors/domain-error';
import { fieldsOf } from '../../errors/zod-fields';
import { insertReadings } from '../../repositories/charge-rows.repository';
import { chargeDto } from '../charge-dto';
import { loadFile, type ChargeFile } from '../charge-file';
import { isUnderWay } from '../charge-stages';
import { changeCharge } from '../charge-write';
import { newId } from '../ids';
import { toInstant, toOptionalInstant } from '../instants';
import { tooLargeLog } from './log-lines';
import type { LogPoint } from './log-store';
import { readLog, type ReadLog } from './read-log';

/** A file on its way in. */
export interface LogUpload extends Readable {
  headers: { 'content-length'?: string; 'content-type'?: string };
}

/** Who has a file on its way, by server. */
const underWay = new WeakMap<Deps, Set<string>>();

/**
 * What would be understood of a log; nothing is written.
 * @throws DomainError 409 where the charge is not under way or the person has another file on its way; 400, 413 as `readLog`
 */
export async function previewLog(
  deps: Deps,
  member: Member,
  id: string,
  query: LogQuery,
  upload: LogUpload,
  now: number,
): Promise<LogPreviewDto> {
  const { file, log } = await readUpload(deps, member, id, query, upload, now);
  const { points, within, rows, firstAt, lastAt, ...rest } = log;
  const known = keysOf(file.readings);
  return {
    ...rest,
    rows: rows.map(({ line, at, terminalVolts, amps, celsius, groupVolts }) => ({
      line,
      at: toInstant(at),
      terminalVolts,
      amps,
      celsius,
      groupVolts,
    })),
    firstAt: toOptionalInstant(firstAt),
    lastAt: toOptionalInstant(lastAt),
    stored: points.length,
    there: points.filter((point) => known.has(keyOf(point))).length,
    within,
  };
}

/**
 * Puts the readings of a log to those of the charge and reckons it anew, once. A reading is known by its instant and its numbers:
 * what is there already is not added, so that the same file twice adds nothing.
 * @throws DomainError as `previewLog`, and 400 where the choices leave nothing to take
 */
export async function takeLog(
  deps: Deps,
  member: Member,
  id: string,
  query: LogQuery,
  upload: LogUpload,
  now: number,
): Promise<LogTakenDto> {
  const { file, log } = await readUpload(deps, member, id, query, upload, now);
  if (log.problem !== null) throw invalid({ file: log.problem }, log.problem);
  const fresh = (readings: readonly ChargeReading[]): LogPoint[] => {
    const known = keysOf(readings);
    return log.points.filter((point) => !known.has(keyOf(point)));
  };
  const there = (added: number): number => log.points.length - added;
  if (fresh(file.readings).length === 0) {
    const charge = await chargeDto(deps.dataSource.manager, deps.config, file, member, now);
    return { charge, added: 0, there: there(0) };
  }
  let added = 0;
  const charge = await changeCharge(deps, member, id, null, now, async (write) => {
    if (!isUnderWay(write.file.charge.stage)) throw notUnderWay();
    const rows = fresh(write.file.readings).map((point) => rowOf(write.file, member, point, log.choices, now));
    await insertReadings(write.manager, rows);
    write.file.readings.push(...rows);
    added = rows.length;
    write.note('log-file', logText(query, log, added));
  });
  return { charge, added, there: there(added) };
}

const notUnderWay = (): DomainError =>
  conflict('wrong_stage', 'Readings belong to a charge that is under way. This one is not.');

async function readUpload(
  deps: Deps,
  member: Member,
  id: string,
  query: LogQuery,
  upload: LogUpload,
  now: number,
): Promise<{ file: ChargeFile; log: ReadLog }> {
  const busy = underWay.get(deps) ?? new Set();
  underWay.set(deps, busy);
  if (busy.has(member.personId))
    throw conflict(
      'upload_under_way',
      'Another file of yours is still on its way. Wait until it is read, then send this one.',
    );
  busy.add(member.personId);
  try {
    if (Number(upload.headers['content-length'] ?? 0) > MOST_LOG_BYTES) throw tooLargeLog();
    const file = await loadFile(deps.dataSource.manager, member.workshopId, id);
    if (!isUnderWay(file.charge.stage)) throw notUnderWay();
    // Left in its midst, it would be destroyed and its connection with it, and nobody would hear why it is refused.
    const chunks = upload.iterator({ destroyOnReturn: false }) as AsyncIterable<Uint8Array>;
    return { file, log: await readLog(chunks, choicesOf(query), file, now) };
  } catch (error) {
    // Who leaves, or chooses otherwise meanwhile, breaks it off: no fault of the server.
    if (upload.destroyed && !upload.readableEnded && (error as NodeJS.ErrnoException).code === 'ECONNRESET')
      throw new DomainError(400, 'broke_off', 'The upload broke off. Send it again.');
    throw error;
  } finally {
    busy.delete(member.personId);
    // What is left of a refused file is read and dropped, so that the answer is heard and not a broken line.
    upload.resume();
  }
}

function choicesOf({ choices }: LogQuery): LogChoices | null {
  if (choices === undefined) return null;
  let raw: unknown;
  try {
    raw = JSON.parse(choices);
  } catch {
    throw invalid({ choices: 'The choices are no JSON.' });
  }
  const read = logChoicesSchema.safeParse(raw);
  if (!read.success) throw invalid(fieldsOf(read.error));
  return read.data;
}

type Keyed = Pick<ReadingDto, 'terminalVolts' | 'amps' | 'celsius' | 'groupVolts'> & { at: number };

/** By what a reading is known: its instant and its numbers. */
export const keyOf = ({ at, terminalVolts, amps, celsius, groupVolts }: Keyed): string =>
  createHash('sha1')
    .update(JSON.stringify([at, terminalVolts, amps, celsius, groupVolts]))
    .digest('base64');

const keysOf = (readings: readonly ChargeReading[]): Set<string> => new Set(readings.map(keyOf));

function rowOf(file: ChargeFile, member: Member, point: LogPoint, choices: LogChoices, now: number): ChargeReading {
  const { at, terminalVolts, amps, celsius, groupVolts } = point;
  return {
    id: newId(),
    workshopId: file.charge.workshopId,
    chargeId: file.charge.id,
    at,
    terminalVolts,
    amps,
    celsius,
    groupVolts,
    meterId: null,
    takenAt: terminalVolts === null ? null : choices.takenAt,
    personId: member.personId,
    source: 'file',
    replacesId: null,
    replacedById: null,
    reason: null,
    createdAt: now,
  };
}

function logText({ name }: LogQuery, { lines, readings }: ReadLog, added: number): string {
  const of = name ? `Log “${name}”` : 'A log';
  return `${of}: ${added} ${added === 1 ? 'reading' : 'readings'} added, of ${readings} in ${lines} lines.`;
}
