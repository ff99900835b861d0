/** The day sheet: everybody's for those who plan the bench, one's own for others. */
import type { PaperQuery } from '@/shared/contract/papers';
import type { Deps, Member } from '../../deps';
import type { ChannelCharge, DayChannel, DayPerson, DayRow } from '../../papers/day-sheet-content';
import { drawDaySheet } from '../../papers/day-sheet';
import type { Paper } from '../../papers/page';
import { paperWords, type PaperWords } from '../../papers/paper-words';
import { chargeCard } from '../charge-dto';
import type { ChargeFile } from '../charge-file';
import { isOpen, isWaitingToStart } from '../charge-stages';
import { clockText, titleOf } from '../charge-words';
import { may } from '../may';
import { groundFor } from './bench-plan.service';
import type { GivenLookIn } from './charge-look-ins';
import { dueOf, ownerOf, type BenchGround } from './ground';
import { heldSpans } from './held-spans';
import { kindOf } from './lanes';
import { linesOf, lookInsOf, type Lines, type PersonLine } from './people-lines';
import { common, overlaps, type Stretch } from './spans';

/** @throws DomainError 400 for a day that is in no calendar */
export async function daySheetPaper(
  deps: Deps,
  member: Member,
  query: PaperQuery & { day?: string },
  now: number,
): Promise<Paper> {
  const ground = await groundFor(deps, member, { day: query.day }, now);
  const everybody = await may(deps.dataSource.manager, member, 'bench:plan');
  const all = linesOf(ground);
  const words = paperWords(ground.workshop.zone, query.decimal ?? 'point', ground.days.from);
  const shown = all.lines.filter(({ person }) => everybody || person.id === member.personId);
  const own = everybody ? null : member.personId;
  const bytes = await drawDaySheet(
    {
      title: own === null ? 'Day sheet' : `Day sheet, ${shown[0]?.person.name ?? member.name}`,
      workshop: ground.workshop.name,
      date: words.dateLong(ground.days.from),
      stand: `As it stood on ${words.date(now)} at ${words.clock(now)}. What changes since stands on the screens.`,
      at: now,
      people: shown.map((line) => personOf(ground, all, line, words)),
      channels: channelsOf(ground, all, own, words),
      cautions: cautionsOf(ground, all, own),
    },
    query.paper ?? 'a4',
  );
  return { name: `day-sheet-${ground.days.day}.pdf`, bytes };
}

const spanText = ({ from, to }: Stretch, words: PaperWords): string => `${words.clock(from)}–${words.clock(to)}`;

function personOf(ground: BenchGround, all: Lines, line: PersonLine, words: PaperWords): DayPerson {
  const { days, work, places } = ground;
  const { person, hands, stints } = line;
  const rows: (DayRow & { at: number })[] = [
    ...hands
      .filter((block) => overlaps(block, days))
      .map((block) => ({ at: block.from, when: spanText(block, words), what: block.title, where: block.place ?? '' })),
    ...stints
      .filter(({ span }) => overlaps(span, days))
      .map(({ stint, span }) => ({
        at: span.from,
        when: spanText(span, words),
        what: work.get(stint.workId)?.title ?? 'Other work',
        where: places.get(stint.placeId ?? '')?.name ?? '',
      })),
    ...lookInsOf(all.lookIns, person.id)
      .filter(({ doneAt, dueAt }) => doneAt === null && dueAt >= days.from && dueAt < days.to)
      .map(({ file, dueAt }) => ({
        at: dueAt,
        when: words.clock(dueAt),
        what: `Look in at ${titleOf(file.charge)}`,
        where: channelNames(file).join(', '),
      })),
  ];
  return {
    name: person.name,
    hours: hoursText(ground, line, words),
    rows: rows.sort((a, b) => a.at - b.at).map(({ when, what, where }) => ({ when, what, where })),
  };
}

function hoursText({ days }: BenchGround, { person }: PersonLine, words: PaperWords): string {
  const off = person.daysOff.find(({ day }) => day === days.day);
  if (off) return off.note === null ? 'Day off' : `Day off: ${off.note}`;
  const hours = common([...person.present, ...person.breaks], [days]);
  if (hours.length === 0) return 'Not working';
  const breaks = common(person.breaks, [days]).map((one) => spanText(one, words));
  return `${hours.map((one) => spanText(one, words)).join(', ')}${breaks.length === 0 ? '' : `, break ${breaks.join(', ')}`}`;
}

const channelNames = ({ charge, channels }: ChargeFile): string[] =>
  [...new Set(charge.option.channelIds)].map((id) => channels.get(id)?.name ?? 'a channel that is gone');

/** Of somebody alone only the channels with their charges. */
function channelsOf(ground: BenchGround, all: Lines, own: string | null, words: PaperWords): DayChannel[] {
  const { channels, files, days, now } = ground;
  return channels
    .map((channel) => ({
      name: channel.name,
      kind: kindOf(channel),
      charges: files
        .filter((file) => own === null || isShownTo(ground, all, file, own))
        .flatMap((file) => {
          const span = heldSpans(file, now).find((one) => one.channelId === channel.id && overlaps(one, days));
          return span === undefined ? [] : [{ at: span.from, row: chargeOf(ground, all.lookIns, file, span, words) }];
        })
        .sort((a, b) => a.at - b.at)
        .map(({ row }) => row),
    }))
    .filter(({ charges }) => own === null || charges.length > 0);
}

const isShownTo = (ground: BenchGround, { lookIns }: Lines, file: ChargeFile, personId: string): boolean =>
  ownerOf(ground, file) === personId || lookIns.some((one) => one.file === file && one.personId === personId);

function chargeOf(
  ground: BenchGround,
  lookIns: readonly GivenLookIn[],
  file: ChargeFile,
  span: Stretch,
  words: PaperWords,
): ChannelCharge {
  const { charge } = file;
  const ready = chargeCard(file, ground.now).ready;
  const dueAt = dueOf(ground, file);
  const at = (instant: string): string => onDay(ground, Date.parse(instant), words);
  return {
    title: titleOf(charge),
    state: isWaitingToStart(charge.stage) ? `clip on ${words.clock(span.from)}` : spanText(span, words),
    ready:
      ready !== null
        ? `${at(ready.likely)} (${words.clock(Date.parse(ready.early))}–${words.clock(Date.parse(ready.late))})`
        : charge.readyAt === null
          ? isOpen(charge.stage)
            ? 'check due'
            : 'taken off'
          : `ready ${onDay(ground, charge.readyAt, words)}`,
    due: dueAt === null ? '' : onDay(ground, dueAt, words),
    lookIns: lookIns
      .filter((one) => one.file === file && one.doneAt === null)
      .map((one) => `${words.clock(one.dueAt)} ${nameOf(ground, one.personId)}`)
      .join(', '),
  };
}

/** Another day than the sheet's is said. */
const onDay = ({ days }: BenchGround, at: number, words: PaperWords): string =>
  at >= days.from && at < days.to ? words.clock(at) : `${words.date(at)} ${words.clock(at)}`;

const nameOf = ({ people }: BenchGround, id: string | null): string =>
  id === null ? 'nobody' : (people.find((one) => one.id === id)?.name ?? 'somebody');

/** Of the charges that are not over, each caution once, with the charges it is of. */
function cautionsOf(ground: BenchGround, all: Lines, own: string | null): string[] {
  const texts = new Map<string, string[]>();
  const add = (text: string, title: string): void => {
    texts.set(text, [...(texts.get(text) ?? []), title]);
  };
  for (const file of ground.files) {
    const { charge } = file;
    if (!isOpen(charge.stage) || (own !== null && !isShownTo(ground, all, file, own))) continue;
    if (!heldSpans(file, ground.now).some((one) => overlaps(one, ground.days))) continue;
    for (const { text } of charge.option.cautions) add(text, titleOf(charge));
    // Each reason once, with the first look-in it is of.
    const told = new Set<string>();
    for (const one of all.lookIns) {
      if (one.file !== file || one.nobody === null || told.has(one.nobody.because)) continue;
      told.add(one.nobody.because);
      const at = clockText(Math.max(one.dueAt, ground.now), ground.workshop.zone, ground.days.from);
      add(`Nobody can look in at ${at}. ${one.nobody.because}`, titleOf(charge));
    }
  }
  return [...texts].map(([text, titles]) => `${[...new Set(titles)].join(', ')}: ${text}`);
}
