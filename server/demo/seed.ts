/**
 * The demo: an invented workshop with people of each role, equipment, spares, eight weeks of charges that are over and
 * an open one in every stage around now. Written once, into an empty database.
 */
import fs from 'node:fs';
import path from 'node:path';
import { randomBytes } from 'node:crypto';
import type { Deps } from '../deps';
import { entities } from '../entities/all';
import { Meter } from '../entities/meter';
import { Person } from '../entities/person';
import { Workshop } from '../entities/workshop';
import { countWorkshops } from '../repositories/workshops.repository';
import { invite } from '../services/invitations.service';
import { inTransaction } from '../services/unit-of-work';
import { defaultSettings } from '../services/workshop-defaults';
import { writeCrew } from './crew';
import { demoWorkshopId } from './demo-workshop';
import { writeEquipment } from './equipment';
import { demoHours, demoZone } from './hours';
import { liveOpenCharges } from './open-charges';
import { writePast } from './past';
import { livePastWork } from './past-work';
import { liveOtherWork } from './other-work';
import { demoPeople, invitedEmail, memberOf, type DemoPerson } from './people';
import { bookUnread, letSourcesDisagree, proveOne, writePackTypes } from './repairs';
import { writeStock } from './stock';
import { pairWall } from './wall';

const MINUTE = 60_000;
const DAY = 86_400_000;
/** Before the eight weeks of charges. */
const SET_UP_DAYS_AGO = 120;

export const passwordsFile = (dataDir: string): string => path.join(dataDir, 'demo-passwords.txt');

/** Revision of a workshop that is being seeded; a seeding that was cut off is begun anew. */
const UNFINISHED = 0;

/**
 * Fills an empty database with the demo workshop, and completes one that was cut off. Any other database is left alone.
 */
export async function seedDemo(deps: Deps): Promise<void> {
  const { manager } = deps.dataSource;
  const begun = await manager.findOneBy(Workshop, { id: demoWorkshopId });
  if (begun === null ? (await countWorkshops(manager)) > 0 : begun.rev !== UNFINISHED) return;
  if (begun !== null) await removeDemo(deps);
  const startedAt = deps.clock.now();
  deps.log.info('making the demo workshop; this takes some seconds');
  const quiet: Deps = {
    ...deps,
    hub: { toWorkshop: () => {}, toPerson: () => {}, connected: () => 0, end: () => {} },
    sleeper: { poke: () => {} },
    outbox: { ...deps.outbox, poke: () => {} },
  };
  try {
    // Hundreds of small commits, none of which is worth waiting for the disk: a seeding that is cut off is begun anew.
    await deps.dataSource.query('PRAGMA synchronous = NORMAL');
    await writeDemo(quiet, startedAt);
  } catch (error) {
    await removeDemo(deps);
    throw error;
  } finally {
    await deps.dataSource.query('PRAGMA synchronous = FULL');
  }
  deps.log.info({ ms: deps.clock.now() - startedAt, passwords: passwordsFile(deps.config.dataDir) }, 'demo seeded');
}

async function writeDemo(deps: Deps, now: number): Promise<void> {
  const zone = demoZone();
  const setUpAt = now - SET_UP_DAYS_AGO * DAY;
  const workshop: Workshop = {
    ...defaultSettings('Harbour Lane Traction', zone),
    workingHours: demoHours(now, zone),
    id: demoWorkshopId,
    boardRev: 1,
    chargeCount: 0,
    rev: UNFINISHED,
    createdAt: setUpAt,
  };
  await deps.dataSource.manager.insert(Workshop, workshop);
  // Hashing takes its seconds in other threads; the charges of eight weeks are made meanwhile.
  const hashes = hashPasswords(deps);
  // Where the rest fails first, the start fails with that, and not with the hashing that is given up.
  hashes.catch(() => undefined);
  const people = await insertPeople(deps, now, setUpAt);
  const count = await inTransaction(deps, async (manager) => {
    const equipment = await writeEquipment(manager, now, setUpAt);
    await writeStock(manager, now, setUpAt);
    await writePackTypes(manager, setUpAt);
    const made = await writePast(manager, { workshop, equipment }, now);
    await manager.update(Workshop, { id: demoWorkshopId }, { chargeCount: made });
    return made;
  });
  const crew = await writeCrew(deps, zone, now, setUpAt);
  await livePastWork(deps, zone);
  await proveOne(deps, now);
  await liveOpenCharges(deps, now);
  await letSourcesDisagree(deps, now);
  await bookUnread(deps, now);
  await liveOtherWork(deps, crew, zone, now);
  await invite(
    deps,
    memberOf('petra'),
    { email: invitedEmail, role: 'technician', baseUrl: 'http://localhost' },
    now - 26 * 60 * MINUTE,
  );
  await pairWall(deps, now);
  await setPasswords(deps, await hashes);
  await deps.dataSource.manager.update(Workshop, { id: demoWorkshopId }, { rev: 1 });
  deps.log.debug({ people, charges: count }, 'demo written');
}

interface Password {
  person: DemoPerson;
  password: string;
  hash: string;
}

/** Nobody can sign in with this: the hash of a password is put in its place before the seeding is done. */
const NO_PASSWORD = '-';

async function insertPeople(deps: Deps, now: number, setUpAt: number): Promise<number> {
  const people = Object.values(demoPeople).map(({ id, name, email, role, seenMin }, place): Person => ({
    id,
    workshopId: demoWorkshopId,
    name,
    email,
    passwordHash: NO_PASSWORD,
    role,
    disabledAt: null,
    lastSeenAt: now - seenMin * MINUTE,
    rev: 1,
    createdAt: setUpAt + place * MINUTE,
  }));
  await deps.dataSource.manager.insert(Person, people);
  return people.length;
}

const hashPasswords = (deps: Deps): Promise<Password[]> =>
  Promise.all(
    Object.values(demoPeople).map(async (person) => {
      const password = randomBytes(12).toString('base64url');
      return { person, password, hash: await deps.passwords.hash(password) };
    }),
  );

async function setPasswords(deps: Deps, passwords: readonly Password[]): Promise<void> {
  for (const { person, hash } of passwords)
    await deps.dataSource.manager.update(Person, { id: person.id }, { passwordHash: hash });
  const lines = passwords.map(({ person, password }) => `${person.email}  ${password}  (${person.role})`);
  const text = `Sign-in of the demo workshop, made for this data folder.\n\n${lines.join('\n')}\n`;
  fs.writeFileSync(passwordsFile(deps.config.dataDir), text, { mode: 0o600 });
}

/** Takes away what a seeding that failed has left. */
async function removeDemo(deps: Deps): Promise<void> {
  await inTransaction(deps, async (manager) => {
    // Chargers name meters, and all rows name people: these go last.
    const last = [Meter, Person, Workshop];
    const first = [...entities].reverse().filter((entity) => !last.some((one) => one === entity));
    for (const entity of [...first, ...last])
      await manager.delete(entity, entity === Workshop ? { id: demoWorkshopId } : { workshopId: demoWorkshopId });
  });
}
