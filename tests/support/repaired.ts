/** Repairs of a furnished workshop, made over the API: one whose sources disagree, one that waits, one over, one deleted. */
import type { PackTypeDto } from '@/shared/contract/pack';
import type { RepairPageDto } from '@/shared/contract/repair';
import { twoHalves } from './pictures';
import type { TestAgent } from './server';

export interface Repaired {
  packTypeId: string;
  /** Read, with a second source that disagrees and waits for a decision. */
  repairId: string;
  repairRev: number;
  packReadingId: string;
  sourceId: string;
  /** Its target is taken and a spare reserved: it waits. */
  waitingRepairId: string;
  waitingRev: number;
  waitingReadingId: string;
  waitId: string;
  /** Of the first one. */
  photoId: string;
  /** Advised with the repair that waits. */
  advisedId: string;
  handedOverId: string;
  deletedId: string;
}

/** Eight groups in four modules of two; module 2 fails. */
export const packForm = (moduleTypeId: string | null, change: object = {}) => ({
  moduleTypeId,
  groupCount: '8',
  groupsPerModule: '2',
  positionOfGroup: null,
  ...change,
});
export const packVolts = [3.968, 3.969, 3.871, 3.934, 3.967, 3.968, 3.97, 3.968];

export const repairForm = (moduleTypeId: string | null, change: object = {}) => ({
  vehicle: 'Grey van',
  packTypeId: null,
  pack: packForm(moduleTypeId),
  customerName: 'Quay Bakery',
  customerContact: 'desk@quay.example.com',
  promisedAt: null,
  bay: 'bay 3',
  personIds: [],
  note: null,
  ...change,
});

export const packReadingForm = (change: object = {}) => ({
  stage: 'arrival',
  balanceCount: null,
  groupVolts: packVolts.map((volts) => `${volts} V`),
  packVolts: '31,5',
  celsius: '21',
  restedMinutes: '600',
  meterId: null,
  instrument: '',
  source: 'file',
  fileName: 'pack.csv',
  note: '',
  ...change,
});

export const secondSourceForm = (readingId: string, change: object = {}) => ({
  readingId,
  modulePosition: '2',
  groupVolts: ['3.872', '3.935'],
  healthyGroup: { group: 0, volts: '3.969' },
  meterId: null,
  pointsTo: null,
  ...change,
});

export const advisedForm = (change: object = {}) => ({
  text: 'Coolant of the pack',
  outcome: 'open',
  detail: '',
  agreedBy: '',
  ...change,
});

let keys = 0;
const newKey = (): string => `repairing-key-${(keys += 1)}`;

/** Posts with a key of its own and gives the page back; fails with the problem where it is not taken. */
export async function posted(agent: TestAgent, path: string, body: object): Promise<RepairPageDto> {
  const answer = await agent.post(path, body).set('Idempotency-Key', newKey());
  if (!answer.ok) throw new Error(`${path} answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  return answer.body as RepairPageDto;
}

/** One repair in each state that a route asks for. Texts hold the workshop's name, so that a leak shows. */
export async function addRepairs(
  agents: { technician: TestAgent; manager: TestAgent },
  workshop: { name: string; typeId: string; meterId: string; personId: string; spareId: string },
): Promise<Repaired> {
  const { technician, manager } = agents;
  const { name, typeId, meterId, personId, spareId } = workshop;
  const made = await manager.post('/api/pack-types', { name: `${name}’s pack`, pack: packForm(typeId), note: null });
  const { id: packTypeId } = made.body as PackTypeDto;
  const book = (change: object = {}) =>
    posted(technician, '/api/repairs', repairForm(typeId, { vehicle: `${name}’s van`, packTypeId, ...change }));
  const read = async (repair: RepairPageDto) =>
    posted(technician, `/api/repairs/${repair.id}/readings`, packReadingForm({ meterId }));

  const first = await read(await book({ personIds: [personId] }));
  const packReadingId = first.readings[0]!.id;
  const jpeg = await twoHalves(40, 20).jpeg().toBuffer();
  const uploaded = await technician
    .upload(`/api/repairs/${first.id}/photos`, 'photo', jpeg, 'photo.jpg')
    .set('Idempotency-Key', newKey());
  const disagreeing = await posted(
    technician,
    `/api/repairs/${first.id}/second-source`,
    secondSourceForm(packReadingId, { pointsTo: '3' }),
  );
  const second = await read(await book());
  const waitingReadingId = second.readings[0]!.id;
  await posted(technician, `/api/repairs/${second.id}/target`, {
    readingId: waitingReadingId,
    volts: null,
    toleranceMillivolts: '5',
    reason: null,
  });
  await posted(technician, `/api/repairs/${second.id}/spare`, { spareId });
  const waiting = await posted(
    technician,
    `/api/repairs/${second.id}/advised`,
    advisedForm({ text: `${name}’s advice` }),
  );
  const third = await book();
  await posted(technician, `/api/repairs/${third.id}/hand-over`, { note: `${name}’s customer took it along` });
  const fourth = await book();
  await posted(manager, `/api/repairs/${fourth.id}/delete`, { reason: `${name}’s mistake` });
  return {
    packTypeId,
    repairId: first.id,
    repairRev: disagreeing.rev,
    packReadingId,
    sourceId: disagreeing.sources[0]!.id,
    waitingRepairId: second.id,
    waitingRev: waiting.rev,
    waitingReadingId,
    waitId: waiting.wait[0]!.id,
    photoId: (uploaded.body as RepairPageDto).photos[0]!.id,
    advisedId: waiting.advised[0]!.id,
    handedOverId: third.id,
    deletedId: fourth.id,
  };
}
