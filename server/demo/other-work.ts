/** Other work of the demo: some open, some done, begun and taken around now, each where its person has no other thing in hand. */
import type { WorkDto, WorkInput } from '@/shared/contract/work';
import type { Deps } from '../deps';
import { findRepairNumbered } from '../repositories/repairs.repository';
import { daysOf } from '../services/bench-plan/days';
import { loadGround } from '../services/bench-plan/ground';
import { linesOf } from '../services/bench-plan/people-lines';
import { earliestBegin, type Stretch } from '../services/bench-plan/spans';
import { dropWork } from '../services/finish-work.service';
import { beginStint, endStint } from '../services/stints.service';
import { takeWork } from '../services/take-work.service';
import { addWork } from '../services/work.service';
import type { DemoCrew, DemoPlace, DemoSkill } from './crew';
import { demoWorkshopId } from './demo-workshop';
import { demoPeople, memberOf, type DemoName } from './people';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
/** A look-in may fall into a stint and make it longer by its visit; two of them at the most, min. */
const SLACK_MINUTES = 10;

interface Piece {
  title: string;
  likely: number;
  long: number;
  skill?: DemoSkill;
  place?: DemoPlace;
  priority?: WorkInput['priority'];
  repair?: string;
  splittable?: boolean;
  /** Hours from now. */
  dueH?: number;
  note?: string;
  /** Hours since it was added. */
  addedH: number;
  by: DemoName;
}

const pieces = {
  filter: { title: 'Cabin filter', likely: 15, long: 25, priority: 'low', repair: 'R-2409', addedH: 6, by: 'hella' },
  wrench: { title: 'Check the torque wrenches', likely: 20, long: 25, place: 'bench2', addedH: 46, by: 'petra' },
  spares: {
    ...{ title: 'Read the spares of rack 2', likely: 120, long: 180, skill: 'highVoltage', place: 'bench1' },
    ...{ splittable: true, note: 'Group by group; the labels go with it.', addedH: 43, by: 'hella' },
  },
  hoses: { title: 'Coolant hoses', likely: 40, long: 60, place: 'bay2', repair: 'R-2412', addedH: 5, by: 'hella' },
  brakes: {
    ...{ title: 'Brake bleed', likely: 35, long: 50, skill: 'brakes', place: 'bay1', priority: 'high' },
    ...{ repair: 'R-2411', dueH: 5, addedH: 4, by: 'hella' },
  },
  cooling: {
    ...{ title: 'Regas the air conditioning', likely: 50, long: 70, skill: 'cooling', place: 'bay3' },
    ...{ repair: 'R-2418', dueH: 6, addedH: 4, by: 'hella' },
  },
  seal: {
    ...{ title: 'Clean the lid and its seal', likely: 25, long: 40, place: 'bench2', repair: 'R-2408' },
    ...{ addedH: 3, by: 'bram' },
  },
  leak: {
    ...{ title: 'Leak check of the cooling', likely: 20, long: 30, place: 'bay4', priority: 'urgent' },
    ...{ repair: 'R-2406', dueH: 3, addedH: 2, by: 'bram' },
  },
  bearing: {
    ...{ title: 'Wheel bearing, front left', likely: 90, long: 130, skill: 'wheels', place: 'bay4' },
    ...{ priority: 'high', repair: 'R-2415', dueH: 22, addedH: 5, by: 'hella' },
  },
  tyres: {
    ...{ title: 'Winter tyres', likely: 40, long: 55, skill: 'wheels', place: 'bay4' },
    ...{ repair: 'R-2413', dueH: 7, addedH: 3, by: 'suri' },
  },
  update: { title: 'Bring its software up to date', likely: 30, long: 60, repair: 'R-2417', addedH: 2, by: 'marek' },
  bolts: {
    ...{ title: 'Sort the busbar bolts', likely: 45, long: 70, place: 'bench1', priority: 'low' },
    ...{ splittable: true, addedH: 70, by: 'petra' },
  },
  strap: { title: 'Door strap, driver’s side', likely: 25, long: 35, addedH: 1, by: 'ines' },
  labels: { title: 'New labels for shelf D', likely: 60, long: 90, splittable: true, addedH: 90, by: 'petra' },
} satisfies Record<string, Piece>;
type PieceName = keyof typeof pieces;

/** When somebody is busy with something else, and when they are there. */
interface Line {
  busy: Stretch[];
  present: Stretch[];
}

/** Hands of charges as they are and as they are likely to come, and breaks. */
async function linesNow(deps: Deps, zone: string, now: number): Promise<Map<string, Line>> {
  const ground = await loadGround(deps.dataSource.manager, demoWorkshopId, daysOf(zone, undefined, 1, now), now);
  return new Map(
    linesOf(ground).lines.map(({ person, hands }) => [
      person.id,
      { busy: [...hands, ...person.breaks].map(({ from, to }) => ({ from, to })), present: person.present },
    ]),
  );
}

/** Writes all work, then lives through what is done with it: in the order of time, each act by its own person. */
export async function liveOtherWork(deps: Deps, crew: DemoCrew, zone: string, now: number): Promise<void> {
  const work = {} as Record<PieceName, WorkDto>;
  const first = (Object.keys(pieces) as PieceName[]).sort((one, other) => pieces[other].addedH - pieces[one].addedH);
  for (const name of first) work[name] = await add(deps, crew, pieces[name], now);
  const lines = await linesNow(deps, zone, now);

  /** The first of these people who has room for it within these minutes from now, and when; then they are busy with it. */
  const room = (people: readonly DemoName[], minutes: number, first: number, last: number) => {
    for (const name of people) {
      const line = lines.get(demoPeople[name].id)!;
      const ms = (minutes + SLACK_MINUTES) * MINUTE;
      const window = { from: now + first * MINUTE, to: now + last * MINUTE };
      // What is over by now was done whenever there was time for it; what is to come lies in people's hours.
      const hours = last <= 0 ? [window] : line.present.map(({ from, to }) => ({ from, to: to - ms }));
      const mayBegin = hours
        .map(({ from, to }) => ({ from: Math.max(from, window.from), to: Math.min(to, window.to) }))
        .filter(({ from, to }) => to >= from);
      const from = earliestBegin(mayBegin, line.busy, ms, window.from);
      if (from === null) continue;
      line.busy.push({ from, to: from + ms });
      return { name, from };
    }
    return null;
  };
  const stintOf = (piece: WorkDto): string =>
    piece.stints.find(({ state }) => state === 'taken' || state === 'begun')!.id;

  const done = async (piece: PieceName, people: DemoName[], first: number, last: number, minutes?: number) => {
    const { likely, long } = pieces[piece];
    const found = room(people, minutes ?? long, first, last);
    if (found === null) return;
    const member = memberOf(found.name);
    const { id } = work[piece];
    const taken = await takeWork(deps, member, id, { minutes }, found.from);
    const begun = await beginStint(deps, member, id, stintOf(taken), found.from);
    const lasted = Math.round(((minutes ?? long) + (likely * (minutes ?? long)) / long) / 2);
    await endStint(deps, member, id, stintOf(begun), {}, found.from + lasted * MINUTE);
  };
  const taken = async (piece: PieceName, people: DemoName[], first: number, giver?: DemoName) => {
    const found = room(people, pieces[piece].long, first, first + 72 * 60);
    if (found === null) return;
    const from = new Date(found.from).toISOString();
    const person = giver === undefined ? {} : { personId: demoPeople[found.name].id };
    await takeWork(deps, memberOf(giver ?? found.name), work[piece].id, { ...person, from }, now - 2 * MINUTE);
  };

  await done('filter', ['marek', 'hella', 'bram'], -100, -40);
  await done('spares', ['ines', 'suri', 'hella'], -95, -45, 30);
  await done('wrench', ['suri', 'bram', 'hella'], -90, -40);
  // Begun a while ago, and not over yet.
  const begun = room(['marek', 'suri', 'bram', 'hella'], pieces.hoses.long, -30, -5);
  if (begun !== null) {
    const member = memberOf(begun.name);
    const piece = await takeWork(deps, member, work.hoses.id, {}, begun.from);
    await beginStint(deps, member, piece.id, stintOf(piece), begun.from);
  }
  await taken('brakes', ['ines', 'marek'], 25);
  await taken('cooling', ['bram', 'marek'], 30);
  await taken('seal', ['suri', 'ines'], 20, 'hella');
  await dropWork(deps, memberOf('hella'), work.strap.id, { reason: 'The owner does it herself.' }, now - 25 * MINUTE);
}

async function add(deps: Deps, crew: DemoCrew, piece: Piece, now: number): Promise<WorkDto> {
  const repair = piece.repair ? await findRepairNumbered(deps.dataSource.manager, demoWorkshopId, piece.repair) : null;
  const input: WorkInput = {
    title: piece.title,
    likelyMinutes: piece.likely,
    longMinutes: piece.long,
    skillId: piece.skill ? crew.skills[piece.skill] : null,
    placeId: piece.place ? crew.places[piece.place] : null,
    priority: piece.priority ?? 'usual',
    dueAt: piece.dueH === undefined ? null : halfHour(now + piece.dueH * HOUR),
    repairId: repair?.id ?? null,
    splittable: piece.splittable ?? false,
    note: piece.note ?? null,
  };
  return addWork(deps, memberOf(piece.by), input, now - piece.addedH * HOUR);
}

const halfHour = (at: number): string => new Date(Math.ceil(at / (30 * MINUTE)) * 30 * MINUTE).toISOString();
