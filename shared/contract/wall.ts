import * as z from 'zod/mini';
import { text, type Instant } from './common';
import { optionalQuantity } from './quantity';

/** Letters without vowels (and without Y), RFC 8628 §6.1. */
export const userCodeLetters = 'BCDFGHJKLMNPQRSTVWXZ';
export const userCode = z.pipe(
  z.transform((raw: unknown): unknown =>
    typeof raw === 'string'
      ? raw
          .toUpperCase()
          .replace(/[^A-Z]/g, '')
          .replace(/^(.{4})(.+)$/, '$1-$2')
      : raw,
  ),
  z
    .string()
    .check(
      z.regex(
        /^[BCDFGHJKLMNPQRSTVWXZ]{4}-[BCDFGHJKLMNPQRSTVWXZ]{4}$/,
        'Eight letters, as the wall shows them: BCDF-GHJK.',
      ),
    ),
);

export const approveWallSchema = z.object({
  userCode,
  name: text('The wall’s name', 40),
  diagonalInches: optionalQuantity({ name: 'Diagonal', unit: 'in', min: 10, max: 150 }),
  distanceMetres: optionalQuantity({ name: 'Distance', unit: 'm', min: 0.5, max: 50 }),
});
export type ApproveWallInput = z.infer<typeof approveWallSchema>;

export const wallTokenSchema = z.object({ deviceCode: z.string().check(z.minLength(20), z.maxLength(200)) });

export interface WallCodeDto {
  deviceCode: string;
  userCode: string;
  verificationUrl: string;
  verificationUrlComplete: string;
  expiresAt: Instant;
  intervalS: number;
}

/** RFC 8628 §3.5: answers while the code is not approved come as problems with these codes. */
export const wallPendingCodes = ['authorization_pending', 'slow_down', 'expired_token', 'access_denied'] as const;

export interface WallRequestDto {
  userCode: string;
  askedAt: Instant;
  expiresAt: Instant;
  device: string;
}

/** What a paired wall knows of itself. */
export interface WallMeDto {
  id: string;
  name: string;
  diagonalInches: number | null;
  distanceMetres: number | null;
  workshop: { id: string; name: string; zone: string };
}

export interface WallDto {
  id: string;
  name: string;
  diagonalInches: number | null;
  distanceMetres: number | null;
  approvedBy: string;
  createdAt: Instant;
  lastHeardAt: Instant | null;
}
