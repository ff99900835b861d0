/** Who is there when in the demo, what its people can do, and where. */
import { DateTime } from 'luxon';
import type { PlaceKind, StaffingInput } from '@/shared/contract/staffing';
import type { Deps } from '../deps';
import { addPlace } from '../services/places.service';
import { addSkill } from '../services/skills.service';
import { changeStaffing } from '../services/staffing.service';
import { demoPeople, memberOf, type DemoName } from './people';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const by = memberOf('petra');

const skills = {
  highVoltage: 'High voltage',
  brakes: 'Brakes',
  cooling: 'Air conditioning',
  wheels: 'Wheels and tyres',
} as const;
export type DemoSkill = keyof typeof skills;

const places = {
  bay1: ['Bay 1', 'bay'],
  bay2: ['Bay 2', 'bay'],
  bay3: ['Bay 3', 'bay'],
  bay4: ['Bay 4', 'bay'],
  bench1: ['Bench 1', 'bench'],
  bench2: ['Bench 2', 'bench'],
} as const satisfies Record<string, [string, PlaceKind]>;
export type DemoPlace = keyof typeof places;

const held: Record<Exclude<DemoName, 'petra'>, DemoSkill[]> = {
  hella: ['highVoltage', 'brakes'],
  ines: ['highVoltage', 'brakes', 'wheels'],
  bram: ['highVoltage', 'cooling', 'wheels'],
  suri: ['highVoltage', 'wheels'],
  marek: ['highVoltage', 'brakes', 'cooling'],
};

type Breaks = StaffingInput['breaks'];
const usualBreaks: Breaks = [
  { from: '09:45', to: '10:00' },
  { from: '12:30', to: '13:00' },
];

/** The usual breaks. One within an hour of the seeding is taken later, so that people are at work when the demo opens. */
export function demoBreaks(now: number, zone: string): Breaks {
  const at = DateTime.fromMillis(now, { zone });
  const clock = (time: DateTime): string => time.toFormat('HH:mm');
  const later = at.plus({ minutes: 75 - (at.minute % 5) });
  const on = (time: string): DateTime => {
    const [hour, minute] = time.split(':').map(Number);
    return at.set({ hour, minute, second: 0, millisecond: 0 });
  };
  return usualBreaks.map(({ from, to }) => {
    const [begin, end] = [on(from), on(to)];
    if (end.toMillis() < now - HOUR || begin.toMillis() > now + HOUR) return { from, to };
    return { from: clock(later), to: clock(later.plus(end.diff(begin))) };
  });
}

/** Ids by the names of this file. */
export interface DemoCrew {
  skills: Record<DemoSkill, string>;
  places: Record<DemoPlace, string>;
}

/** Writes skills, places and people's hours, as the manager has set them up. */
export async function writeCrew(deps: Deps, zone: string, now: number, setUpAt: number): Promise<DemoCrew> {
  const skillIds = {} as DemoCrew['skills'];
  for (const key of Object.keys(skills) as DemoSkill[])
    skillIds[key] = (await addSkill(deps, by, { name: skills[key] }, setUpAt)).id;
  const placeIds = {} as DemoCrew['places'];
  for (const key of Object.keys(places) as DemoPlace[]) {
    const [name, kind] = places[key];
    placeIds[key] = (await addPlace(deps, by, { name, kind }, setUpAt)).id;
  }
  const breaks = demoBreaks(now, zone);
  const day = (ahead: number): string => DateTime.fromMillis(now + ahead * DAY, { zone }).toFormat('yyyy-MM-dd');
  const daysOff: Partial<Record<DemoName, StaffingInput['daysOff']>> = {
    marek: [{ from: day(6), to: day(8), note: 'Course' }],
    suri: [{ from: day(20), to: day(33), note: null }],
  };
  for (const name of Object.keys(held) as (keyof typeof held)[])
    await changeStaffing(
      deps,
      by,
      demoPeople[name].id,
      0,
      { hours: null, breaks, daysOff: daysOff[name] ?? [], skillIds: held[name].map((skill) => skillIds[skill]) },
      setUpAt,
    );
  // The manager is there on four days, and at no bench.
  const office = { from: '08:00', to: '15:00' };
  const hours = [office, office, office, office, null, null, null];
  await changeStaffing(deps, by, by.personId, 0, { hours, breaks: [], daysOff: [], skillIds: [] }, setUpAt);
  return { skills: skillIds, places: placeIds };
}
