import { startOutside, type Outside } from '@/server/demo/outside/outside';
import { makeTestClock } from './server';

/** The services of the demo, closed, which have taken a letter of each of the two furnished workshops. */
export async function outsideOfBoth(): Promise<Outside> {
  const outside = await startOutside(Buffer.alloc(32, 1), makeTestClock());
  await outside.close();
  const sent = ['own', 'other'].map((name, place) => ({
    ...{ number: place + 1, at: 0, way: 'e-mail' as const, to: `${name}-technician@example.com`, turn: 0 },
    ...{ alertId: `${name}-alert`, title: `${name}’s look-in`, text: `${name}’s clips`, html: null },
  }));
  return { ...outside, sent };
}
