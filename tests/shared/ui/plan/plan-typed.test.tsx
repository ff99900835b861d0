import { describe, expect, it } from 'vitest';
import { CHEMISTRIES } from '@/calc';
import { shownOptions } from '@/shared/ui/plan/plan-ways';
import { emptyPlan, fieldOf, flatChemistries, requestOf } from '@/shared/ui/plan/plan-typed';

const at = { zone: 'Europe/Amsterdam', today: '2026-06-09', now: Date.parse('2026-06-09T11:31:00Z') };
const typed = { ...emptyPlan, spareId: 's1', targetVolts: '3,968 V' };

describe('what is typed into a plan', () => {
  it('reads a comma and a pasted unit, and takes a time as one of the workshop’s zone', () => {
    const { request, errors } = requestOf({ ...typed, readyDay: '2026-06-09', readyTime: '1815' }, at);
    expect(errors).toEqual({});
    // 18:15 in Amsterdam in June is 16:15 UTC.
    expect(request).toMatchObject({ targetVolts: 3.968, readyBy: '2026-06-09T16:15:00.000Z', clipOnAt: null });
  });

  it.each([
    ['39.68', /over 5.V.*point in the wrong place/],
    ['3968', /looks like millivolts/],
    ['', /missing/],
    ['abc', /is no number/],
  ])('refuses “%s” as the pack’s volts with a sentence at its field', (targetVolts, sentence) => {
    const { request, errors } = requestOf({ ...typed, targetVolts }, at);
    expect(request).toBeNull();
    expect(errors.targetVolts).toMatch(sentence);
  });

  describe('once the spare is chosen', () => {
    const type = { groupsInSeries: 2, chargeLimitVolts: 4.2, dischargeLimitVolts: 3 };
    const told = (targetVolts: string, offsetMillivolts = 0) => {
      const { request, errors } = requestOf({ ...typed, targetVolts }, { ...at, limits: { type, offsetMillivolts } });
      expect(request === null).toBe(errors.targetVolts !== undefined);
      return errors.targetVolts?.replaceAll('\u00a0', ' ') ?? null;
    };

    it.each([
      ['39.68', "39.68 V is over this type's 4.20 V. A point in the wrong place?"],
      ['3968', "3968 V is over this type's 4.20 V. In millivolts? Then it is 3.968 V."],
      ['7.936 V', "7.936 V is over this type's 4.20 V. That looks like the whole module: 3.968 V a group."],
      ['4,21', "4.21 V is over this type's 4.20 V. Type that or less."],
      ['2.41', "2.41 V is under this type's 3.00 V. Type that or more."],
    ])('judges “%s” by the limits of its type', (targetVolts, sentence) => {
      expect(told(targetVolts)).toBe(sentence);
    });

    it('takes a target on either limit, and leaves what is no number to its own sentence', () => {
      expect([told('4.2'), told('3')]).toEqual([null, null]);
      expect(told('abc')).toBe('“abc” is no number. Type it like 3.968.');
      expect(told('')).toMatch(/missing/);
    });

    it('takes the known offset of the meter off first, as the plan does: 4.202 V on one that reads 2 mV too much', () => {
      expect(told('4.202', 2)).toBeNull();
      expect(told('4.2', -2)).toBe("4.2 V is 4.202 V without the meter's offset, over this type's 4.20 V.");
    });
  });

  it('refuses a time that is over, at the field it was typed into', () => {
    const { request, errors } = requestOf({ ...typed, readyDay: '2026-06-09', readyTime: '09:00' }, at);
    expect(request).toBeNull();
    expect(errors.readyTime).toBe('That time is over. Choose a later one.');
  });

  it('maps the server’s instants to the fields they are typed in', () => {
    expect([fieldOf('readyBy'), fieldOf('clipOnAt'), fieldOf('meterId')]).toEqual(['readyTime', 'clipTime', 'meterId']);
  });
});

describe('a pack told by its state of charge', () => {
  it('is offered for the chemistries whose curve has a plateau, and for no other', () => {
    const withPlateau = Object.values(CHEMISTRIES)
      .filter(({ plateau }) => plateau !== null)
      .map(({ id }) => id);
    expect([...flatChemistries].sort()).toEqual(withPlateau.sort());
  });

  const type = { groupsInSeries: 2, chargeLimitVolts: 3.65, dischargeLimitVolts: 2.5 };
  const soc = { ...typed, targetVolts: '', targetBy: 'soc', targetSoc: '58 %' };
  const limits = (chemistry: 'lfp' | 'nmc') => ({ ...at, limits: { type, chemistry, offsetMillivolts: 0 } });

  it('asks for per cent in place of volts: 58 % is sent, and 5800 refused at its field', () => {
    expect(requestOf(soc, limits('lfp'))).toMatchObject({ errors: {}, request: { targetVolts: null, targetSoc: 58 } });
    expect(requestOf({ ...soc, targetSoc: '5800' }, limits('lfp')).errors.targetSoc).toMatch(/over 100/);
    expect(requestOf({ ...soc, targetSoc: '' }, limits('lfp')).errors.targetSoc).toBeTruthy();
  });

  it('asks for volts again where the spare is changed to one whose voltage tells', () => {
    expect(requestOf(soc, limits('nmc')).errors.targetVolts).toMatch(/missing/);
  });
});

describe('ways shown at first', () => {
  const way = (id: string, marks: object = {}) =>
    ({ id, soonest: false, soonestBusbarsStay: false, ...marks }) as Parameters<typeof shownOptions>[0][number];
  const options = [
    way('a', { soonest: true }),
    way('b'),
    way('c'),
    way('d'),
    way('e', { soonestBusbarsStay: true }),
    way('f'),
  ];

  it('are the first three with every marked and the chosen one, in their order', () => {
    expect(shownOptions(options, 3, 'f').map(({ id }) => id)).toEqual(['a', 'b', 'c', 'e', 'f']);
  });

  it('are all where a button would hide only one', () => {
    expect(shownOptions(options.slice(0, 4), 3, null)).toHaveLength(4);
  });
});
