import type { ChargerDto } from '@/shared/contract/equipment';
import { channelForm, chargerForm } from './forms';
import type { TestAgent } from './server';

/** A charger that nothing is planned on, whose only channel is out of order; its texts hold `<name>’s`. */
export async function addBrokenChannel(
  technician: TestAgent,
  manager: TestAgent,
  name: string,
  meterId: string,
): Promise<string> {
  const form = chargerForm({
    ...{ name: `${name}’s broken charger`, place: `${name}’s bench`, meterId },
    channels: [channelForm({ name: `${name}’s 3` })],
  });
  const { body } = await manager.post('/api/chargers', form).expect(201);
  const [channel] = (body as ChargerDto).channels;
  if (!channel) throw new Error('The broken charger has no channel.');
  await technician.post(`/api/channels/${channel.id}/fault`, { seen: `${name}’s smoke` }).expect(200);
  return channel.id;
}
