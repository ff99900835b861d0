import { randomInt } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import {
  userCode,
  userCodeLetters,
  type ApproveWallInput,
  type WallCodeDto,
  type WallDto,
  type WallRequestDto,
} from '@/shared/contract/wall';
import type { Deps, Member } from '../deps';
import type { WallCode } from '../entities/wall-code';
import { DomainError, notFound } from '../errors/domain-error';
import {
  deleteCodesBefore,
  findCodeByDevice,
  findWaitingCode,
  insertCode,
  updateCode,
} from '../repositories/wall-codes.repository';
import { findWall, insertWall, updateWall } from '../repositories/walls.repository';
import { deviceName } from './device-name';
import { newId } from './ids';
import { toInstant } from './instants';
import { hashToken, newToken } from './tokens';
import { inTransaction } from './unit-of-work';
import { wallDto, wallRequestDto } from './walls-dto';

/** Pairing of a screen without a keyboard (RFC 8628). */
const codeLifeMs = 10 * 60_000;
const pollS = 5;
/** RFC 8628 §3.5: after `slow_down` the interval grows by 5 s. */
const slowDownS = 5;
/** A poll that comes this much early is the network's doing, ms. */
const pollSlackMs = 500;
/** The answer that brought the token may have been lost: the same screen may ask for it again this long. */
const collectGraceMs = 60_000;
/** Codes are kept this long past their end, to answer a late poll properly. */
const keptMs = 60 * 60_000;

const pending = (code: string, detail: string, intervalS?: number) =>
  new DomainError(400, code, detail, intervalS === undefined ? {} : { retryAfterS: intervalS });

function newUserCode(): string {
  const letters = Array.from({ length: 8 }, () => userCodeLetters[randomInt(userCodeLetters.length)]).join('');
  return `${letters.slice(0, 4)}-${letters.slice(4)}`;
}

/** A screen asks to be paired: a code to show, and one to poll with. */
export async function askForCode(
  deps: Deps,
  input: { userAgent: string | undefined; baseUrl: string },
  now: number,
): Promise<WallCodeDto> {
  const deviceCode = newToken();
  const expiresAt = now + codeLifeMs;
  const shown = await inTransaction(deps, async (manager) => {
    await deleteCodesBefore(manager, now - keptMs);
    let code = newUserCode();
    while (await findWaitingCode(manager, code, now)) code = newUserCode();
    await insertCode(manager, {
      id: newId(),
      deviceCodeHash: hashToken(deviceCode),
      userCode: code,
      device: deviceName(input.userAgent),
      createdAt: now,
      expiresAt,
      intervalS: pollS,
      lastPolledAt: null,
      workshopId: null,
      wallId: null,
      collectedAt: null,
    });
    return code;
  });
  const verificationUrl = `${input.baseUrl}/approve`;
  return {
    deviceCode,
    userCode: shown,
    verificationUrl,
    verificationUrlComplete: `${verificationUrl}?code=${shown}`,
    expiresAt: toInstant(expiresAt),
    intervalS: pollS,
  };
}

/**
 * A screen polls. Gives the wall's token once the code is approved.
 * @throws DomainError 400 with `authorization_pending`, `slow_down`, `expired_token` or `access_denied`
 */
export async function collectWallToken(deps: Deps, deviceCode: string, now: number): Promise<{ token: string }> {
  // What is refused here is still written: the poll, and the interval that grew.
  const outcome = await inTransaction(deps, (manager) => poll(manager, hashToken(deviceCode), now));
  if (outcome instanceof DomainError) throw outcome;
  return outcome;
}

async function poll(manager: EntityManager, hash: string, now: number): Promise<{ token: string } | DomainError> {
  const code = await findCodeByDevice(manager, hash);
  const expired = pending('expired_token', 'This code is no longer good. Show a new one.');
  if (!code) return expired;
  if (code.wallId !== null && code.workshopId !== null)
    return collect(manager, code, code.workshopId, code.wallId, now);
  // Answered, and no wall came of it: somebody refused.
  if (code.collectedAt !== null) return pending('access_denied', 'Somebody refused this screen.');
  if (now >= code.expiresAt) return expired;
  const early = code.lastPolledAt !== null && now - code.lastPolledAt < code.intervalS * 1000 - pollSlackMs;
  const intervalS = early ? code.intervalS + slowDownS : code.intervalS;
  await updateCode(manager, code.id, { lastPolledAt: now, intervalS });
  return early
    ? pending('slow_down', `Asked too soon. Ask every ${intervalS} s.`, intervalS)
    : pending('authorization_pending', 'Nobody has approved this screen yet.', intervalS);
}

async function collect(
  manager: EntityManager,
  code: WallCode,
  workshopId: string,
  wallId: string,
  now: number,
): Promise<{ token: string } | DomainError> {
  const wall = await findWall(manager, workshopId, wallId);
  if (!wall || wall.revokedAt !== null) return pending('access_denied', 'The right to show the board was taken back.');
  const late = code.collectedAt === null ? now >= code.expiresAt + codeLifeMs : now - code.collectedAt > collectGraceMs;
  if (late) return pending('expired_token', 'This code is no longer good. Show a new one.');
  const token = newToken();
  await updateWall(manager, workshopId, wallId, { tokenHash: hashToken(token), lastHeardAt: now });
  await updateCode(manager, code.id, { collectedAt: code.collectedAt ?? now });
  return { token };
}

/** A code that waits, or 404; wrong guesses are counted against the person. */
async function waitingCode(
  deps: Deps,
  manager: EntityManager,
  member: Member,
  typed: string,
  now: number,
): Promise<WallCode> {
  await deps.limits.take('wallGuess', member.personId);
  const read = userCode.safeParse(typed);
  const code = read.success ? await findWaitingCode(manager, read.data, now) : null;
  if (!code)
    throw new DomainError(
      404,
      'no_such_code',
      'No screen shows this code now. Look at the screen again: it changes every 10 minutes.',
    );
  await deps.limits.giveBack('wallGuess', member.personId);
  return code;
}

/** The screen that shows a code, before it is approved. */
export const describeRequest = async (
  deps: Deps,
  member: Member,
  typed: string,
  now: number,
): Promise<WallRequestDto> => wallRequestDto(await waitingCode(deps, deps.dataSource.manager, member, typed, now));

/** Gives the screen that shows the code the right to read this workshop's board. */
export async function approveWall(deps: Deps, member: Member, input: ApproveWallInput, now: number): Promise<WallDto> {
  const wall = await inTransaction(deps, async (manager) => {
    const code = await waitingCode(deps, manager, member, input.userCode, now);
    const { workshopId } = member;
    const wall = {
      id: newId(),
      workshopId,
      name: input.name,
      // The screen's own token is made when it collects it.
      tokenHash: hashToken(newToken()),
      diagonalInches: input.diagonalInches,
      distanceMetres: input.distanceMetres,
      approvedById: member.personId,
      createdAt: now,
      lastHeardAt: null,
      revokedAt: null,
    };
    await insertWall(manager, wall);
    await updateCode(manager, code.id, { workshopId, wallId: wall.id });
    return wall;
  });
  deps.hub.toWorkshop(member.workshopId, 'walls:changed', { at: toInstant(now) });
  deps.log.info({ by: member.personId, wallId: wall.id }, 'wall approved');
  return wallDto(wall, member.name);
}

/** Refuses the screen that shows the code; it learns so with its next poll. */
export async function refuseWall(deps: Deps, member: Member, typed: string, now: number): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const code = await waitingCode(deps, manager, member, typed, now);
    await updateCode(manager, code.id, { collectedAt: now });
  });
}

/** Takes a wall's right back; its screen goes dark within seconds. */
export async function revokeWall(deps: Deps, member: Member, id: string, now: number): Promise<void> {
  await inTransaction(deps, async (manager) => {
    const wall = await findWall(manager, member.workshopId, id);
    if (!wall || wall.revokedAt !== null) throw notFound('This wall');
    await updateWall(manager, member.workshopId, id, { revokedAt: now });
  });
  deps.hub.end({ wallId: id }, 'revoked');
  deps.hub.toWorkshop(member.workshopId, 'walls:changed', { at: toInstant(now) });
  deps.log.info({ by: member.personId, wallId: id }, 'wall revoked');
}
