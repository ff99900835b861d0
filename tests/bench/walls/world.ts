/** A data folder with a busy workshop: one charge begun over the API, its rows copied to as many as are asked for, and walls. */
import fs from 'node:fs';
import path from 'node:path';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { databaseFile } from '@/server/data-files';
import { Wall } from '@/server/entities/wall';
import { hashToken } from '@/server/services/tokens';
import { channelForm, chargerForm, moduleTypeForm, planForm, readingForm, spareForm } from '@/tests/support/forms';
import { makeTestServer, type TestServer } from '@/tests/support/server';
import { created } from '@/tests/support/stocked';

export const workshopId = 'workshop-own';
export const technician = { personId: 'own-technician', workshopId, sessionId: 'session-own-technician' };
/** Cookie of the wall with this number. */
export const wallCookie = (number: number): string => `bidewell_wall=${wallToken(number)}`;
const wallToken = (number: number): string => `token-of-the-wall-number-${number}`;

interface Original {
  chargeId: string;
  spareId: string;
  channelId: string;
  number: string;
}

/**
 * Writes the folder.
 * @param now epoch ms at which the charges were clipped on
 * @returns ids of the charges that run
 */
export async function fillFolder(folder: string, charges: number, walls: number, now: number): Promise<string[]> {
  const server = await makeTestServer({ now });
  try {
    const original = await beginCharge(server);
    const ids = [original.chargeId];
    for (let copy = 2; copy <= charges; copy += 1) ids.push(await copyCharge(server, original, copy));
    for (let number = 1; number <= walls; number += 1)
      await server.deps.dataSource.manager.insert(Wall, wall(number, now));
    fs.mkdirSync(path.dirname(databaseFile(folder)), { recursive: true });
    await server.deps.dataSource.query(`VACUUM INTO '${databaseFile(folder)}'`);
    return ids;
  } finally {
    await server.close();
  }
}

const wall = (number: number, now: number): Wall => ({
  ...{ id: `wall-${number}`, workshopId, name: `Wall ${number}`, tokenHash: hashToken(wallToken(number)) },
  ...{ diagonalInches: 55, distanceMetres: 7, approvedById: 'own-foreman' },
  ...{ createdAt: now, lastHeardAt: now, revokedAt: null },
});

async function beginCharge(server: TestServer): Promise<Original> {
  const [manager, hands] = [server.agentFor('manager'), server.agentFor('technician')];
  let keys = 0;
  const post = async <Dto>(address: string, body: object, headers: Record<string, string> = {}): Promise<Dto> => {
    const answer = await hands
      .post(address, body)
      .set({ 'Idempotency-Key': `walls-key-${(keys += 1)}-abcd`, ...headers });
    if (!answer.ok) throw new Error(`${address}: ${answer.status} ${JSON.stringify(answer.body)}`);
    return answer.body as Dto;
  };
  const type = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm());
  const channels = [channelForm({ name: '1' })];
  const charger = await created<ChargerDto>(manager, '/api/chargers', chargerForm({ channels }));
  const reading = readingForm();
  const spare = await created<SpareDto>(hands, '/api/spares', { ...spareForm(type.id, { label: 'S-1' }), reading });
  const wish = { ...planForm(spare.id), readyBy: null, clipOnAt: null };
  const { plan } = await post<PlanDto>('/api/plans', wish);
  let charge = await post<ChargeDto>('/api/charges', { ...wish, optionId: plan.options[0]!.id });
  for (const { code, by } of charge.checks)
    if (by === 'person') charge = await post(`/api/charges/${charge.id}/checks`, { code, answer: 'yes' });
  server.clock.advance(1000);
  charge = await post(`/api/charges/${charge.id}/start`, {}, { 'If-Match': `"${charge.rev}"` });
  const { id: chargeId, number } = charge;
  return { chargeId, number, spareId: spare.id, channelId: charger.channels[0]!.id };
}

/** Tables whose rows make a charge, its spare and its channel; those that are named by others first. */
const tables: [table: string, column: string, of: 'spareId' | 'channelId' | 'chargeId'][] = [
  ['channel', 'id', 'channelId'],
  ['spare', 'id', 'spareId'],
  ['spare_reading', 'spare_id', 'spareId'],
  ['charge', 'id', 'chargeId'],
  ['check_answer', 'charge_id', 'chargeId'],
  ['charge_event', 'charge_id', 'chargeId'],
  ['channel_hold', 'charge_id', 'chargeId'],
  ['run_stretch', 'charge_id', 'chargeId'],
  ['look_in', 'charge_id', 'chargeId'],
];

async function copyCharge(server: TestServer, original: Original, copy: number): Promise<string> {
  const { dataSource } = server.deps;
  const named = (text: string): string =>
    [original.chargeId, original.spareId, original.channelId].reduce(
      (changed, id) => changed.replaceAll(id, `${id}-${copy}`),
      text,
    );
  for (const [table, column, of] of tables) {
    const rows = (await dataSource.query(`SELECT * FROM ${table} WHERE ${column} = ?`, [original[of]])) as Record<
      string,
      unknown
    >[];
    for (const row of rows) {
      const changed = Object.fromEntries(
        Object.entries(row).map(([name, value]) => [name, typeof value === 'string' ? named(value) : value]),
      );
      if (column !== 'id') changed.id = `${String(row.id)}-${copy}`;
      if (table === 'charge') changed.number = `${original.number}-${copy}`;
      if (table === 'charge') changed.repair_ref = `R-${3000 + copy}`;
      if (table === 'spare') changed.label = `S-${copy}`;
      if (table === 'channel') changed.name = String(copy);
      const names = Object.keys(changed);
      await dataSource.query(
        `INSERT INTO ${table} (${names.map((name) => `"${name}"`).join(',')}) VALUES (${names.map(() => '?').join(',')})`,
        Object.values(changed),
      );
    }
  }
  return `${original.chargeId}-${copy}`;
}
