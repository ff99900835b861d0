import type { Role } from '@/shared/contract/roles';
import type { SignInInput } from '@/shared/contract/session';
import type { Deps } from '../deps';
import { demoWorkshopId } from '../demo/demo-workshop';
import { DomainError, forbidden, notFound } from '../errors/domain-error';
import { findFirstOfRole, findPerson, findPersonByEmail } from '../repositories/people.repository';
import { knownDevice, rememberDevice } from './device-cookie';
import { addressKey } from './limits';
import { openSession, type SignedIn } from './sessions.service';
import { mark } from './secrets';
import { inTransaction } from './unit-of-work';

/** What the request tells of the asking device. */
export interface AskingDevice {
  address: string | undefined;
  userAgent: string | undefined;
  deviceCookie: string | undefined;
}

export type SignedInHere = SignedIn & { deviceCookie: string };

/** Counts a try before the password is compared, so that many at once count as many. Gives how to undo it. */
async function countTry(deps: Deps, email: string, device: AskingDevice): Promise<() => Promise<void>> {
  const { limits, secrets } = deps;
  const account = mark(secrets.deviceKey, `tries ${email}`);
  const known = knownDevice(secrets, device.deviceCookie, email);
  if (known !== null) {
    // Nobody else's tries count against a device that has signed in here before.
    await limits.take('signInDevice', `${account} ${known}`);
    return () => limits.forget('signInDevice', `${account} ${known}`);
  }
  const address = addressKey(device.address);
  const pair = `${account} ${address}`;
  await limits.take('signInAddress', address);
  await limits.take('signInAccountAddress', pair);
  // An account under attack allows each address fewer tries, but never shares one allowance among all addresses:
  // whoever attacks from elsewhere cannot use up the owner's.
  if (await limits.spent('signInAccount', account)) await limits.take('signInAccountAddressUnderAttack', pair);
  await limits.count('signInAccount', account);
  return async () => {
    await limits.giveBack('signInAddress', address);
    await limits.giveBack('signInAccount', account);
    await limits.forget('signInAccountAddress', pair);
    await limits.forget('signInAccountAddressUnderAttack', pair);
  };
}

const wrongPair = () => new DomainError(401, 'wrong_sign_in', 'E-mail address and password do not belong together.');

/**
 * Signs in with address and password. The answer and the work are the same for an unknown address and a wrong password.
 * @throws DomainError 401 for the wrong pair, 403 for a disabled person (who knew the password), 429 when throttled
 */
export async function signIn(deps: Deps, input: SignInInput, device: AskingDevice, now: number): Promise<SignedInHere> {
  const forgive = await countTry(deps, input.email, device);
  const person = await findPersonByEmail(deps.dataSource.manager, input.email);
  const right = await deps.passwords.matches(input.password, person?.passwordHash ?? null);
  if (!person || !right) {
    deps.log.warn({ address: device.address }, 'sign-in refused');
    throw wrongPair();
  }
  await forgive();
  if (person.disabledAt !== null)
    throw forbidden('A manager of your workshop has switched your sign-in off. Ask them.');
  const signedIn = await inTransaction(deps, async (manager) => {
    // Comparing takes a third of a second: who changed the password meanwhile has ended the sessions of the old one.
    const present = await findPerson(manager, person.workshopId, person.id);
    if (present?.passwordHash !== person.passwordHash) throw wrongPair();
    return openSession(deps, manager, present, device.userAgent, now);
  });
  deps.log.info({ personId: person.id }, 'signed in');
  return withDevice(deps, signedIn, device);
}

/** Signs in to the demo workshop as the first person of a role. */
export async function demoSignIn(deps: Deps, role: Role, device: AskingDevice, now: number): Promise<SignedInHere> {
  const signedIn = await inTransaction(deps, async (manager) => {
    const person = await findFirstOfRole(manager, demoWorkshopId, role);
    if (!person) throw notFound('The demo workshop');
    return openSession(deps, manager, person, device.userAgent, now);
  });
  return withDevice(deps, signedIn, device);
}

/** Marks the device as one that has signed in to this account. */
export const withDevice = (deps: Deps, signedIn: SignedIn, device: AskingDevice): SignedInHere => ({
  ...signedIn,
  deviceCookie: rememberDevice(deps.secrets, device.deviceCookie, signedIn.session.person.email),
});
