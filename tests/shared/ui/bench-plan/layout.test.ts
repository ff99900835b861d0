import { describe, expect, it } from 'vitest';
import { labelWidth, placeLabels } from '@/shared/ui/bench-plan/lane-labels';
import { lanePieces, packRows, queueDots } from '@/shared/ui/bench-plan/lane-pieces';
import { personDocks, personPegs } from '@/shared/ui/bench-plan/person-pieces';
import { axisTicks, dayAxis, flagWidth, flagX, nowX, toInstant, toX } from '@/shared/ui/bench-plan/plan-axis';
import { tickAnchor } from '@/shared/ui/wait-ribbon/ticks';
import { at, charges, iso, now, people, plan, planned, zone } from '../../../app/bench-plan/plan-of';

const h24 = { decimal: '.', hour12: false } as const;
const h12 = { decimal: '.', hour12: true } as const;
const clock = { now, asOf: now };
/** The axis of the drawing: 08:00 to 18:30 on 872 px, 1.384 px a minute. */
const axis = { from: at('08:00'), to: at('18:30'), width: 872 };
const wording = { zone, marks: h24 };
const round = (value: number) => Math.round(value * 10) / 10;

describe('the axis of a day', () => {
  it('of a workshop open from 8 to 18 with charges to 18:05 runs from 8:00 to 18:30', () => {
    const { from, to } = dayAxis(plan, now);
    expect([from, to]).toEqual([at('08:00'), at('18:30')]);
  });

  // By the drawing's own rule, x = (minute − 480) / 630 · 872.
  it.each([
    ['08:00', 0],
    ['10:06', 174.4],
    ['13:42', 473.4],
    ['18:30', 872],
  ])('has %s at %d px', (time, x) => {
    expect(round(toX(axis, at(time)))).toBe(x);
    expect(toInstant(axis, toX(axis, at(time)))).toBeCloseTo(at(time), 0);
  });

  it('holds now where somebody works at 22:10, and has no line for it on another day', () => {
    const late = dayAxis(plan, at('22:10'));
    expect(late.to).toBe(at('22:30'));
    expect(nowX({ ...axis, ...late }, at('22:10'))).not.toBeNull();
    expect(nowX(axis, at('13:42') + 86_400_000)).toBeNull();
  });

  it('ends 3 h after the work for a charge through the night, and does not squeeze the day to midnight', () => {
    const night = planned('R-2430', 'a1', 'queued', [['cc', '17:00', '23:30']], { ready: ['23:00', '23:30', '23:50'] });
    const { to } = dayAxis({ ...plan, charges: [...charges, night] }, now);
    expect(to).toBe(at('21:30'));
  });

  it('of a day on which nobody works and nothing runs shows 8 to 18', () => {
    const { from, to } = dayAxis({ ...plan, open: [], people: [], charges: [] }, now);
    expect([from, to]).toEqual([at('08:00'), at('18:30')]);
  });

  it.each([
    ['24 hours', h24, 872],
    ['12 hours', h12, 872],
    ['12 hours, narrow', h12, 420],
    ['24 hours, narrow', h24, 420],
  ] as const)(
    'with a clock of %s has no word of an hour under another or under the flag of now',
    (_name, marks, width) => {
      const narrow = { ...axis, width };
      const half = (marks.hour12 ? 62 : 38) / 2;
      for (let instant = at('08:00'); instant <= at('18:30'); instant += 7 * 60_000) {
        const flag = flagX(narrow, instant, marks);
        const words = axisTicks(narrow, zone, marks, instant).filter(({ quiet }) => !quiet);
        // Where the axis draws them: in the middle under the tick, and pushed inside at its ends.
        const lefts = words.map(({ x }) => {
          const anchor = tickAnchor(x, width, true);
          return anchor === 'start' ? x : anchor === 'end' ? x - 2 * half : x - half;
        });
        for (const left of lefts) expect(left + 2 * half <= flag || left >= flag + flagWidth(marks)).toBe(true);
        for (let i = 1; i < lefts.length; i++) expect(lefts[i]! - lefts[i - 1]!).toBeGreaterThanOrEqual(2 * half);
        expect(flag).toBeGreaterThanOrEqual(0);
        expect(flag + flagWidth(marks)).toBeLessThanOrEqual(width);
      }
    },
  );
});

describe('the lane of a channel', () => {
  const pieces = (channelId: string, more = charges) => lanePieces({ charges: more }, channelId, clock, axis.from);

  it('A1 has the charge whose check is due and then the planned one, to the end of its band', () => {
    expect(pieces('a1').map(({ charge, from, to }) => [charge.card.title, from, to])).toEqual([
      ['R-2409', at('08:48'), at('13:30')],
      ['R-2421', at('14:45'), at('17:55')],
    ]);
  });

  it('cuts a charge where it goes from one channel to the next, and sets its rest and its band on the last', () => {
    const one = planned(
      'R-2431',
      'a1',
      'charging',
      [
        ['cc', '12:00', '13:30'],
        ['cc', '13:30', '15:00'],
        ['rest', '15:00', '16:00'],
      ],
      { ready: ['15:50', '16:05', '16:30'] },
    );
    one.holds = [
      { channelId: 'a1', from: iso('12:00'), to: iso('13:30') },
      { channelId: 'c1', from: iso('13:30'), to: iso('15:00') },
    ];
    const [first] = pieces('a1', [one]);
    const [last] = pieces('c1', [one]);
    expect(first!.segments.map(({ kind, toS }) => [kind, axis.from + toS * 1000])).toEqual([['cc', at('13:30')]]);
    expect([first!.band, first!.to]).toEqual([null, at('13:30')]);
    expect(last!.segments.map(({ kind }) => kind)).toEqual(['cc', 'rest']);
    expect([last!.from, last!.to]).toEqual([at('13:30'), at('16:30')]);
  });

  it('has two rows where the next charge begins while the last one still rests, and one where it has ended', () => {
    const extent = ({ from, to }: { from: number; to: number }) => ({ left: toX(axis, from), right: toX(axis, to) });
    expect(packRows(pieces('a1'), extent)).toHaveLength(1);
    const next = planned('R-2440', 'c1', 'queued', [['cc', '13:45', '14:40']], { ready: ['14:50', '15:00', '15:10'] });
    const rows = packRows(pieces('c1', [...charges, next]), extent);
    expect(rows.map((row) => row.map(({ charge }) => charge.card.title))).toEqual([['R-2412'], ['R-2440']]);
  });
});

describe('the labels of a lane', () => {
  const overlap = (a: { x: number; width: number }, b: { x: number; width: number }) =>
    a.x < b.x + b.width && b.x < a.x + a.width;

  it('stand at their silhouettes with their tags where there is room', () => {
    const { labels } = placeLabels(
      [
        { x: 66, title: 'R-2409', tag: 'check due' },
        { x: 560, title: 'R-2421', tag: null },
      ],
      [],
      872,
    );
    expect(labels.map(({ x, tag }) => [x, tag])).toEqual([
      [66, 'check due'],
      [560, null],
    ]);
  });

  it('lose the tag before they run into the next one', () => {
    const { labels } = placeLabels(
      [
        { x: 0, title: 'R-2409', tag: 'move the clips to group 2' },
        { x: 90, title: 'R-2421', tag: null },
      ],
      [],
      872,
    );
    expect(labels[0]!.tag).toBeNull();
    expect(overlap(labels[0]!, labels[1]!)).toBe(false);
  });

  it('go right of a look-in that stands over their begin', () => {
    const { labels, hidden } = placeLabels([{ x: 100, title: 'R-2411', tag: null }], [110], 872);
    expect(labels[0]!.x).toBe(122);
    expect(hidden).toEqual([]);
  });

  it('stay at their silhouettes where look-ins stand too close together: the one in the way is left out', () => {
    // Hours of 57 px, as on a tablet: 33 px between two look-ins, and a name of 45.
    const { labels, hidden } = placeLabels([{ x: 100, title: 'R-2411', tag: null }], [112, 169, 226], 600);
    expect([labels[0]!.x, hidden]).toEqual([100, [112]]);
  });

  it('keep a tag that needs somebody where only look-ins that are done are in the way, which are left out', () => {
    // As above: hours of 57 px leave no room for '3 min over' between the look-ins.
    const late = { x: 100, title: 'R-2409', tag: '3 min over', needed: true };
    const pegs = [160, 217, 274];
    const kept = placeLabels([late], pegs, 600, [160, 217]);
    expect([kept.labels[0]!.x, kept.labels[0]!.tag, kept.hidden]).toEqual([100, '3 min over', [160, 217]]);
    // One that is still to come stays, and so does what is plain.
    expect(placeLabels([late], pegs, 600, [217]).labels[0]!.tag).toBeNull();
    expect(placeLabels([{ ...late, needed: false }], pegs, 600, pegs).labels[0]!.tag).toBeNull();
  });

  it('of 300 random lanes never stand over each other, over a look-in that is drawn, or beyond the lane', () => {
    let seed = 11;
    const random = (below: number) => {
      seed = (seed * 48_271) % 2_147_483_647;
      return seed % below;
    };
    const tags = [null, 'check due', 'ready 10:41 am', '22 min over', '1 h 05 late'];
    for (let lane = 0; lane < 300; lane++) {
      const width = 300 + random(700);
      const row: { x: number; title: string; tag: string | null }[] = [];
      for (let x = random(60) - 30; x < width - 60; x = Math.max(0, x) + 62 + random(200))
        row.push({ x, title: `R-24${10 + random(80)}`, tag: tags[random(tags.length)]! });
      const pegs = Array.from({ length: random(8) }, () => random(width));
      const { labels, hidden } = placeLabels(row, pegs, width);
      const drawn = pegs.filter((peg) => !hidden.includes(peg));
      labels.forEach((label, index) => {
        expect(label.x).toBeGreaterThanOrEqual(0);
        expect(label.x + label.width).toBeLessThanOrEqual(width + 1e-9);
        for (const other of labels.slice(index + 1)) expect(overlap(label, other)).toBe(false);
        for (const peg of drawn) expect(overlap(label, { x: peg - 7, width: 14 })).toBe(false);
      });
    }
  });

  it('are reckoned no narrower than the face draws them: R-2411 is 41 px in the drawing', () => {
    expect(labelWidth('R-2411', null)).toBeGreaterThanOrEqual(41);
  });
});

describe('the lane of a person', () => {
  const marek = people[3]!;
  it('has own work, fills, breaks and free time in the order of the day', () => {
    expect(personDocks(marek, axis, now, wording).map(({ kind, title }) => [kind, title])).toEqual([
      ['own', 'Strip R-2415'],
      ['break', 'Break'],
      ['fill', 'Door lock R-2419'],
      ['free', '134\u00a0min free'],
    ]);
  });

  it('names a piece of own work by its repair alone where its words have no room, and a short break not at all', () => {
    const titles = (width: number, kind: string) =>
      personDocks(people[0]!, { ...axis, width }, now, wording)
        .filter((dock) => dock.kind === kind)
        .map(({ title }) => title);
    expect(titles(872, 'own')).toEqual(['Read R-2418', 'Fit R-2404', '', 'Fit R-2411']);
    expect(titles(600, 'own')).toEqual(['Read R-2418', 'R-2404', '', 'Fit R-2411']);
    expect([titles(872, 'break'), titles(400, 'break')]).toEqual([['Break'], ['']]);
  });

  it('says the minutes of a short free stretch alone, and nothing where even those have no room', () => {
    const ines = people[0]!;
    const free = (width: number) =>
      personDocks(ines, { ...axis, width }, now, wording).find(({ kind }) => kind === 'free')!;
    expect(free(872).title).toBe('37\u00a0min');
    expect(free(500).title).toBe('');
    expect(free(500).label).toBe('37 min free, 14:53 to 15:30');
  });

  it('lets a free stretch be chosen only while it is ahead and 48 px wide', () => {
    const docks = (instant: number) => personDocks(marek, axis, instant, wording, () => {});
    expect(docks(now).at(-1)!.onPress).toBeDefined();
    expect(docks(at('17:30')).at(-1)!.onPress).toBeUndefined();
    expect(
      personDocks(people[0]!, { ...axis, width: 500 }, now, wording, () => {}).some(({ onPress }) => onPress),
    ).toBe(false);
  });

  it('fills the look-ins that are done, and says which were missed', () => {
    const looks = people[0]!.lookIns.map((one) => (one.dueAt === iso('12:50') ? { ...one, doneAt: null } : one));
    expect(personPegs(people[0]!.lookIns, axis, now, wording).map(({ state }) => state)).toEqual([
      'done',
      'next',
      'later',
    ]);
    const missed = personPegs(looks, axis, now, wording)[0]!;
    expect([missed.missed, missed.label]).toEqual([true, 'Look-in at R-2411, A2, missed 12:50']);
  });
});

describe('the dots of a charge that is queued', () => {
  const queued = (from: string) =>
    planned('R-2440', 'b1', 'queued', [
      ['queue', from, '14:00'],
      ['cc', '14:00', '15:00'],
    ]);
  const dots = (from: string) => {
    const row = lanePieces(
      { charges: [charges.find(({ card }) => card.title === 'R-2408')!, queued(from)] },
      'b1',
      clock,
      axis.from,
    );
    const found = queueDots(row, 1, axis.from);
    return found && [axis.from + found.fromS * 1000, axis.from + found.toS * 1000];
  };

  it('begin when it is queued, and not before the charge in front has left: 13:45, and 13:33 for one queued at 9', () => {
    expect(dots('13:45')).toEqual([at('13:45'), at('14:00')]);
    expect(dots('09:00')).toEqual([at('13:33'), at('14:00')]);
  });

  it('make its silhouette no longer: it begins at its clip-on', () => {
    const [piece] = lanePieces({ charges: [queued('09:00')] }, 'b1', clock, axis.from);
    expect(piece!.from).toBe(at('14:00'));
  });
});
