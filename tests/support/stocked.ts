/** A workshop of the test server with what plans need: a type, two chargers, meters and a spare, made over the API. */
import type { ChargerDto, MeterDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import { chargerForm, channelForm, moduleTypeForm, readingForm, spareForm } from './forms';
import type { TestAgent } from './server';

export interface Stocked {
  type: ModuleTypeDto;
  meter: MeterDto;
  /** B: 20 A, 30 V. */
  charger: ChargerDto;
  spare: SpareDto;
}

/** Posts and gives the body back; fails with the problem where it is not created. */
export async function created<Dto>(agent: TestAgent, path: string, body: object): Promise<Dto> {
  const answer = await agent.post(path, body);
  if (answer.status !== 201) throw new Error(`${path} answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  return answer.body as Dto;
}

export async function stock(manager: TestAgent, change: { checkedAt?: string } = {}): Promise<Stocked> {
  const meter = await created<MeterDto>(manager, '/api/meters', {
    name: 'Hand meter 1',
    offsetMillivolts: '0',
    checkedAt: change.checkedAt ?? '2026-05-12T08:00:00Z',
  });
  const type = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm());
  const charger = await created<ChargerDto>(
    manager,
    '/api/chargers',
    chargerForm({ meterId: meter.id, channels: [channelForm({ displayStepMillivolts: '1' })] }),
  );
  const spare = await created<SpareDto>(manager, '/api/spares', {
    ...spareForm(type.id),
    reading: readingForm({ meterId: meter.id }),
  });
  return { type, meter, charger, spare };
}
