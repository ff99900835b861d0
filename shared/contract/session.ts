import * as z from 'zod/mini';
import { text, type Instant } from './common';
import { roles, type Capability, type Role } from './roles';

export const email = z
  .string()
  .check(
    z.trim(),
    z.toLowerCase(),
    z.regex(/^[^\s@]+@[^\s@]+\.[^\s@]+$/, 'This is no e-mail address. Type it like name@example.com.'),
    z.maxLength(254, 'This e-mail address is too long.'),
  );

/** Bytes of a text in UTF-8; this floor has no TextEncoder. */
const utf8Length = (text: string): number =>
  [...text].reduce((bytes, character) => {
    const point = character.codePointAt(0) ?? 0;
    return bytes + (point < 0x80 ? 1 : point < 0x800 ? 2 : point < 0x10000 ? 3 : 4);
  }, 0);

/** Passwords are taken as they are typed; bcrypt reads 72 bytes, so longer ones are refused and not cut. */
export const newPassword = z.string().check(
  z.refine((value) => [...value].length >= 12, 'At least 12 characters; 15 or more is better.'),
  z.refine((value) => utf8Length(value.normalize('NFKC')) <= 72, 'Longer than 72 bytes. Use a shorter one.'),
);

export const signInSchema = z.object({
  email,
  password: z.string().check(z.minLength(1, 'Type your password.'), z.maxLength(1000, 'This password is too long.')),
});
export type SignInInput = z.infer<typeof signInSchema>;

export const zone = z.string().check(
  z.refine((value) => {
    try {
      new Intl.DateTimeFormat('en', { timeZone: value });
      return value.length > 0;
    } catch {
      return false;
    }
  }, 'This time zone is not known. Choose one like Europe/Berlin.'),
);

export const createWorkshopSchema = z.object({
  workshopName: text('The workshop’s name', 80),
  zone,
  name: text('Your name', 80),
  email,
  password: newPassword,
});
export type CreateWorkshopInput = z.infer<typeof createWorkshopSchema>;

/** Joining by an invitation and setting a new password by a reset link share a page and a one-use token. */
export const joinSchema = z.object({ token: z.string(), name: text('Your name', 80), password: newPassword });
export const resetSchema = z.object({ token: z.string(), password: newPassword });

/** One's own name, and a new password against the present one. */
export const changeMeSchema = z
  .object({
    name: z.optional(text('Your name', 80)),
    currentPassword: z.optional(z.string().check(z.maxLength(1000, 'This password is too long.'))),
    password: z.optional(newPassword),
  })
  .check(
    z.refine((me) => me.password === undefined || Boolean(me.currentPassword), {
      message: 'Type your present password too.',
      path: ['currentPassword'],
    }),
  );
export type ChangeMeInput = z.infer<typeof changeMeSchema>;

export const demoSignInSchema = z.object({ role: z.enum(roles) });

export interface SessionDto {
  person: { id: string; name: string; email: string; role: Role };
  workshop: { id: string; name: string; zone: string };
  capabilities: readonly Capability[];
  /** Ends by itself then, whatever is done. */
  expiresAt: Instant;
}

/** What the sign-in page needs to know of this installation. */
export interface FrontDoorDto {
  /** Each role signs in by one tap. */
  demo: boolean;
  /** No workshop yet: offer to create the first. */
  empty: boolean;
  workshopName: string | null;
  version: string;
}

/** What a link of an invitation or a reset is for, before it is used. */
export interface LinkDto {
  kind: 'join' | 'reset';
  workshopName: string;
  email: string;
  role: Role;
  expiresAt: Instant;
}

export interface ActiveSessionDto {
  id: string;
  current: boolean;
  device: string;
  lastUsedAt: Instant;
  createdAt: Instant;
}
