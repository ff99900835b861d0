import { seededRandom, type BenchProblem, type FillProblem, type FillWork, type Stretch } from '@/calc/index';

/** All times of a drawn workshop are whole quarters of an hour, so that a time-indexed model of it is exact. */
export const QUARTER_S = 900;
const HOUR_S = 3600;
const DAY_S = 86_400;

/** Three kinds of channel: how many, how long a charge takes on one, and up to which class of voltage it goes. */
export const CHANNEL_KINDS = [
  { count: 3, slowness: 1.6, voltsClass: 2 },
  { count: 3, slowness: 1, voltsClass: 1 },
  { count: 2, slowness: 0.65, voltsClass: 0 },
];

/**
 * A workshop on a Monday at 8: 8 channels of three kinds, some of them running, and 30 charges of 1 to 6 h. Charges are
 * begun from 8 to 18. In every second workshop they must also be over by then; in the others they may run on alone. How
 * tight the due times are goes round in five steps with the seed.
 */
export function benchInstance(seed: number): BenchProblem {
  const random = seededRandom(seed);
  const quarters = (fromS: number, toS: number) =>
    Math.round((fromS + random() * (toS - fromS)) / QUARTER_S) * QUARTER_S;
  const kindOf = CHANNEL_KINDS.flatMap(({ count }, kind) => Array.from({ length: count }, () => kind));
  const attended = seed % 2 === 0;
  const days = Array.from({ length: 10 }, (_, day) => ({ fromS: day * DAY_S, toS: day * DAY_S + 10 * HOUR_S }));
  const taken = kindOf.map((): Stretch[] =>
    random() < 0.5 ? [{ fromS: -quarters(HOUR_S, 3 * HOUR_S), toS: quarters(QUARTER_S, 3 * HOUR_S) }] : [],
  );
  const lastDueS = [9, 12, 26, 34, 58][seed % 5]! * HOUR_S;
  return {
    taken,
    jobs: Array.from({ length: 30 }, (_, at) => {
      const lengthS = quarters(HOUR_S, 6 * HOUR_S);
      const voltsClass = Math.floor(random() * 3);
      const restS = quarters(QUARTER_S, 2 * QUARTER_S);
      const spread = 1.05 + 0.2 * random();
      const dueS = quarters(0.5 * lengthS + 2 * HOUR_S, lastDueS);
      return {
        id: `charge-${at}`,
        // What would be due in the night is due in the morning.
        dueS: random() < 0.1 ? null : nextOpen(dueS, days),
        weight: [1, 1, 1, 2, 4][Math.floor(random() * 5)]!,
        alternatives: kindOf.flatMap((kind, channel) => {
          const { slowness, voltsClass: upTo } = CHANNEL_KINDS[kind]!;
          const busyS = Math.max(QUARTER_S, Math.round((lengthS * slowness) / QUARTER_S) * QUARTER_S);
          const mayStart = attended
            ? days
                .filter(({ fromS, toS }) => toS - fromS > busyS)
                .map(({ fromS, toS }) => ({ fromS, toS: toS - busyS }))
            : days;
          if (voltsClass > upTo || mayStart.length === 0) return [];
          return [
            { channels: [channel], busyS, readyS: busyS + restS, guardS: Math.round(busyS * spread) + restS, mayStart },
          ];
        }),
      };
    }),
  };
}

const nextOpen = (atS: number, days: readonly Stretch[]): number =>
  days.some(({ fromS, toS }) => fromS <= atS && atS <= toS) ? atS : days.find(({ fromS }) => fromS > atS)!.fromS;

/**
 * The waits of a day for 12 people and 40 pieces of other work of 15 min to 3 h, with look-ins, four places, skills that
 * not all have, some pieces to be parted, some due or not to be begun at once.
 */
export function fillInstance(seed: number): FillProblem {
  const random = seededRandom(seed);
  const whole = (from: number, to: number, step: number) => Math.round((from + random() * (to - from)) / step) * step;
  const people = Array.from({ length: 12 }, (_, at) => ({
    id: `person-${at}`,
    skills: [0, 1, 2, 3].filter(() => random() < 0.55),
  }));
  const places = ['bay-1', 'bay-2', 'bench-1', 'bench-2'];
  const windows = people.flatMap(({ id }) => {
    let fromS = whole(0, HOUR_S, 300);
    return Array.from({ length: 2 + Math.floor(random() * 2) }, () => {
      const toS = fromS + whole(1800, 7200, 300);
      const window = {
        personId: id,
        fromS,
        toS,
        lookInsS: Array.from({ length: Math.floor(random() * 3) }, () => whole(fromS, toS - 300, 60)).sort(
          (a, b) => a - b,
        ),
      };
      fromS = toS + whole(1200, 5400, 300);
      return window;
    });
  });
  const work = Array.from({ length: 40 }, (_, at): FillWork => {
    const likelyS = whole(900, 9000, 300);
    const skill = random() < 0.3 ? null : Math.floor(random() * 4);
    return {
      id: `piece-${at}`,
      likelyS,
      longS: Math.round((likelyS * (1.1 + 0.5 * random())) / 60) * 60,
      weight: [1, 1, 2, 3][Math.floor(random() * 4)]!,
      personIds: people.filter(({ skills }) => skill === null || skills.includes(skill)).map(({ id }) => id),
      placeId: random() < 0.4 ? places[Math.floor(random() * places.length)]! : null,
      releaseS: random() < 0.2 ? whole(0, 3 * HOUR_S, 900) : 0,
      dueS: random() < 0.2 ? whole(2 * HOUR_S, 7 * HOUR_S, 900) : null,
      splittable: random() < 0.3,
      leastPartS: 900,
    };
  });
  const placesTaken = Object.fromEntries(
    places.map((id) => {
      const fromS = whole(0, 4 * HOUR_S, 900);
      return [id, random() < 0.6 ? [{ fromS, toS: fromS + whole(1800, 7200, 900) }] : []];
    }),
  );
  return { windows, work, placesTaken, lookInS: 180 };
}
