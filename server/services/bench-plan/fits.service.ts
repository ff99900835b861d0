/** The work that fits the waits: each piece beside each free stretch, and the best filling of all of them together. */
import { DateTime } from 'luxon';
import type { FillPlacement, FillProblem } from '@/calc/bench/bench-types';
import type { FitDto, FitsDto } from '@/shared/contract/bench-plan';
import type { WorkDto } from '@/shared/contract/work';
import { leastPartMinutes, workWeights } from '@/shared/contract/work-terms';
import type { Deps, Member } from '../../deps';
import type { Work } from '../../entities/work';
import { toInstant } from '../instants';
import { may } from '../may';
import { workDtos } from '../work-dto';
import { loadWorkFiles } from '../work-file';
import { groundFor } from './bench-plan.service';
import { lookInMs } from './charge-look-ins';
import { startOfDay } from './days';
import { fitInto, type PieceToFit } from './fit-check';
import type { BenchGround } from './ground';
import type { GroundPerson } from './ground-people';
import { freeDto, freeOf, linesOf, lookInsOf, type Lines, type PersonLine } from './people-lines';
import { united, type Stretch } from './spans';

interface Wait extends Stretch {
  line: PersonLine;
  lookIns: number[];
}

/** Of everybody for those who plan the bench, of oneself for others; the best filling minds everybody all the same. */
export async function fits(deps: Deps, member: Member, now: number): Promise<FitsDto> {
  const { manager } = deps.dataSource;
  const ground = await groundFor(deps, member, {}, now);
  const all = linesOf(ground);
  const waits = all.lines.flatMap((line) => waitsOf(ground, all, line));
  const pieces = [...ground.work.values()].filter(
    ({ overAt, leftMinutes, leftLongMinutes }) => overAt === null && leftMinutes > 0 && leftLongMinutes > 0,
  );
  const solution = await deps.bench.fills(problemOf(ground, all, waits, pieces));
  const dtos = new Map(
    (await workDtos(manager, member.workshopId, await loadWorkFiles(manager, member.workshopId, pieces))).map((dto) => [
      dto.id,
      dto,
    ]),
  );
  const taken = placesTaken(ground, all);
  const everybody = await may(manager, member, 'bench:plan');
  const shown = all.lines.filter(({ person }) => everybody || person.id === member.personId);
  return {
    at: toInstant(now),
    people: shown.map((line) => ({
      person: { id: line.person.id, name: line.person.name },
      stretches: waits.flatMap((wait, index) =>
        wait.line === line
          ? [
              {
                ...freeDto(ground, all, line.person.id, wait),
                fits: fitsOf(
                  ground,
                  taken,
                  wait,
                  pieces,
                  dtos,
                  solution.placements.filter(({ window }) => window === index),
                ),
              },
            ]
          : [],
      ),
    })),
    proved: solution.proved,
  };
}

/** The next whole minute: a question within it is the same question. */
const originOf = (now: number): number => Math.ceil(now / 60_000) * 60_000;

/** A person's free stretches of today and of their next working day. */
function waitsOf(ground: BenchGround, all: Lines, line: PersonLine): Wait[] {
  const { now, workshop } = ground;
  const origin = originOf(now);
  const midnight = DateTime.fromMillis(now, { zone: workshop.zone }).startOf('day').plus({ days: 1 }).toMillis();
  const next = line.person.present.find(({ from }) => from >= midnight);
  const until =
    next === undefined
      ? midnight
      : DateTime.fromMillis(startOfDay(workshop.zone, next.from), { zone: workshop.zone }).plus({ days: 1 }).toMillis();
  const lookIns = lookInsOf(all.lookIns, line.person.id)
    .filter(({ doneAt }) => doneAt === null)
    .map(({ dueAt }) => Math.max(origin, dueAt));
  return freeOf(line, { from: origin, to: until }).map((free) => ({
    ...free,
    line,
    lookIns: lookIns.filter((at) => at >= free.from && at < free.to),
  }));
}

/** Work is taken by whole minutes; a hair less than one is one. */
const wholeMinutes = (ms: number): number => Math.floor(ms / 60_000 + 1e-6);

const canDo = ({ skillIds }: GroundPerson, { skillId }: Work): boolean =>
  skillId === null || skillIds.includes(skillId);

/** Due times that have passed bind nobody any more: the work is late and still to be done. */
const dueAhead = ({ dueAt }: Work, now: number): number | null => (dueAt === null || dueAt <= now ? null : dueAt);

/** When somebody is at a place: work that is taken, and fits in a bay of its name. */
function placesTaken(ground: BenchGround, all: Lines): Map<string, Stretch[]> {
  const taken = new Map<string, Stretch[]>();
  const add = (placeId: string, span: Stretch): void => {
    if (span.to > ground.now) taken.set(placeId, [...(taken.get(placeId) ?? []), span]);
  };
  const byName = new Map([...ground.places.values()].map(({ id, name }) => [name.toLowerCase(), id]));
  for (const { hands, stints } of all.lines) {
    for (const { stint, span } of stints)
      if (stint.placeId !== null && stint.state !== 'done') add(stint.placeId, span);
    for (const { kind, place, from, to } of hands) {
      const id = kind === 'fit' ? byName.get(place?.toLowerCase() ?? '') : undefined;
      if (id !== undefined) add(id, { from, to });
    }
  }
  return new Map([...taken].map(([id, spans]) => [id, united(spans)]));
}

function problemOf(ground: BenchGround, all: Lines, waits: readonly Wait[], pieces: readonly Work[]): FillProblem {
  const origin = originOf(ground.now);
  const secondsAt = (at: number): number => (at - origin) / 1000;
  return {
    windows: waits.map(({ line, from, to, lookIns }) => ({
      personId: line.person.id,
      fromS: secondsAt(from),
      toS: secondsAt(to),
      lookInsS: lookIns.map(secondsAt),
    })),
    work: pieces.map((piece) => {
      const due = dueAhead(piece, ground.now);
      return {
        id: piece.id,
        likelyS: piece.leftMinutes * 60,
        longS: piece.leftLongMinutes * 60,
        weight: workWeights[piece.priority],
        personIds: ground.people.filter((person) => canDo(person, piece)).map(({ id }) => id),
        placeId: piece.placeId,
        releaseS: 0,
        dueS: due === null ? null : secondsAt(due),
        splittable: piece.splittable,
        leastPartS: leastPartMinutes * 60,
      };
    }),
    placesTaken: Object.fromEntries(
      [...placesTaken(ground, all)].map(([id, spans]) => [
        id,
        spans.map(({ from, to }) => ({ fromS: secondsAt(from), toS: secondsAt(to) })),
      ]),
    ),
    lookInS: lookInMs(ground) / 1000,
  };
}

/** What belongs to the best filling first, then what fits by itself, the weightiest first, then what does not. */
function fitsOf(
  ground: BenchGround,
  taken: ReadonlyMap<string, Stretch[]>,
  wait: Wait,
  pieces: readonly Work[],
  dtos: ReadonlyMap<string, WorkDto>,
  placements: readonly FillPlacement[],
): FitDto[] {
  const { now, workshop, places } = ground;
  const origin = originOf(now);
  const found = pieces.flatMap((piece): { piece: Work; dto: FitDto }[] => {
    const work = dtos.get(piece.id);
    if (!work) return [];
    const best = placements.find(({ workId }) => workId === piece.id);
    if (best !== undefined) {
      const span = { from: toInstant(origin + best.fromS * 1000), to: toInstant(origin + best.toS * 1000) };
      const minutes = wholeMinutes(best.workedS * 1000);
      return [{ piece, dto: { work, span, minutes, suggested: true, overByMinutes: null, because: null } }];
    }
    const place = places.get(piece.placeId ?? '');
    const asked: PieceToFit = {
      longMs: piece.leftLongMinutes * 60_000,
      splittable: piece.splittable,
      dueAt: dueAhead(piece, now),
      place: place === undefined ? null : { name: place.name, taken: taken.get(place.id) ?? [] },
      lacks: canDo(wait.line.person, piece) ? null : (work.skill?.name ?? 'a skill'),
    };
    const fit = fitInto(wait, asked, lookInMs(ground), workshop.zone, now);
    const minutes = wholeMinutes(fit.fits ? fit.workedMs : asked.longMs);
    const rest = fit.fits
      ? { span: { from: toInstant(fit.from), to: toInstant(fit.to) }, overByMinutes: null, because: null }
      : { span: null, overByMinutes: fit.overByMinutes, because: fit.because };
    return [{ piece, dto: { work, minutes, suggested: false, ...rest } }];
  });
  const rank = ({ dto }: (typeof found)[number]): number => (dto.suggested ? 0 : dto.span !== null ? 1 : 2);
  const worth = ({ piece, dto }: (typeof found)[number]): number => workWeights[piece.priority] * dto.minutes;
  return found
    .sort(
      (a, b) =>
        rank(a) - rank(b) ||
        (a.dto.overByMinutes ?? Infinity) - (b.dto.overByMinutes ?? Infinity) ||
        worth(b) - worth(a),
    )
    .map(({ dto }) => dto);
}
