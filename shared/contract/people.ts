import * as z from 'zod/mini';
import { text, type Instant } from './common';
import { roles, type Role } from './roles';
import { email } from './session';

export const inviteSchema = z.object({ email, role: z.enum(roles) });
export type InviteInput = z.infer<typeof inviteSchema>;

export const changePersonSchema = z.object({
  name: z.optional(text('The name', 80)),
  role: z.optional(z.enum(roles)),
  disabled: z.optional(z.boolean()),
});
export type ChangePersonInput = z.infer<typeof changePersonSchema>;

export interface PersonDto {
  id: string;
  name: string;
  email: string;
  role: Role;
  disabled: boolean;
  lastSeenAt: Instant | null;
  rev: number;
}

export interface InvitationDto {
  id: string;
  email: string;
  role: Role;
  expiresAt: Instant;
  lapsed: boolean;
  invitedBy: string;
}

/** Shown once, to copy; only its hash is kept. */
export interface OneUseLinkDto {
  url: string;
  expiresAt: Instant;
}
