/** Why nobody can look in at a time, in words. */
import { DateTime } from 'luxon';
import type { NobodyDto } from '@/shared/contract/bench-plan';
import { clockText, listText, titleOf } from '../charge-words';
import { openingOf } from '../working-hours';
import type { BenchGround } from './ground';
import type { GroundPerson } from './ground-people';
import { binds, type HandBlock } from './hands';
import { overlaps, type Stretch } from './spans';

/** So many people are named; of more their number is told. */
const MOST_NAMED = 3;

/**
 * 'Ines clips on R-2418 until 14:57. Nobody else is there.', 'Bram has a break until 12:40.', 'The workshop is closed
 * then.'
 * @param hands the laid out hands of each person, by id
 * @param visit from the look-in to its end
 */
export function nobodyWords(
  ground: BenchGround,
  hands: ReadonlyMap<string, readonly HandBlock[]>,
  kind: NobodyDto['kind'],
  visit: Stretch,
): string {
  const { people, workshop, now } = ground;
  const clock = (at: number) => clockText(at, workshop.zone, now);
  if (kind === 'away') return awayWords(ground, visit, clock);
  const there = people.filter(({ present }) => present.some(({ from, to }) => from <= visit.from && visit.to <= to));
  const busy = there.flatMap(({ id, name }) => {
    const block = (hands.get(id) ?? []).find((one) => binds(one) && overlaps(one, visit));
    return block ? [`${firstOf(name)} ${doing[block.kind]} ${ofCharge(ground, block)} until ${clock(block.to)}`] : [];
  });
  return `${named(busy)}. Nobody else is there.`;
}

/** Who is away only just then, and until when; else what keeps everybody away. */
function awayWords({ people, workshop }: BenchGround, visit: Stretch, clock: (at: number) => string): string {
  const justThen = people.flatMap((person) => shortAbsence(person, visit, clock) ?? []);
  if (justThen.length > 0) return `${named(justThen)}.`;
  const opening = openingOf(workshop, visit.from);
  if (opening === null || visit.to <= opening.from || visit.from >= opening.to) return 'The workshop is closed then.';
  const day = DateTime.fromMillis(visit.from, { zone: workshop.zone }).toFormat('yyyy-MM-dd');
  const off = people.filter(({ daysOff }) => daysOff.some((one) => one.day === day)).map(({ name }) => firstOf(name));
  if (off.length > 0) return `${named(off)} ${off.length === 1 ? 'has' : 'have'} the day off.`;
  return 'Nobody has working hours then.';
}

/** 'Bram has a break until 12:40', 'Suri is there until 17:00'; null: the person is not there before or after either. */
function shortAbsence({ name, present, breaks }: GroundPerson, visit: Stretch, clock: (at: number) => string) {
  const pause = breaks.find((one) => overlaps(one, visit));
  if (pause) {
    const begins = pause.from > visit.from ? `at ${clock(pause.from)}` : `until ${clock(pause.to)}`;
    return `${firstOf(name)} has a break ${begins}`;
  }
  const some = present.find((one) => overlaps(one, visit));
  if (!some) return null;
  return some.from > visit.from
    ? `${firstOf(name)} is there from ${clock(some.from)}`
    : `${firstOf(name)} is there until ${clock(some.to)}`;
}

const doing: Record<HandBlock['kind'], string> = {
  'clip-on': 'clips on',
  swap: 'swaps the clips of',
  'clip-off': 'clips off',
  check: 'checks',
  fit: 'fits',
};
const ofCharge = ({ files }: BenchGround, { chargeId, title }: HandBlock): string => {
  const file = files.find(({ charge }) => charge.id === chargeId);
  return file ? titleOf(file.charge) : title;
};

const firstOf = (name: string): string => name.split(' ')[0] ?? name;

const named = (all: readonly string[]): string =>
  all.length <= MOST_NAMED + 1
    ? listText(all)
    : listText([...all.slice(0, MOST_NAMED), `${all.length - MOST_NAMED} more`]);
