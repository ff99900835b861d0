/** What the wall says of a charge, and which of its layouts holds. Pure: instants are epoch ms, sizes px of a 1920 px wide picture. */
import type { ChargeCardDto } from '@/shared/contract/charge';
import { movedMs } from '../charge/card-model';
import { clock, readyBounds, told } from '../format/clock';
import { EN_DASH, pointMarks, type LocaleMarks } from '../format/marks';
import { dayOf } from '../format/zone';
import { stages, type StageId, type StageMark } from '../stage/stages';

const ms = (instant: string | null): number | null => (instant === null ? null : Date.parse(instant));

/** Stages that have a block on the wall. */
export const wallStages = [
  'queued',
  'charging',
  'discharging',
  'tapering',
  'resting',
  'check-due',
  'ready',
  'held',
  'stopped',
] as const satisfies readonly StageId[];
export type WallStage = (typeof wallStages)[number];

export type WallCard = ChargeCardDto & { stage: WallStage };

/** Charges that stand on the wall; the server has put them in their order. */
export const wallCards = (charges: readonly ChargeCardDto[]): WallCard[] =>
  charges.filter((charge): charge is WallCard => (wallStages as readonly string[]).includes(charge.stage));

/** The sign and hue of a row: its stage, or that it is overdue. */
export const markOf = (card: WallCard): StageMark & string => (card.overdueSince === null ? card.stage : 'overdue');

export type WallLayout = 'empty' | 'upTo6' | 'seven' | 'upTo14' | 'more';

/** Rows up to seven, two columns of seven up to fourteen; of more the fourteen soonest. */
export const layoutOf = (count: number): WallLayout =>
  count === 0 ? 'empty' : count <= 6 ? 'upTo6' : count === 7 ? 'seven' : count <= 14 ? 'upTo14' : 'more';
export const mostCells = 14;

/** '6 charges, 1 overdue, 2 checks due' */
export function countsOf(cards: readonly WallCard[]): string {
  if (cards.length === 0) return 'no charges';
  const overdue = cards.filter((card) => card.overdueSince !== null).length;
  const checks = cards.filter((card) => card.overdueSince === null && card.stage === 'check-due').length;
  return [
    `${cards.length} ${cards.length === 1 ? 'charge' : 'charges'}`,
    ...(overdue > 0 ? [`${overdue} overdue`] : []),
    ...(checks > 0 ? [`${checks} ${checks === 1 ? 'check' : 'checks'} due`] : []),
  ].join(', ');
}

/** The large word at the right and the small one under it. `unit` is set small behind the large one. */
export interface WallTime {
  large: string;
  unit?: string;
  small: string;
}

/** Minutes up to an hour, '1 h 22' beyond. */
function waited(since: number, now: number): Pick<WallTime, 'large' | 'unit'> {
  const minutes = Math.max(0, Math.floor((now - since) / 60_000));
  if (minutes < 60) return { large: String(minutes), unit: 'min' };
  if (minutes < 24 * 60)
    return { large: `${Math.floor(minutes / 60)}:${String(minutes % 60).padStart(2, '0')}`, unit: 'h' };
  return { large: String(Math.floor(minutes / 1440)), unit: minutes < 2880 ? 'day' : 'days' };
}

/** 'Wed 10:00' needs the room of two numbers: the day stands under the time. */
function dayPrefix(instant: number, zone: string, now: number): string {
  if (dayOf(instant, zone) === dayOf(now, zone)) return '';
  const day = new Intl.DateTimeFormat('en-GB', { weekday: 'short', timeZone: zone }).format(instant);
  return `${day} `;
}

/** How far what is to come has moved since the server made the board: what waits moves with the clock. */
export const movedBy = (card: WallCard, boardAt: number, now: number): number => movedMs(card, { now, asOf: boardAt });

/**
 * The time of a row: when it will be ready with its band; minutes over, or waiting, in its place.
 *
 * @param stale the link is down: `now` is the last instant heard, and what was 'now' is 'then'
 */
export function timeOf(card: WallCard, { now, boardAt, zone, stale = false, marks = pointMarks }: WallClock): WallTime {
  const moved = movedBy(card, boardAt, now);
  const at = (instant: string) => Date.parse(instant) + moved;
  const toldLikely = (likely: number) => told(likely, likely, now);
  const overdue = ms(card.overdueSince);
  const checkDue = ms(card.checkDueAt);
  if (overdue !== null) {
    const small =
      card.stage === 'check-due' || !card.ready
        ? 'check waiting'
        : `over, ${stale ? 'then' : 'now'} ${clock(toldLikely(at(card.ready.likely)), zone, marks)}`;
    return { ...waited(overdue, now), small };
  }
  if (card.stage === 'check-due') return { ...waited(checkDue ?? now, now), small: 'check waiting' };
  if (card.stage === 'ready') return { large: 'ready', small: 'to be fitted' };
  if (card.stage === 'stopped') return { large: clock(ms(card.stoppedAt) ?? now, zone, marks), small: 'stopped' };
  if (!card.ready) return { large: EN_DASH, small: 'not known yet' };
  const band = { p10: at(card.ready.early), p50: at(card.ready.likely), p90: at(card.ready.late) };
  const likely = told(band.p50, band.p50, now);
  return {
    large: clock(likely, zone, marks),
    small: `${dayPrefix(likely, zone, now)}${readyBounds(band, zone, now, marks)}`,
  };
}

export interface WallClock {
  /** The instant the board shows, epoch ms; while it is stale the last one heard. */
  now: number;
  /** When the server made the board. */
  boardAt: number;
  zone: string;
  stale?: boolean;
  marks?: LocaleMarks;
}

/** 'R-' is small before the number, so that the digits carry. */
export function splitTitle(title: string): { prefix: string; rest: string } {
  const parts = /^([A-Za-z]{1,3}-)(\d.*)$/.exec(title);
  return parts ? { prefix: parts[1]!, rest: parts[2]! } : { prefix: '', rest: title };
}

/** 'B2 · Bram' */
export const whereAndWho = (card: WallCard): string =>
  [
    card.channelNames.length > 2
      ? `${card.channelNames[0]} +${card.channelNames.length - 1}`
      : card.channelNames.join(' '),
    card.person?.name.split(' ')[0] ?? '',
  ]
    .filter(Boolean)
    .join(' · ');

/** A row in words, for readers. */
export function rowWords(card: WallCard, time: WallTime): string {
  const word = stages[markOf(card)].word;
  return [card.title, word, whereAndWho(card), [time.large, time.unit].filter(Boolean).join(' '), time.small].join(
    ', ',
  );
}

/** Of more than fourteen: 'and 5 more, next at 18:40'. */
export function moreWords(hidden: readonly WallCard[], zone: string, marks = pointMarks): string {
  const next = hidden.flatMap((card) => (card.ready ? [Date.parse(card.ready.likely)] : [])).sort((a, b) => a - b)[0];
  return `and ${hidden.length} more${next === undefined ? '' : `, next at ${clock(next, zone, marks)}`}`;
}

const numberWords = [
  'No',
  'One',
  'Two',
  'Three',
  'Four',
  'Five',
  'Six',
  'Seven',
  'Eight',
  'Nine',
  'Ten',
  'Eleven',
  'Twelve',
];

/** 'Six channels free.' */
export function freeWords(free: number): string {
  return `${numberWords[free] ?? free} ${free === 1 ? 'channel' : 'channels'} free.`;
}
