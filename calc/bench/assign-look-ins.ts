import type { LookInGiven, LookInPerson, Stretch, WantedLookIn } from './bench-types';
import { CalcInputError } from '../errors';
import { requireFinite, requirePositive } from '../require';

/**
 * Gives every look-in to somebody: in order of their times, to its owner where they can, otherwise to the one who has
 * the fewest. Who can: is present all through it, has their hands in nothing, and has no other look-in at that time.
 *
 * Where all who are there have another look-in at that time, the one among them whose other look-in is over first takes
 * it too, on the same round, after the other; the owner where that makes no difference. Nobody there at its time: nobody gets it (`personId` null), and it still stands in the list.
 *
 * @param lookInS how long one takes, s
 * @throws CalcInputError for a time that is no number
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
  const loads = people.map((person) => ({ person, count: 0, busyUntilS: -Infinity }));
  const given = new Map<string, string | null>();
  for (const { id, atS, ownerId } of [...wanted].sort((one, other) => one.atS - other.atS)) {
    const there = loads.filter(({ person }) => canGo(person, atS, lookInS));
    const idle = there.filter(({ busyUntilS }) => busyUntilS <= atS);
    const isOwner = (load: (typeof loads)[number]) => Number(load.person.id === ownerId);
    const [chosen] = idle.length
      ? idle.sort((one, other) => isOwner(other) - isOwner(one) || one.count - other.count)
      : there.sort(
          (one, other) => one.busyUntilS - other.busyUntilS || isOwner(other) - isOwner(one) || one.count - other.count,
        );
    given.set(id, chosen?.person.id ?? null);
    if (!chosen) continue;
    chosen.count += 1;
    chosen.busyUntilS = Math.max(chosen.busyUntilS, atS) + lookInS;
  }
  return wanted.map(({ id }) => ({ lookInId: id, personId: given.get(id) ?? null }));
}

/** Present from its beginning to its end, and hands free. */
function canGo({ present, busy }: LookInPerson, atS: number, lookInS: number): boolean {
  const overlaps = ({ fromS, toS }: Stretch) => fromS < atS + lookInS && atS < toS;
  return present.some(({ fromS, toS }) => fromS <= atS && atS + lookInS <= toS) && !busy.some(overlaps);
}
