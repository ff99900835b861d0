/** What the bench plan says of a charge in its lane. Pure; instants are epoch ms. */
import type { BenchPlanDto, PlanChannelDto, PlanChargeDto, QueueRowDto } from '@/shared/contract/bench-plan';
import { isToCome, stageWords, type CardClock } from '../charge/card-model';
import { clock, date, dateLong, moment, readyWithBand } from '../format/clock';
import { duration, overBy } from '../format/duration';
import type { LocaleMarks } from '../format/marks';
import { ribbonTwin } from '../wait-ribbon/twin';
import type { LanePiece } from './lane-pieces';

export interface Wording {
  zone: string;
  marks: LocaleMarks;
}

export interface ChargeTag {
  text: string;
  /** Red: late. Bold: somebody is needed. */
  tone: 'plain' | 'bold' | 'alarm';
}

const lateBy = (minutes: number) => `${duration(minutes * 60, 'minute')} late`;

/** The word behind a charge's name in its lane; null: nothing but its shape needs saying. */
export function chargeTag(
  { card }: PlanChargeDto,
  queued: QueueRowDto | undefined,
  now: number,
  { zone, marks }: Wording,
): ChargeTag | null {
  if (card.overdueSince !== null) return { text: overBy((now - Date.parse(card.overdueSince)) / 1000), tone: 'alarm' };
  if (card.stage === 'check-due') return { text: 'check due', tone: 'bold' };
  if (card.nextHand !== null) return { text: card.nextHand.toLowerCase(), tone: 'bold' };
  if (isToCome(card))
    return queued && queued.lateByMinutes > 0 ? { text: lateBy(queued.lateByMinutes), tone: 'alarm' } : null;
  if (card.stage === 'held' || card.stage === 'stopped') return { text: card.stage, tone: 'plain' };
  if (card.readyAt !== null) return { text: `ready ${clock(Date.parse(card.readyAt), zone, marks)}`, tone: 'plain' };
  return card.stage === 'shelved' ? { text: 'back on the shelf', tone: 'plain' } : null;
}

/** The silhouette in words, for readers: 'R-2418 on B1, queued. Charging, constant current until 15:30, …' */
export function pieceWords(
  piece: LanePiece,
  channelName: string,
  tag: ChargeTag | null,
  at: CardClock,
  zero: number,
  { zone, marks }: Wording,
): string {
  const { card, fixedBecause } = piece.charge;
  const { ribbon } = piece;
  const course = ribbonTwin({
    segments: piece.segments,
    band: piece.band,
    hanging: ribbon.hanging,
    nowS: ribbon.nowS,
    heldFromS: ribbon.heldFromS,
    stoppedAtS: ribbon.stoppedAtS,
    at: (s) => moment(zero + s * 1000, zone, at.now, marks),
  });
  const stage = stageWords(card).toLowerCase();
  const state = tag === null || tag.text === stage ? stage : `${stage}, ${tag.text}`;
  const clipOn = isToCome(card) ? ` Clip on ${moment(piece.from, zone, at.now, marks)}.` : '';
  return `${card.title} on ${channelName}, ${state}.${clipOn} ${course}${fixedBecause === null ? ' Can be moved.' : ''}`;
}

/** '6 charges, 1 late' */
export const countWords = ({ counts }: Pick<BenchPlanDto, 'counts'>): string =>
  [
    counts.charges === 0 ? 'no charges' : `${counts.charges} ${counts.charges === 1 ? 'charge' : 'charges'}`,
    ...(counts.late > 0 ? [`${counts.late} late`] : []),
  ].join(', ');

/** 'next free channel C1, now'; null where nobody can say of any. */
export function nextFreeWords(channels: readonly PlanChannelDto[], now: number, wording: Wording): string | null {
  const [soonest] = channels
    .filter((channel) => channel.freeAt !== null)
    .sort((a, b) => Math.max(now, Date.parse(a.freeAt ?? '')) - Math.max(now, Date.parse(b.freeAt ?? '')));
  if (!soonest?.freeAt) return null;
  return `next free channel ${soonest.name}, ${freeWords(soonest.freeAt, now, wording)}`;
}

/** 'now', or when: '17:25'. The clock of the screen goes by minutes. */
export const freeWords = (freeAt: string, now: number, { zone, marks }: Wording): string =>
  Date.parse(freeAt) < now + 60_000 ? 'now' : moment(Date.parse(freeAt), zone, now, marks);

/** 'ready 17:05 (16:40–18:05), due 18:15' */
export function readyWords(
  { ready, dueAt }: Pick<QueueRowDto, 'ready' | 'dueAt'>,
  now: number,
  { zone, marks }: Wording,
): string {
  const band = { p10: Date.parse(ready.early), p50: Date.parse(ready.likely), p90: Date.parse(ready.late) };
  const due = dueAt === null ? '' : `, due ${moment(Date.parse(dueAt), zone, now, marks)}`;
  return `${readyWithBand(band, zone, now, marks)}${due}`;
}

/** 'B1 at 14:00' */
export const placeWords = (
  { channelNames, clipOnAt }: { channelNames: readonly string[]; clipOnAt: string },
  now: number,
  { zone, marks }: Wording,
): string => `${channelNames.join(', ')} at ${moment(Date.parse(clipOnAt), zone, now, marks)}`;

/** 'on time', '22 min late' */
export const latenessWords = (minutes: number): string => (minutes > 0 ? lateBy(minutes) : 'on time');

/** 'Tuesday 9 June', of a week 'Tue 9 June to Mon 15 June'. */
export const daysWords = ({ from, to, days }: Pick<BenchPlanDto, 'from' | 'to' | 'days'>, zone: string): string =>
  days === 1
    ? dateLong(Date.parse(from), zone)
    : `${date(Date.parse(from), zone)} to ${date(Date.parse(to) - 1, zone)}`;
