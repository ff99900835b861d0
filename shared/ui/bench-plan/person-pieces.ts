/** What is drawn in the lane of a person: own work, fills, breaks and free time as docks, look-ins as pegs. Pure. */
import type { FreeStretchDto, PlanBlockDto, PlanLookInDto, PlanPersonDto } from '@/shared/contract/bench-plan';
import { clock } from '../format/clock';
import { NBSP } from '../format/marks';
import type { Dock } from '../wait-ribbon/dock-lane';
import type { LookIn } from '../wait-ribbon/layout';
import type { Wording } from './charge-words';
import { toX, type PlanAxis } from './plan-axis';

/** px of a letter of a dock's title; a little more than the face takes. */
const letter = 6.8;
/** What a dock keeps free beside its title, px: less in a narrow one, nothing in a break. */
const airOf = (room: number, kind: Dock['kind']): number =>
  kind === 'break' ? 0 : kind === 'free' || room < 64 ? 9 : 17;
/** Narrower than this a free stretch is no target of its own: it is in the list beside. */
const targetRoom = 48;

const span = (from: string, to: string, { zone, marks }: Wording) =>
  `${clock(Date.parse(from), zone, marks)} to ${clock(Date.parse(to), zone, marks)}`;

/** 'Hose R-2420, bay 1, 14:13 to 14:48, begun' */
export function blockWords(block: PlanBlockDto, wording: Wording): string {
  const state = block.stint && block.stint.state !== 'taken' ? block.stint.state.replace('-', ' ') : null;
  return [
    block.kind === 'fill' ? `Fill: ${block.title}` : block.title,
    block.place,
    span(block.from, block.to, wording),
    state,
  ]
    .filter((part) => part !== null)
    .join(', ');
}

/** '134 min free, 14:56 to 17:10, while R-2415 charges' */
export const freeWords = (free: FreeStretchDto, wording: Wording): string =>
  [
    `${free.minutes} min free`,
    span(free.from, free.to, wording),
    ...(free.waitOf ? [`while ${free.waitOf.title} is awaited`] : []),
  ].join(', ');

/** The first of the titles that has room whole; else the last of them, which may be cut short. */
function titleIn(room: number, kind: Dock['kind'], titles: readonly string[]): string {
  const fits = (title: string) => title.length * letter <= room - airOf(room, kind);
  return titles.find(fits) ?? titles.at(-1) ?? '';
}

/** What a block is called where its room is short: 'Fit R-2411' is 'R-2411'. A fill keeps its own words. */
const titlesOf = ({ kind, title }: PlanBlockDto): string[] =>
  kind === 'fill' ? [title] : [title, title.split(' ').at(-1) ?? '', ''];

/**
 * The docks of a person on the axis, in the order of their begin. Seconds count from the axis's left end.
 *
 * @param onFree what a press on a free stretch that is to come does
 */
export function personDocks(
  person: PlanPersonDto,
  axis: PlanAxis,
  now: number,
  wording: Wording,
  onFree?: () => void,
): Dock[] {
  const s = (instant: string) => (Date.parse(instant) - axis.from) / 1000;
  const roomOf = (one: { from: string; to: string }) =>
    Math.min(axis.width, toX(axis, Date.parse(one.to))) - Math.max(0, toX(axis, Date.parse(one.from)));
  const docks: Dock[] = [
    ...person.blocks.map((block, index): Dock => ({
      key: `b${index}`,
      fromS: s(block.from),
      toS: s(block.to),
      kind: block.kind === 'fill' ? 'fill' : 'own',
      title: titleIn(roomOf(block), block.kind === 'fill' ? 'fill' : 'own', titlesOf(block)),
      label: blockWords(block, wording),
    })),
    ...person.breaks.map((pause, index): Dock => ({
      key: `p${index}`,
      fromS: s(pause.from),
      toS: s(pause.to),
      kind: 'break',
      title: titleIn(roomOf(pause), 'break', ['Break', '']),
      label: `Break, ${span(pause.from, pause.to, wording)}`,
    })),
    ...person.free.map((free, index): Dock => {
      const room = roomOf(free);
      const ahead = Date.parse(free.to) > now;
      return {
        key: `f${index}`,
        fromS: s(free.from),
        toS: s(free.to),
        kind: 'free',
        title: titleIn(room, 'free', [`${free.minutes}${NBSP}min free`, `${free.minutes}${NBSP}min`, '']),
        label: freeWords(free, wording),
        onPress: ahead && room >= targetRoom ? onFree : undefined,
      };
    }),
  ];
  const end = (axis.to - axis.from) / 1000;
  return docks.filter((dock) => dock.toS > 0 && dock.fromS < end).sort((a, b) => a.fromS - b.fromS);
}

export interface PersonPeg {
  key: string;
  /** Seconds from the left end of the axis. */
  s: number;
  state: LookIn['state'];
  /** Its time is over and nobody has looked in. */
  missed: boolean;
  label: string;
}

/** The look-ins of a person: where they were done, or when they are due. */
export function personPegs(
  lookIns: readonly PlanLookInDto[],
  axis: PlanAxis,
  now: number,
  wording: Wording,
): PersonPeg[] {
  const sorted = [...lookIns].sort((a, b) => Date.parse(a.dueAt) - Date.parse(b.dueAt));
  const next = sorted.find(({ doneAt }) => doneAt === null);
  return sorted.map((one) => {
    const missed = one.doneAt === null && Date.parse(one.dueAt) < now;
    const at = clock(Date.parse(one.doneAt ?? one.dueAt), wording.zone, wording.marks);
    return {
      key: `${one.chargeId}-${one.dueAt}`,
      s: (Date.parse(one.doneAt ?? one.dueAt) - axis.from) / 1000,
      state: one.doneAt !== null ? 'done' : one === next ? 'next' : 'later',
      missed,
      label: `Look-in at ${one.title}, ${one.channelName}, ${one.doneAt !== null ? `done ${at}` : missed ? `missed ${at}` : at}`,
    };
  });
}

/** Why a person has no hours in the days shown: 'off: holiday', 'not in'; null: they have some. */
export function absence({ present, daysOff }: Pick<PlanPersonDto, 'present' | 'daysOff'>): string | null {
  if (present.length > 0) return null;
  const off = daysOff[0];
  if (!off) return 'not in';
  return off.note ? `off: ${off.note}` : 'off';
}
