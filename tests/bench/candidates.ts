import type { MeterDto, ModuleTypeDto, ChargerDto } from '@/shared/contract/equipment';
import type { CandidateDto } from '@/shared/contract/repair';
import { fileURLToPath } from 'node:url';
import { channelForm, chargerForm, moduleTypeForm, readingForm, spareForm } from '../support/forms';
import { packReadingForm, posted, repairForm } from '../support/repaired';
import { makeTestServer } from '../support/server';
import { created } from '../support/stocked';

const SPARES = 200;
/** Kinds of channel that a workshop has side by side: amps and volts. */
const kinds = [
  { amps: '10', volts: '60' },
  { amps: '20', volts: '30' },
  { amps: '40', volts: '15' },
];

/**
 * The list of spares for a target, over the API: 200 of one type on three kinds of channel, no two of them alike, which is
 * the most there is to reckon; then as a shelf is, kept at one voltage. The first call is the first
 * thing this process reckons.
 */
export async function benchCandidates(): Promise<string[]> {
  const lines: string[] = [];
  for (const groups of [2, 12]) {
    const server = await makeTestServer();
    try {
      lines.push(...(await measured(server, groups)));
    } finally {
      await server.close();
    }
  }
  return lines;
}

async function measured(server: Awaited<ReturnType<typeof makeTestServer>>, groups: number): Promise<string[]> {
  const [manager, technician] = [server.agentFor('manager'), server.agentFor('technician')];
  const meter = await created<MeterDto>(manager, '/api/meters', {
    name: 'Hand 1',
    offsetMillivolts: '0',
    checkedAt: null,
  });
  const type = await created<ModuleTypeDto>(
    manager,
    '/api/module-types',
    moduleTypeForm({ groupsInSeries: String(groups) }),
  );
  await created<ChargerDto>(
    manager,
    '/api/chargers',
    chargerForm({
      channels: kinds.map(({ amps, volts }, place) =>
        channelForm({ name: `C${place}`, maxAmps: amps, maxVolts: volts }),
      ),
    }),
  );
  for (let place = 0; place < SPARES; place += 1) {
    const groupVolts = Array.from({ length: groups }, (_, group) =>
      (3.55 + place * 0.0017 + group * 0.0004).toFixed(4),
    );
    await created(technician, '/api/spares', {
      ...spareForm(type.id, { label: `S-${place}`, capacityAh: String(58 + (place % 40) / 10) }),
      reading: readingForm({ groupVolts, meterId: meter.id }),
    });
  }
  const pack = {
    moduleTypeId: type.id,
    groupCount: String(groups * 8),
    groupsPerModule: String(groups),
    positionOfGroup: null,
  };
  const booked = await posted(technician, '/api/repairs', repairForm(type.id, { pack }));
  const groupVolts = Array.from({ length: groups * 8 }, (_, group) =>
    group === 0 ? '3.871' : `${3.967 + (group % 3) / 1000}`,
  );
  await posted(
    technician,
    `/api/repairs/${booked.id}/readings`,
    packReadingForm({ groupVolts, packVolts: '', meterId: meter.id }),
  );
  /** Milliseconds by the clock, and of the processor, which other work on the machine does not disturb. */
  const call = async (): Promise<[number, number]> => {
    const start = performance.now();
    const used = process.cpuUsage();
    const { body } = await technician.get(`/api/repairs/${booked.id}/candidates`);
    const { user, system } = process.cpuUsage(used);
    const ms = performance.now() - start;
    if ((body as CandidateDto[]).filter(({ ruledOut }) => !ruledOut).length !== SPARES)
      throw new Error('Not all are reckoned.');
    return [ms, (user + system) / 1000];
  };
  const text = ([ms, cpu]: [number, number]) => `${ms.toFixed(0)} ms (${cpu.toFixed(0)} of processor)`;
  const first = await call();
  const later = [await call(), await call(), await call()].sort(([one], [other]) => one - other);
  return [
    `${SPARES} spares of ${groups} groups for a target, none alike: the first call ${text(first)}, later ${text(later[0]!)}`,
  ];
}

if (process.argv[1] === fileURLToPath(import.meta.url)) for (const line of await benchCandidates()) console.log(line);
