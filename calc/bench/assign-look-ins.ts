import type { LookInGiven, LookInPerson, Stretch, WantedLookIn } from './bench-types';
import { CalcInputError } from '../errors';
import { requireFinite, requirePositive } from '../require';

/** A person with the look-ins that are theirs so far. */
interface Round {
  person: LookInPerson;
  mine: WantedLookIn[];
}

/**
 * Gives every look-in to somebody: in order of their times, to its owner where they can, otherwise to the one who has
 * the fewest. Who can is present all through it, has their hands in nothing, and has no other look-in at that time.
 *
 * Where all who are there have another at that time, others' look-ins are handed on to make one of them free. Where that
 * does not help either, one of them does both on the same round: who has the fewest at that time, the owner before
 * others. Where nobody can at all, nobody gets it (`personId` null), and it still stands in the list with the reason.
 *
 * @param lookInS how long one takes, s
 * @returns one line for each that is wanted, in their order
 * @throws CalcInputError for a time that is no number, or an id that comes twice
 */
export function assignLookIns(
  wanted: readonly WantedLookIn[],
  people: readonly LookInPerson[],
  lookInS: number,
): LookInGiven[] {
  requirePositive('lookInS', lookInS);
  const ids = new Set<string>();
  wanted.forEach(({ id, atS }, at) => {
    if (ids.has(id)) throw new CalcInputError(`wanted[${at}].id`, id, 'different from the others');
    ids.add(id);
    requireFinite(`wanted[${at}].atS`, atS);
  });
  const rounds = people.map((person): Round => ({ person, mine: [] }));
  // Of two at the same time the one somebody owns first: the other may go to anybody.
  const inTurn = [...wanted].sort(
    (one, other) => one.atS - other.atS || Number(other.ownerId !== null) - Number(one.ownerId !== null),
  );
  for (const one of inTurn) {
    const there = byTurn(one, rounds, lookInS);
    if (there.length === 0 || handOn(one, there, rounds, lookInS, new Set())) continue;
    there.sort((a, b) => atOnce(one, a, lookInS).length - atOnce(one, b, lookInS).length);
    there[0]!.mine.push(one);
  }
  const personOf = new Map(rounds.flatMap(({ person, mine }) => mine.map(({ id }) => [id, person.id] as const)));
  return wanted.map(({ id, atS }) => {
    const personId = personOf.get(id);
    if (personId !== undefined) return { lookInId: id, personId, nobody: null };
    const nobody = people.some((person) => isPresent(person, atS, lookInS)) ? 'busy' : 'away';
    return { lookInId: id, personId: null, nobody };
  });
}

/** Gives it to somebody who is free, or makes somebody free whose others at that time can be handed on; false: nobody. */
function handOn(
  one: WantedLookIn,
  there: readonly Round[],
  rounds: readonly Round[],
  lookInS: number,
  tried: Set<string>,
): boolean {
  tried.add(one.id);
  const free = there.find((round) => atOnce(one, round, lookInS).length === 0);
  if (free) {
    free.mine.push(one);
    return true;
  }
  for (const round of there) {
    const others = atOnce(one, round, lookInS);
    // With more than one in the way the first could have gone in vain.
    if (others.length !== 1 || tried.has(others[0]!.id)) continue;
    const other = others[0]!;
    round.mine = round.mine.filter((mine) => mine !== other);
    round.mine.push(one);
    if (handOn(other, byTurn(other, rounds, lookInS), rounds, lookInS, tried)) return true;
    round.mine = round.mine.filter((mine) => mine !== one);
    round.mine.push(other);
  }
  return false;
}

/** Who could do it, were it the only one: the owner first, then who has the fewest. */
function byTurn({ atS, ownerId }: WantedLookIn, rounds: readonly Round[], lookInS: number): Round[] {
  const owns = ({ person }: Round) => Number(person.id === ownerId);
  return rounds
    .filter(({ person }) => canGo(person, atS, lookInS))
    .sort((one, other) => owns(other) - owns(one) || one.mine.length - other.mine.length);
}

/** The look-ins of a person that overlap this one. */
const atOnce = ({ atS }: WantedLookIn, { mine }: Round, lookInS: number): WantedLookIn[] =>
  mine.filter((one) => Math.abs(one.atS - atS) < lookInS);

/** Present from its beginning to its end, and hands free. */
function canGo(person: LookInPerson, atS: number, lookInS: number): boolean {
  const overlaps = ({ fromS, toS }: Stretch) => fromS < atS + lookInS && atS < toS;
  return isPresent(person, atS, lookInS) && !person.busy.some(overlaps);
}

const isPresent = ({ present }: LookInPerson, atS: number, lookInS: number): boolean =>
  present.some(({ fromS, toS }) => fromS <= atS && atS + lookInS <= toS);
