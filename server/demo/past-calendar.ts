/** Which charges eight weeks asked for: days, types, channels, people; the channels one after the other. */
import { DateTime } from 'luxon';
import type { Finish, Way } from '@/calc/plan-types';
import type { DemoType } from './equipment';
import { shown, type Noise } from './noise';
import type { DemoName } from './people';

const MINUTE = 60_000;
const WEEKS = 8;

export interface AskedCharge {
  askedAt: number;
  type: DemoType;
  by: DemoName;
  target: number;
  groupVolts: number[];
  capacityAh: number;
  /** Ways to try, the preferred first. */
  ways: { way: Way; finish: Finish; channel: string }[];
}

const technicians: DemoName[] = ['ines', 'bram', 'suri', 'marek'];

/** How often each type is asked for, with its own volts and ampere-hours. */
const types: {
  type: DemoType;
  share: number;
  groups: number;
  from: number;
  to: [number, number];
  ah: [number, number];
}[] = [
  { type: 'two', share: 0.44, groups: 2, from: 3.6, to: [3.87, 3.985], ah: [57.5, 62.5] },
  { type: 'three', share: 0.25, groups: 3, from: 3.6, to: [3.84, 3.93], ah: [70, 75.5] },
  { type: 'six', share: 0.21, groups: 6, from: 3.6, to: [3.84, 3.96], ah: [46, 49.5] },
  { type: 'flat', share: 0.1, groups: 4, from: 3.25, to: [3.288, 3.304], ah: [95, 100] },
];

/** The working days from the Monday eight weeks before this week's until yesterday, as their midnights. */
export function workingDays(now: number, zone: string): DateTime[] {
  const today = DateTime.fromMillis(now, { zone }).startOf('day');
  const days: DateTime[] = [];
  for (let day = today.startOf('week').minus({ weeks: WEEKS }); day < today; day = day.plus({ days: 1 }))
    if (day.weekday <= 5) days.push(day);
  return days;
}

/** Five or six a day, the most on Tuesday and Thursday, in the order in which they were asked for. */
export function askedOn(day: DateTime, noise: Noise): AskedCharge[] {
  const many = day.weekday === 2 || day.weekday === 4 ? 7 : 5;
  const count = many + (noise.chance(0.5) ? 0 : -1);
  return Array.from({ length: count }, () => asked(day, noise)).sort((one, other) => one.askedAt - other.askedAt);
}

function asked(day: DateTime, noise: Noise): AskedCharge {
  const askedAt = day.set({ hour: 7, minute: 35 }).toMillis() + Math.round(noise.between(0, 200)) * MINUTE;
  const drawn = noise.share();
  let below = 0;
  const type = types.find(({ share }) => drawn < (below += share)) ?? types[0]!;
  const down = type.type === 'six' && noise.chance(0.2);
  const target = shown(noise.between(...type.to), 3);
  const from = down ? target + noise.between(0.06, 0.12) : type.from + noise.between(-0.02, 0.03);
  return {
    askedAt,
    type: type.type,
    by: noise.pick(technicians),
    target,
    groupVolts: Array.from({ length: type.groups }, () => shown(from + 0.0007 * noise.normal(), 3)),
    capacityAh: shown(noise.between(...type.ah), 1),
    ways: down ? [{ way: 'terminals', finish: 'over-and-settle', channel: 'C2' }] : waysOf(type.type, noise),
  };
}

function waysOf(type: DemoType, noise: Noise): AskedCharge['ways'] {
  const finish: Finish = type === 'flat' || noise.chance(0.6) ? 'over-and-settle' : 'on-the-mark';
  const small = noise.chance(0.5) ? ['A1', 'A2'] : ['A2', 'A1'];
  const tall = noise.chance(0.5) ? ['B1', 'B2'] : ['B2', 'B1'];
  const channels = {
    two: [...tall, ...small],
    three: [...tall, ...small],
    six: [...tall, 'C2'],
    flat: tall,
  }[type];
  const through = channels.map((channel) => ({ way: 'terminals' as const, finish, channel }));
  const joined = { way: 'paralleled' as const, finish: 'over-and-settle' as const, channel: 'C1' };
  return type === 'two' && noise.chance(0.2) ? [joined, ...through] : through;
}
