import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assignLookIns, CalcInputError, type LookInPerson, type WantedLookIn } from '@/calc/index';

const LOOK_IN_S = 120;
const person = (id: string, over: Partial<LookInPerson> = {}): LookInPerson => ({
  id,
  present: [{ fromS: 0, toS: 36_000 }],
  busy: [],
  ...over,
});
const wanted = (id: string, atS: number, ownerId: string | null = null): WantedLookIn => ({ id, atS, ownerId });
const given = (list: WantedLookIn[], people: LookInPerson[]) =>
  assignLookIns(list, people, LOOK_IN_S).map(({ personId }) => personId);

describe('who looks in', () => {
  it('the owner, even with more look-ins than others', () => {
    const list = [wanted('1', 1000, 'A'), wanted('2', 2000, 'A'), wanted('3', 3000, 'A')];
    expect(given(list, [person('B'), person('A')])).toEqual(['A', 'A', 'A']);
  });

  it('where nobody owns it, in turn: 6 look-ins of 3 people are two each', () => {
    const list = [1, 2, 3, 4, 5, 6].map((at) => wanted(`${at}`, at * 1000));
    const counts = new Map<string | null, number>();
    for (const id of given(list, [person('A'), person('B'), person('C')])) counts.set(id, (counts.get(id) ?? 0) + 1);
    expect([...counts.values()]).toEqual([2, 2, 2]);
  });

  it('not who is away, leaves before it is over, or has their hands in something', () => {
    const people = [
      person('away', { present: [{ fromS: 2000, toS: 9000 }] }),
      person('leaves', { present: [{ fromS: 0, toS: 1100 }] }),
      person('clips', { busy: [{ fromS: 900, toS: 1001 }] }),
      person('here'),
    ];
    expect(given([wanted('1', 1000, 'clips')], people)).toEqual(['here']);
    expect(given([wanted('1', 1000)], people.slice(0, 3))).toEqual([null]);
  });

  it('says why nobody can: away where nobody is there all through it, busy where all who are have their hands in something', () => {
    const off = person('off', { present: [] });
    const leaves = person('leaves', { present: [{ fromS: 0, toS: 1119 }] });
    const clips = person('clips', { busy: [{ fromS: 900, toS: 1001 }] });
    const why = (people: LookInPerson[]) => assignLookIns([wanted('1', 1000)], people, LOOK_IN_S)[0]!.nobody;
    expect(why([])).toBe('away');
    expect(why([off, leaves])).toBe('away');
    expect(why([off, clips])).toBe('busy');
    expect(why([leaves, clips])).toBe('busy');
    expect(why([clips, person('here')])).toBeNull();
  });

  it('two at once go to two people, whoever owns them; a third is done by one of them on the same round', () => {
    const list = [wanted('1', 1000, 'A'), wanted('2', 1060, 'A'), wanted('3', 1090, 'A')];
    const people = given(list, [person('A'), person('B')]);
    expect(people.slice(0, 2).sort()).toEqual(['A', 'B']);
    expect(people[2]).not.toBeNull();
  });

  it('one that only a busy person can do makes them hand theirs on to somebody who can', () => {
    const people = [person('A'), person('B', { busy: [{ fromS: 1150, toS: 1300 }] })];
    expect(given([wanted('1', 1000), wanted('2', 1060)], people)).toEqual(['B', 'A']);
  });

  it('the same id twice, or a time that is no number, is refused', () => {
    expect(() => given([wanted('1', 1), wanted('1', 2)], [])).toThrow(CalcInputError);
    expect(() => given([wanted('1', Number.NaN)], [])).toThrow('wanted[0].atS');
  });

  it('over 500 drawn days none is lost, all are done by people who are there, and two at once only where nobody there is free', () => {
    const stretches = fc
      .array(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 1, max: 30 })), { maxLength: 3 })
      .map((list) => list.map(([from, length]) => ({ fromS: from * 60, toS: (from + length) * 60 })));
    const people = fc.array(fc.record({ present: stretches, busy: stretches }), { maxLength: 5 });
    const looks = fc.array(
      fc.record({ atS: fc.integer({ min: 0, max: 3600 }), owner: fc.option(fc.integer({ min: 0, max: 4 })) }),
      { maxLength: 12 },
    );
    fc.assert(
      fc.property(people, looks, (drawnPeople, drawnLooks) => {
        const staff = drawnPeople.map((one, at) => ({ id: `p${at}`, ...one }));
        const list = drawnLooks.map(({ atS, owner }, at) => wanted(`${at}`, atS, owner === null ? null : `p${owner}`));
        const result = assignLookIns(list, staff, LOOK_IN_S);
        expect(result.map(({ lookInId }) => lookInId)).toEqual(list.map(({ id }) => id));
        const can = ({ present, busy }: (typeof staff)[number], atS: number) =>
          present.some(({ fromS, toS }) => fromS <= atS && atS + LOOK_IN_S <= toS) &&
          !busy.some(({ fromS, toS }) => fromS < atS + LOOK_IN_S && atS < toS);
        const hasAnother = (id: string, at: number) =>
          list.some(
            ({ atS }, other) =>
              other !== at && result[other]!.personId === id && Math.abs(atS - list[at]!.atS) < LOOK_IN_S,
          );
        list.forEach(({ atS }, at) => {
          const able = staff.filter((one) => can(one, atS));
          const { personId } = result[at]!;
          const there = staff.some(({ present }) =>
            present.some((one) => one.fromS <= atS && atS + LOOK_IN_S <= one.toS),
          );
          expect(result[at]!.nobody).toBe(able.length > 0 ? null : there ? 'busy' : 'away');
          if (able.length === 0) expect(personId).toBeNull();
          else expect(able.map(({ id }) => id)).toContain(personId);
          if (personId !== null && hasAnother(personId, at)) {
            const later = list.filter(
              (one, other) => result[other]!.personId === personId && Math.abs(one.atS - atS) < LOOK_IN_S,
            );
            // At least one of those at once had nobody free to go to.
            const stuck = later.some((one) =>
              staff
                .filter((who) => can(who, one.atS))
                .every(({ id }) => id === personId || hasAnother(id, list.indexOf(one))),
            );
            expect(stuck).toBe(true);
          }
        });
      }),
      { numRuns: 500 },
    );
  });
});
