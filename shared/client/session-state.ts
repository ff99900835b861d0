/** What survives a reload of a session that the script cannot read itself (its cookies are httpOnly). */
import { externalStore } from './external-store';
import { recall, remember, storagePrefix } from './storage';

const signedIn = 'signed-in';
export const signedInKey = storagePrefix + signedIn;

export type EndedReason = 'expired' | 'disabled' | 'sign-out' | 'role-changed' | 'revoked';

/** Why the last session ended; null while one is on, and after signing out here. */
export const endedStore = externalStore<EndedReason | null>(null);

/** Somebody has signed in in this browser and not signed out since. */
export const signedInBefore = (): boolean => recall(signedIn) !== null;
/** Their id; null: nobody. */
export const signedInPerson = (): string | null => recall(signedIn);
/** Who it is; null: nobody any more. Other tabs hear of it. */
export const rememberSignedIn = (personId: string | null): void => remember(signedIn, personId);

/** Where a person was when the session ended, to go on there after signing in; within this site only. */
export const returnTo = {
  keep: (path: string): void => {
    if (path.startsWith('/') && !path.startsWith('//')) remember('return-to', path, 'session');
  },
  take: (): string | null => {
    const path = recall('return-to', 'session');
    remember('return-to', null, 'session');
    return path;
  },
};

/** Why one has to sign in again, in a sentence. */
export const endedSentence = (reason: EndedReason): string =>
  ({
    expired: 'Your session has ended. Sign in again; what you typed is kept.',
    disabled: 'A manager has switched this access off. Ask a manager of your workshop.',
    'sign-out': 'You were signed out from another device. What you typed is kept.',
    'role-changed': 'Your role was changed. Sign in again; what you typed is kept.',
    revoked: 'This session was ended, as after a new password. Sign in again; what you typed is kept.',
  })[reason];

/** The address last typed on this device, so that signing in again needs the password only. */
export const lastEmail = {
  get: (): string => recall('email') ?? '',
  set: (email: string): void => remember('email', email),
};
