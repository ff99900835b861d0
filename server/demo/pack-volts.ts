import { groupsAt, type PackInput } from '@/shared/contract/pack';
import { makeNoise } from './noise';

/** Scatter of the healthy groups of a used pack, mV. */
const SCATTER_MILLIVOLTS = 1.6;

/**
 * Believable voltages of all groups of a pack, to the millivolt: the healthy ones lie about the target, which is their median
 * exactly, and those of the failing module under it.
 * @param spread of the whole pack, V; left out: by the seed. As small as this, the module is exchanged and only behind.
 */
export function packVoltsOf(
  pack: PackInput,
  failing: string,
  targetVolts: number,
  seed: string,
  spread?: number,
): number[] {
  const noise = makeNoise([...seed].reduce((sum, letter) => sum * 31 + letter.charCodeAt(0), 11));
  const out = groupsAt(pack, failing);
  const healthy = Array.from({ length: pack.groupCount }, (_, group) => group).filter((group) => !out.includes(group));
  // Each deviation and its mirror: their median is the target itself. In an order of chance.
  const half = Array.from({ length: Math.floor(healthy.length / 2) }, () =>
    Math.round(SCATTER_MILLIVOLTS * noise.normal()),
  );
  const deviations = [...half, ...half.map((one) => -one), ...(healthy.length % 2 === 1 ? [0] : [])];
  const order = healthy
    .map((group) => ({ group, drawn: noise.share() }))
    .sort((one, other) => one.drawn - other.drawn)
    .map(({ group }) => group);
  const millivolts = new Map(order.map((group, place) => [group, deviations[place]!]));
  const highest = Math.max(...deviations);
  const lowest = spread === undefined ? Math.round(noise.between(-98, -72)) : highest - Math.round(spread * 1000);
  out.forEach((group, place) => {
    millivolts.set(group, place === 0 ? lowest : Math.round(lowest * noise.between(0.3, 0.6)));
  });
  return Array.from({ length: pack.groupCount }, (_, group) =>
    Number((targetVolts + (millivolts.get(group) ?? 0) / 1000).toFixed(3)),
  );
}
