/** What would shorten the waits: calculations over the workshop's own history, off the event loop. */
import type { EntityManager } from 'typeorm';
import { chemistryParameters, voltsAtSoc } from '@/calc/index';
import type {
  ChannelsNeededInput,
  Levers,
  ReplayJobDto,
  ShelfDto,
  ShelfInput,
  WhatIfInput,
} from '@/shared/contract/waits-replay';
import type { Deps, Member } from '../../deps';
import type { ModuleType } from '../../entities/module-type';
import { invalid } from '../../errors/domain-error';
import { listChannels } from '../../repositories/chargers.repository';
import { findModuleType } from '../../repositories/module-types.repository';
import { lastSpareReadings, listSpares, openChargesBySpare } from '../../repositories/spares.repository';
import { recordedTargets } from '../../repositories/waits.repository';
import { gatherHistory, gatherKinds, handsOf, replayType, type Gathered } from './gather-history';
import type { ReplayChange, ReplayType } from './replay-history';
import { ReplayProblem } from './replay-jobs';
import { waitAsk } from './wait-filter';

/** Begins the replay of each question, and of all together. @throws DomainError 400 with the field at fault */
export async function beginWhatIf(deps: Deps, member: Member, body: WhatIfInput, now: number): Promise<ReplayJobDto> {
  const { manager } = deps.dataSource;
  const { questions, together, ...period } = body;
  const ask = await waitAsk(manager, member.workshopId, period, now);
  for (const levers of questions) await assertLevers(manager, member.workshopId, levers);
  return begin(deps, member, 'what-if', now, async (control) => {
    const gathered = await gatherHistory(manager, ask);
    const found = await deps.waits.run({
      ...{ kind: 'what-if', history: gathered.history, together: together && questions.length > 1, control },
      questions: questions.map((levers) => changeOf(levers, gathered)),
    });
    if (found === null) return null;
    const answers = questions.map((levers, place) => ({ levers, replay: found.answers[place]! }));
    return { whatIf: { now: found.now, answers, together: found.together, leftOut: gathered.leftOut } };
  });
}

/** Begins the search for the least channels of a kind. @throws DomainError 400 with the field at fault */
export async function beginChannelsNeeded(
  deps: Deps,
  member: Member,
  body: ChannelsNeededInput,
  now: number,
): Promise<ReplayJobDto> {
  const { manager } = deps.dataSource;
  const { channelId, wishedP90Hours, ...period } = body;
  const ask = await waitAsk(manager, member.workshopId, period, now);
  await assertChannel(manager, member.workshopId, 'channelId', channelId);
  return begin(deps, member, 'channels', now, async (control) => {
    const { history, kindOf, leftOut } = await gatherHistory(manager, ask);
    const channelKind = kindOf.get(channelId);
    if (channelKind === undefined) throw new ReplayProblem('This channel is not kept here any more. Choose another.');
    const found = await deps.waits.run({ kind: 'channels', history, channelKind, wishedP90Hours, control });
    if (found === null) return null;
    if (!found.enough) return { channels: found };
    return { channels: { ...found, present: history.kinds[channelKind]!.count, leftOut } };
  });
}

/** Begins the curve of a module type's shelf voltage. @throws DomainError 400 with the field at fault */
export async function beginShelf(deps: Deps, member: Member, body: ShelfInput, now: number): Promise<ReplayJobDto> {
  const { manager } = deps.dataSource;
  const { moduleTypeId } = body;
  const ask = await waitAsk(manager, member.workshopId, body, now);
  const type = await knownType(manager, member.workshopId, 'moduleTypeId', moduleTypeId);
  return begin(deps, member, 'shelf', now, async (control) => {
    const targets = await recordedTargets(manager, ask.filter);
    const stockVolts = await stockOf(manager, member.workshopId, moduleTypeId);
    const { kinds } = await gatherKinds(manager, member.workshopId);
    const window = windowOf(type);
    const history = { kinds, types: [replayType(type)], hands: handsOf(ask.workshop) };
    const found = await deps.waits.run({ kind: 'shelf', history, targets, stockVolts, window, control });
    if (found === null) return null;
    const named = { moduleTypeId, typeName: type.name };
    if (!found.enough) return { shelf: { ...found, ...named } };
    if (found.curve.length === 0)
      throw new ReplayProblem(
        'From no volts of the storage window can the present channels bring a spare to every target. A channel that discharges is missing, or one with enough volts.',
      );
    const { presentVolts, presentMinutes, ...rest } = found;
    const shelf: ShelfDto = {
      ...{ ...rest, ...named, window },
      now:
        presentVolts === null ? null : { volts: presentVolts, meanMinutes: presentMinutes, spares: stockVolts.length },
    };
    return { shelf };
  });
}

export const replayJob = (deps: Deps, member: Member, id: string): ReplayJobDto =>
  deps.waits.jobs.find(member.workshopId, id);

export const cancelReplay = (deps: Deps, member: Member, id: string): ReplayJobDto =>
  deps.waits.jobs.cancel(member.workshopId, id);

const begin = (
  { waits, log }: Deps,
  member: Member,
  kind: ReplayJobDto['kind'],
  now: number,
  work: Parameters<Deps['waits']['jobs']['begin']>[3],
): ReplayJobDto =>
  waits.jobs.begin(member.workshopId, kind, now, work, (error) =>
    log.error({ err: error, kind }, 'a calculation over the waits failed'),
  );

/** @throws DomainError 400 */
async function assertLevers(manager: EntityManager, workshopId: string, levers: Levers): Promise<void> {
  const { moreLikeChannelId, amps, shelf } = levers;
  if (moreLikeChannelId !== undefined) await assertChannel(manager, workshopId, 'questions', moreLikeChannelId);
  if (amps !== undefined) await assertChannel(manager, workshopId, 'questions', amps.channelId);
  if (shelf === undefined) return;
  const type = await knownType(manager, workshopId, 'questions', shelf.moduleTypeId);
  const { lowVolts, highVolts } = windowOf(type);
  if (shelf.volts < lowVolts || shelf.volts > highVolts)
    throw invalid({
      questions: `${type.name} is stored between ${lowVolts.toFixed(3)} and ${highVolts.toFixed(3)}\u00a0V a group. Type volts within.`,
    });
}

async function assertChannel(manager: EntityManager, workshopId: string, field: string, id: string): Promise<void> {
  const known = (await listChannels(manager, workshopId)).some((channel) => channel.id === id);
  if (!known) throw invalid({ [field]: 'This channel is not here. Choose one of the list.' });
}

async function knownType(manager: EntityManager, workshopId: string, field: string, id: string): Promise<ModuleType> {
  const type = await findModuleType(manager, workshopId, id);
  if (!type) throw invalid({ [field]: 'This module type is not here. Choose one of the list.' });
  return type;
}

function changeOf(levers: Levers, { kindOf, typeOf }: Gathered): ReplayChange {
  const { moreLikeChannelId, amps, shelf, ...others } = levers;
  const kind = (id: string): number => {
    const found = kindOf.get(id);
    if (found === undefined) throw new ReplayProblem('A channel of the question is not kept here any more.');
    return found;
  };
  return {
    ...others,
    ...(moreLikeChannelId === undefined ? {} : { moreOfKind: kind(moreLikeChannelId) }),
    ...(amps === undefined ? {} : { amps: { kind: kind(amps.channelId), amps: amps.amps } }),
    ...(shelf === undefined ? {} : { shelf: { type: typeOf.get(shelf.moduleTypeId) ?? -1, volts: shelf.volts } }),
  };
}

/** In which the chemistry keeps best, volts of a group; held to the type's own limits. */
function windowOf(type: ModuleType): { lowVolts: number; highVolts: number } {
  const { storageSoc } = chemistryParameters(type.chemistry);
  const { curve, floorVolts, capVolts }: ReplayType = replayType(type);
  return {
    lowVolts: Math.max(floorVolts, voltsAtSoc(curve, storageSoc.low)),
    highVolts: Math.min(capVolts, voltsAtSoc(curve, storageSoc.high)),
  };
}

/** Mean rest volts of a group of each sound spare of a type that lies on the shelf. */
async function stockOf(manager: EntityManager, workshopId: string, moduleTypeId: string): Promise<number[]> {
  const readings = await lastSpareReadings(manager, workshopId);
  const charging = await openChargesBySpare(manager, workshopId);
  return (await listSpares(manager, workshopId)).flatMap((spare) => {
    const reading = readings.get(spare.id);
    const isStock =
      spare.moduleTypeId === moduleTypeId &&
      spare.fittedAt === null &&
      spare.quarantinedAt === null &&
      spare.condition === 'sound' &&
      !charging.has(spare.id);
    if (!isStock || !reading || reading.groupVolts.length === 0) return [];
    return [reading.groupVolts.reduce((sum, one) => sum + one, 0) / reading.groupVolts.length];
  });
}
