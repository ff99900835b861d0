/** Where each person's alerts go, and what could not be brought to them. */
import * as z from 'zod/mini';
import { alertLevels, type AlertLevel } from './alert';
import { alertKinds, type AlertKind } from './alert-kinds';
import type { Instant, PersonRef } from './common';
import { timeOfDay } from './workshop';

/** 'app' is the sound of the open page; the list of alerts itself is there for everybody. */
export const alertWays = ['app', 'browser-push', 'phone-push', 'e-mail'] as const;
export type AlertWay = (typeof alertWays)[number];
/** The ways that go out of the house: an entry of the outbox each. */
export const sentWays = ['browser-push', 'phone-push', 'e-mail'] as const;
export type SentWay = (typeof sentWays)[number];

/** The levels at which each cause can come. */
const levelsOf: Record<AlertKind, readonly AlertLevel[]> = {
  'taper-begun': ['tell'],
  'charge-done': ['tell', 'amber'],
  rested: ['amber'],
  'check-due': ['amber'],
  overdue: ['alarm'],
  'latest-start-missed': ['amber'],
  'look-in-due': ['tell'],
  'look-in-missed': ['amber'],
  'no-reading': ['amber'],
  'step-swap': ['amber'],
  'odd-reading': ['alarm'],
  'no-current': ['alarm'],
  'too-warm': ['alarm'],
  'over-voltage': ['alarm'],
  'channel-fault': ['amber', 'alarm'],
  'wall-unseen': ['tell'],
};

export interface AlertCause {
  kind: AlertKind;
  level: AlertLevel;
}
/** Every cause with its level, in the order in which a charge meets them. */
export const alertCauses: readonly AlertCause[] = alertKinds.flatMap((kind) =>
  levelsOf[kind].map((level) => ({ kind, level })),
);

/** Raised only for whom has asked for it: nobody waits for it by default. */
export const askedForOnly: readonly AlertKind[] = ['taper-begun'];

/** Where an alert goes while its person has not said otherwise. */
export function defaultWays({ kind, level }: AlertCause): AlertWay[] {
  if (askedForOnly.includes(kind)) return [];
  return level === 'alarm' ? [...alertWays] : ['app', 'browser-push', 'phone-push'];
}

/** What a person has said of a cause; what was not said is as it is by default. */
export type AlertWishes = Partial<Record<string, AlertWay[]>>;
export const causeKey = ({ kind, level }: AlertCause): string => `${kind}:${level}`;
export const waysOf = (wishes: AlertWishes, cause: AlertCause): AlertWay[] =>
  wishes[causeKey(cause)] ?? defaultWays(cause);

/** Hours of the day in the workshop's zone; over midnight where `to` is the earlier. */
export interface QuietHours {
  from: string;
  to: string;
}

export interface PushDeviceDto {
  id: string;
  kind: 'browser' | 'phone';
  name: string;
  addedAt: Instant;
  /** It is the device that asks. */
  here: boolean;
}

export interface AlertSettingsDto {
  ways: (AlertCause & { ways: AlertWay[] })[];
  quiet: QuietHours | null;
  /** Alarms come in the quiet hours too. */
  alarmsBreakThrough: boolean;
  eMail: {
    /** Where letters go. */
    address: string;
    /** The server can send letters. */
    on: boolean;
  };
  devices: PushDeviceDto[];
}

export const changeAlertSettingsSchema = z.object({
  /** Only those that change. */
  ways: z.optional(
    z
      .array(
        z
          .object({
            kind: z.enum(alertKinds),
            level: z.enum(alertLevels),
            ways: z.array(z.enum(alertWays)).check(z.maxLength(alertWays.length)),
          })
          .check(
            z.refine(({ kind, level }) => levelsOf[kind].includes(level), {
              message: 'This cause does not come at this level.',
              path: ['level'],
            }),
          ),
      )
      .check(z.maxLength(alertCauses.length)),
  ),
  quiet: z.optional(
    z.nullable(
      z
        .object({ from: timeOfDay, to: timeOfDay })
        .check(
          z.refine(({ from, to }) => from !== to, { message: 'The quiet hours end as they begin.', path: ['to'] }),
        ),
    ),
  ),
  alarmsBreakThrough: z.optional(z.boolean()),
});
export type ChangeAlertSettingsInput = z.infer<typeof changeAlertSettingsSchema>;

const base64url = (name: string, bytes: number) =>
  z.string().check(
    z.regex(/^[A-Za-z0-9_-]+={0,2}$/, `${name} is not what a browser gives.`),
    z.refine(
      (value) => Math.floor((value.replace(/=+$/, '').length * 3) / 4) === bytes,
      `${name} is not what a browser gives.`,
    ),
  );

/** What a browser gives for its push service, or the token of a phone. */
export const pushDeviceSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('browser'),
    endpoint: z
      .string()
      .check(z.maxLength(1000), z.regex(/^https:\/\/[^\s@]+$/, 'This is no address of a push service.')),
    keys: z.object({ p256dh: base64url('Its key', 65), auth: base64url('Its secret', 16) }),
  }),
  z.object({
    kind: z.literal('phone'),
    token: z
      .string()
      .check(z.maxLength(200), z.regex(/^Expo(nent)?PushToken\[[^\]\s]+\]$/, 'This is no token of a phone.')),
  }),
]);
export type PushDeviceInput = z.infer<typeof pushDeviceSchema>;

/** The key by which a browser's push service knows this server. */
export interface PushKeyDto {
  key: string;
  /** In the demo: what the browser would have got from its maker's service. Null: it asks that one. */
  demo: { endpoint: string; keys: { p256dh: string; auth: string } } | null;
}

/** An alert that could not be brought to somebody: a manager decides. */
export interface UndeliveredDto {
  id: string;
  alert: { id: string; kind: AlertKind; level: AlertLevel; title: string };
  person: PersonRef;
  way: SentWay;
  tries: number;
  /** Why the last try failed. */
  reason: string;
  /** When it was given up. */
  at: Instant;
  /** Nobody has it yet and its cause is still there. */
  open: boolean;
}
