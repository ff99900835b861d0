/** The lines of people: hands, fits, other work, look-ins, and what is free between. */
import { DateTime } from 'luxon';
import type { FreeStretchDto, PlanBlockDto, PlanPersonDto } from '@/shared/contract/bench-plan';
import type { WorkStint } from '../../entities/work-stint';
import type { ChargeFile } from '../charge-file';
import { isOpen } from '../charge-stages';
import { titleOf } from '../charge-words';
import { toInstant } from '../instants';
import { givenLookIns, lookInDto, type GivenLookIn } from './charge-look-ins';
import { hasTime, ownerOf, type BenchGround } from './ground';
import type { GroundPerson } from './ground-people';
import { endsOf, handsOf, type HandBlock } from './hands';
import { freeIn, laidOut } from './lines';
import { common, overlaps, type Stretch } from './spans';
import { stintSpan } from './stint-spans';
import { tooLongText } from './too-long';

/** What fitting a ready module takes where the workshop has not said, min. A guess of the trade. */
const FIT_MINUTES = 60;

export interface PersonLine {
  person: GroundPerson;
  hands: HandBlock[];
  stints: { stint: WorkStint; span: Stretch }[];
}

export interface Lines {
  lines: PersonLine[];
  lookIns: GivenLookIn[];
}

/** Everybody's line, and who looks in when. */
export function linesOf(ground: BenchGround): Lines {
  const { now, people, files, stints, workshop } = ground;
  const fitMs = (workshop.fitMinutes ?? FIT_MINUTES) * 60_000;
  const wanted = new Map<string, HandBlock[]>();
  for (const file of files.filter((one) => hasTime(one, now))) {
    const owner = ownerOf(ground, file);
    const repair = ground.repairs.get(file.charge.repairId ?? '')?.repair ?? null;
    const fits = repair !== null && (isOpen(file.charge.stage) || file.charge.stage === 'fitted');
    const blocks = handsOf(file, fits ? { ms: fitMs, bay: repair.bay } : null, now);
    if (owner !== null) wanted.set(owner, [...(wanted.get(owner) ?? []), ...blocks]);
  }
  const lines = people.map((person): PersonLine => {
    const own = stints
      .filter(({ personId }) => personId === person.id)
      .map((stint) => ({ stint, span: stintSpan(stint, now) }));
    const kept = own.filter(({ stint }) => stint.state !== 'done').map(({ span }) => span);
    return { person, stints: own, hands: laidOut(wanted.get(person.id) ?? [], kept, person.present) };
  });
  return { lines, lookIns: givenLookIns(ground, new Map(lines.map(({ person, hands }) => [person.id, hands]))) };
}

/** What is free of a person's hours within a window. */
export const freeOf = ({ person, hands, stints }: PersonLine, window: Stretch): Stretch[] =>
  freeIn(person.present, [...hands, ...stints.map(({ span }) => span)], window);

/** The charge that a person waits for at an instant: of their own the one that is ready first. */
export function waitOf(ground: BenchGround, personId: string, at: number): FreeStretchDto['waitOf'] {
  const waiting = ground.files
    .filter((file) => isOpen(file.charge.stage) && file.charge.stage !== 'ready' && isOf(ground, file, personId))
    .map((file) => ({ file, readyAt: endsOf(file, ground.now).readyAt }))
    .filter(({ file, readyAt }) => begunAt(file) <= at && readyAt > at)
    .sort((a, b) => a.readyAt - b.readyAt)[0];
  return waiting ? { chargeId: waiting.file.charge.id, title: titleOf(waiting.file.charge) } : null;
}

const begunAt = ({ charge }: ChargeFile): number => charge.startedAt ?? charge.clipOnAt;
const isOf = (ground: BenchGround, file: ChargeFile, personId: string): boolean =>
  ownerOf(ground, file) === personId ||
  (ground.repairs.get(file.charge.repairId ?? '')?.personIds.includes(personId) ?? false);

export function freeDto(ground: BenchGround, { lookIns }: Lines, personId: string, free: Stretch): FreeStretchDto {
  return {
    from: toInstant(free.from),
    to: toInstant(free.to),
    minutes: Math.floor((free.to - free.from) / 60_000),
    waitOf: waitOf(ground, personId, free.from),
    lookIns: lookInsOf(lookIns, personId)
      .filter(({ dueAt, doneAt }) => doneAt === null && dueAt >= free.from && dueAt < free.to)
      .map(({ dueAt }) => toInstant(dueAt)),
  };
}

export const lookInsOf = (lookIns: readonly GivenLookIn[], personId: string): GivenLookIn[] =>
  lookIns.filter((one) => one.personId === personId);

export function personDto(ground: BenchGround, all: Lines, line: PersonLine): PlanPersonDto {
  const { days, now } = ground;
  const { person, hands, stints } = line;
  const within = (stretches: readonly Stretch[]) =>
    common(stretches, [days]).map(({ from, to }) => ({ from: toInstant(from), to: toInstant(to) }));
  const blocks = [
    ...hands.map((block) => ({ span: block, dto: handDto(block) })),
    ...stints.map(({ stint, span }) => ({ span, dto: fillDto(ground, line, stint, span) })),
  ];
  return {
    person: { id: person.id, name: person.name },
    skills: person.skills,
    present: within(person.present),
    breaks: within(person.breaks),
    daysOff: person.daysOff.filter(({ day }) => isShown(ground, day)),
    blocks: blocks
      .filter(({ span }) => overlaps(span, days))
      .sort((a, b) => a.span.from - b.span.from)
      .map(({ dto }) => dto),
    free: freeOf(line, { from: Math.max(now, days.from), to: days.to }).map((free) =>
      freeDto(ground, all, person.id, free),
    ),
    lookIns: lookInsOf(all.lookIns, person.id)
      .filter(({ dueAt, doneAt }) => isIn(doneAt ?? dueAt, days))
      .map((one) => lookInDto(ground, one)),
  };
}

const isIn = (at: number, { from, to }: Stretch): boolean => at >= from && at < to;

/** Days of one zone compare as their names do; the last one is that of the last instant. */
function isShown({ days, workshop }: BenchGround, day: string): boolean {
  const last = DateTime.fromMillis(days.to - 1, { zone: workshop.zone }).toFormat('yyyy-MM-dd');
  return day >= days.day && day <= last;
}

const handDto = ({ from, to, kind, title, chargeId, repairId, place }: HandBlock): PlanBlockDto => ({
  ...{ kind, title, chargeId, repairId, place, workId: null, stint: null, tooLong: null },
  from: toInstant(from),
  to: toInstant(to),
});

function fillDto(ground: BenchGround, { hands, person }: PersonLine, stint: WorkStint, span: Stretch): PlanBlockDto {
  const { work, places, repairs } = ground;
  const { from, to } = span;
  const piece = work.get(stint.workId);
  const number = repairs.get(piece?.repairId ?? '')?.repair.number;
  return {
    kind: 'fill',
    title: [piece?.title ?? 'Other work', number].filter(Boolean).join(' '),
    chargeId: stint.waitChargeId,
    repairId: piece?.repairId ?? null,
    workId: stint.workId,
    stint: { id: stint.id, state: stint.state },
    tooLong: tooLongText(ground, stint, span, hands, person.present),
    place: places.get(stint.placeId ?? '')?.name ?? null,
    from: toInstant(from),
    to: toInstant(to),
  };
}
